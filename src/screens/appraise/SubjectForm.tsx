/**
 * The item's values, one row per attribute of the class: value with its unit, its place in the evidence, and a tick for
 * "not known". A value that cannot be read stays in the field with a sentence beside it, and changes nothing.
 */
import { useState } from "react";
import type { AttributeEvidence, Reach } from "../../domain/appraisal.ts";
import type { Attribute, AttributeValue } from "../../domain/attribute.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import { dayNumber, yearsBetween } from "../../domain/day.ts";
import { formatNumber, readTypedNumber } from "../../domain/format.ts";
import { CHANNELS } from "../../domain/sale.ts";
import type { Subject } from "../../domain/subject.ts";
import { EvidenceHairline } from "../charts/EvidenceHairline.tsx";
import css from "./SubjectForm.module.css";

export interface SubjectFormProps {
  readonly subject: Subject;
  readonly attributes: readonly Attribute[];
  readonly evidence: readonly AttributeEvidence[];
  readonly reach: Reach | null;
  readonly onChange: (key: string, value: AttributeValue) => void;
}

interface RowField {
  readonly key: string;
  readonly label: string;
  readonly attribute: Attribute | null;
  readonly choices: readonly string[] | null;
}

function fieldsOf(attributes: readonly Attribute[], evidence: readonly AttributeEvidence[]): RowField[] {
  const own = attributes
    .filter((attribute) => !attribute.archived)
    .map((attribute) => ({
      key: attribute.key,
      label: attribute.label,
      attribute,
      choices: attribute.kind === "choice" ? attribute.levels : attribute.kind === "yesNo" ? ["yes", "no"] : null,
    }));
  const channel = evidence.find((one) => one.key === CHANNEL_KEY);
  const levels =
    channel === undefined ? [] : CHANNELS.filter((one) => channel.levels.some(({ level }) => level === one));
  return channel === undefined
    ? own
    : [{ key: CHANNEL_KEY, label: channel.label, attribute: null, choices: levels }, ...own];
}

export function SubjectForm({ subject, attributes, evidence, reach, onChange }: SubjectFormProps) {
  return (
    <table className={css.form}>
      <caption className="vh">Attributes of the item: value, place in the evidence, not known</caption>
      <thead>
        <tr>
          <th scope="col">
            <span className="vh">attribute</span>
          </th>
          <th scope="col">value</th>
          <th scope="col" className={css.pictureHead}>
            its place in the evidence
          </th>
          <th scope="col">
            <span className="vh">range of the evidence</span>
          </th>
          <th scope="col" className="num">
            not
            <br />
            known
          </th>
        </tr>
      </thead>
      <tbody>
        {fieldsOf(attributes, evidence).map((field) => (
          <Row
            key={field.key}
            field={field}
            subject={subject}
            evidence={evidence.find((one) => one.key === field.key)}
            reach={reach?.attributes.find((one) => one.key === field.key)}
            onChange={(value) => onChange(field.key, value)}
          />
        ))}
      </tbody>
    </table>
  );
}

interface RowProps {
  readonly field: RowField;
  readonly subject: Subject;
  readonly evidence: AttributeEvidence | undefined;
  readonly reach: Reach["attributes"][number] | undefined;
  readonly onChange: (value: AttributeValue) => void;
}

function Row({ field, subject, evidence, reach, onChange }: RowProps) {
  const value = subject.values[field.key] ?? null;
  const [last, setLast] = useState<AttributeValue>(value);
  const verdict = reach?.verdict ?? "inside";
  const toggle = () => {
    if (value === null) onChange(last ?? typicalOf(field, evidence));
    else {
      setLast(value);
      onChange(null);
    }
  };
  return (
    <tr className={css[verdict]}>
      <th scope="row" title={field.attribute?.notes || undefined}>
        {field.label}
      </th>
      <td>
        {value === null ? (
          <span className={css.unknown}>not known</span>
        ) : (
          <ValueField field={field} value={value} subject={subject} onChange={onChange} />
        )}
      </td>
      <td className={css.picture}>{evidence === undefined ? null : place(evidence, value, subject, field)}</td>
      <td className={`num fine soft ${css.range}`} title={reach?.sentence}>
        {verdict === "inside" ? rangeWords(evidence, value) : <b>{verdict}</b>}
      </td>
      <td className="num">
        <input
          type="checkbox"
          className={css.tick}
          checked={value === null}
          onChange={toggle}
          aria-label={`${field.label} not known`}
        />
      </td>
    </tr>
  );
}

function ValueField({
  field,
  value,
  subject,
  onChange,
}: Omit<RowProps, "evidence" | "reach"> & { value: Exclude<AttributeValue, null> }) {
  if (field.choices !== null) return <ChoiceField field={field} value={value} onChange={onChange} />;
  if (field.attribute?.kind === "built") {
    return (
      <BuiltField label={field.label} value={String(value)} effectiveOn={subject.effectiveOn} onChange={onChange} />
    );
  }
  return <NumberField field={field} value={Number(value)} onChange={onChange} />;
}

function ChoiceField({
  field,
  value,
  onChange,
}: {
  field: RowField;
  value: Exclude<AttributeValue, null>;
  onChange: (value: AttributeValue) => void;
}) {
  const isYesNo = field.attribute?.kind === "yesNo";
  const shown = isYesNo ? (value === true || value === "yes" ? "yes" : "no") : String(value);
  return (
    <select
      className={css.field}
      aria-label={field.label}
      value={shown}
      onChange={(event) => onChange(isYesNo ? event.target.value === "yes" : event.target.value)}
    >
      {field.choices!.map((choice) => (
        <option key={choice}>{choice}</option>
      ))}
    </select>
  );
}

function BuiltField(props: {
  label: string;
  value: string;
  effectiveOn: string;
  onChange: (value: AttributeValue) => void;
}) {
  const [text, setText] = useState<string | null>(null);
  const problem = text === null ? null : problemOfDay(text, props.effectiveOn);
  const [built, effective] = [dayNumber(props.value), dayNumber(props.effectiveOn)];
  const typed = (next: string) => {
    setText(next);
    if (problemOfDay(next, props.effectiveOn) === null) props.onChange(next);
  };
  return (
    <>
      <span className={css.field}>
        <input
          aria-label={`${props.label}: built on, year-month-day`}
          aria-invalid={problem !== null}
          value={text ?? props.value}
          onChange={(event) => typed(event.target.value)}
          onBlur={() => {
            if (problem === null) setText(null);
          }}
        />
        {built === null || effective === null ? null : <i>{formatNumber(yearsBetween(built, effective), 1)} y</i>}
      </span>
      {problem === null ? null : (
        <span role="alert" className={css.problem}>
          {problem}
        </span>
      )}
    </>
  );
}

function problemOfDay(text: string, effectiveOn: string): string | null {
  if (dayNumber(text) === null) return "A day as year-month-day, such as 2018-03-15.";
  return text > effectiveOn ? "Built after the effective date." : null;
}

function NumberField({
  field,
  value,
  onChange,
}: {
  field: RowField;
  value: number;
  onChange: (value: AttributeValue) => void;
}) {
  const [text, setText] = useState<string | null>(null);
  const unit = field.attribute?.unit ?? null;
  const problem = text === null ? null : problemOf(text, field.attribute);
  const typed = (next: string) => {
    setText(next);
    if (problemOf(next, field.attribute) === null) onChange(readTypedNumber(next));
  };
  return (
    <>
      <span className={css.field}>
        <input
          inputMode="decimal"
          aria-label={unit === null ? field.label : `${field.label} in ${unit}`}
          aria-invalid={problem !== null}
          value={text ?? formatNumber(value, decimalsOf(value, field.attribute))}
          onChange={(event) => typed(event.target.value)}
          onBlur={() => {
            if (problem === null) setText(null);
          }}
        />
        {unit === null ? null : <i>{unit}</i>}
      </span>
      {problem === null ? null : (
        <span role="alert" className={css.problem}>
          {problem}
        </span>
      )}
    </>
  );
}

/** As many decimals as the value itself has, at most those of the attribute and never fewer than needed to be exact to 3. */
function decimalsOf(value: number, attribute: Attribute | null): number {
  const own = Math.min(3, (String(value).split(".")[1] ?? "").length);
  return Math.max(attribute?.decimals ?? 0, own);
}

function problemOf(text: string, attribute: Attribute | null): string | null {
  if (text.trim() === "") return "Enter a number, or tick not known.";
  const number = readTypedNumber(text);
  if (number === null) return "Not read: write 4,200.5, with a point before decimals.";
  const { lowest, highest } = attribute ?? { lowest: null, highest: null };
  if (lowest !== null && number < lowest) return `At least ${formatNumber(lowest, decimalsOf(lowest, null))}.`;
  if (highest !== null && number > highest) return `At most ${formatNumber(highest, decimalsOf(highest, null))}.`;
  return null;
}

/** The value a row starts at when it was never known: the middle of the evidence, or the most frequent level. */
function typicalOf(field: RowField, evidence: AttributeEvidence | undefined): AttributeValue {
  if (field.choices !== null) {
    const most = [...(evidence?.levels ?? [])].sort((a, b) => b.count - a.count)[0]?.level ?? field.choices[0] ?? null;
    return field.attribute?.kind === "yesNo" ? most === "yes" : most;
  }
  if (field.attribute?.kind === "built") return null;
  return evidence?.spread === null || evidence === undefined
    ? 0
    : Number(evidence.spread.median.toFixed(evidence.decimals));
}

function place(evidence: AttributeEvidence, value: AttributeValue, subject: Subject, field: RowField) {
  if (evidence.spread !== null) {
    const number = value === null ? null : field.attribute?.kind === "built" ? ageOf(value, subject) : Number(value);
    return (
      <EvidenceHairline label={evidence.label} spread={evidence.spread} value={number} decimals={evidence.decimals} />
    );
  }
  const total = evidence.levels.reduce((sum, one) => sum + one.count, 0);
  const own = evidence.levels.find((one) => one.level === levelOf(value))?.count ?? 0;
  const width = total === 0 ? 0 : (72 * own) / total;
  return (
    <svg width="74" height="14" role="img" aria-label={`${own} of ${total} sales`}>
      <rect x="1" y="6" width="72" height="4" className="f-pale" />
      <rect x="1" y="6" width={width} height="4" className="f-mid" />
    </svg>
  );
}

function ageOf(value: AttributeValue, subject: Subject): number | null {
  const [built, effective] = [dayNumber(String(value)), dayNumber(subject.effectiveOn)];
  return built === null || effective === null ? null : yearsBetween(built, effective);
}

function levelOf(value: AttributeValue): string {
  return typeof value === "boolean" ? (value ? "yes" : "no") : String(value);
}

function rangeWords(evidence: AttributeEvidence | undefined, value: AttributeValue): string {
  if (evidence === undefined) return "not in the set";
  if (evidence.spread !== null) {
    const { low, high } = evidence.spread;
    return `${formatNumber(low, evidence.decimals)}–${formatNumber(high, evidence.decimals)}`;
  }
  const own = evidence.levels.find((one) => one.level === levelOf(value))?.count;
  return `${formatNumber(own ?? evidence.levels.reduce((sum, one) => sum + one.count, 0))} sales`;
}
