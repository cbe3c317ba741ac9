/** The file's columns with their first values, and what each of them is. */
import type { ImportPreview } from "../../../contract/requests.ts";
import type { Attribute } from "../../../domain/attribute.ts";
import { listWords, lowerStart } from "../../../domain/format.ts";
import type { ColumnMatch, ColumnTarget } from "../../../domain/importRecord.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./BringIn.module.css";
import { KIND_LABELS, KINDS, optionOf, PLAIN_TARGETS, targetOf, unmatched, withTarget } from "./targets.ts";

export interface ColumnTableProps {
  readonly match: ColumnMatch;
  readonly preview: ImportPreview;
  readonly attributes: readonly Attribute[];
  readonly onChange: (match: ColumnMatch) => void;
}

const SHOWN = 4;

/** First different values of a column, as they stand in the file. */
export function firstValues(preview: Pick<ImportPreview, "sampleRows">, at: number): string[] {
  const found = new Set<string>();
  for (const { cells } of preview.sampleRows) {
    const cell = cells[at] ?? "";
    if (cell !== "") found.add(cell);
    if (found.size === SHOWN) break;
  }
  return [...found];
}

export function ColumnTable({ match, preview, attributes, onChange }: ColumnTableProps) {
  const open = unmatched(match, attributes);
  return (
    <section aria-labelledby="columns">
      <SectionHeading id="columns" aside="remembered for files with these headings">
        What the columns are
      </SectionHeading>
      <table className={css.columns}>
        <caption className="vh">Columns of the file and what each is</caption>
        <thead>
          <tr>
            <th scope="col">heading</th>
            <th scope="col">first values</th>
            <th scope="col">is</th>
          </tr>
        </thead>
        <tbody>
          {match.columns.map((column, at) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: columns have no other name of their own; headings may repeat
            <tr key={at} className={column.target.to === "nothing" ? css.unused : undefined}>
              <th scope="row">{column.heading}</th>
              <td className={css.values}>
                {firstValues(preview, at).map((value) => (
                  <span key={value}>{value}</span>
                ))}
              </td>
              <td>
                <TargetChoice
                  heading={column.heading}
                  target={column.target}
                  attributes={attributes}
                  onChange={(target) => onChange(withTarget(match, at, target))}
                />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {open.length === 0 ? null : (
        <p className="soft small">
          Not in this file, so not known for its sales: {listWords(open.map(({ label }) => lowerStart(label)))}.
        </p>
      )}
    </section>
  );
}

interface TargetChoiceProps {
  readonly heading: string;
  readonly target: ColumnTarget;
  readonly attributes: readonly Attribute[];
  readonly onChange: (target: ColumnTarget) => void;
}

function TargetChoice({ heading, target, attributes, onChange }: TargetChoiceProps) {
  const own = attributes.filter(({ archived }) => !archived);
  return (
    <div className={css.target}>
      <select
        aria-label={`What ${heading} is`}
        value={optionOf(target)}
        onChange={(event) => onChange(targetOf(event.target.value, heading))}
      >
        <option value="nothing">nothing, leave it</option>
        <optgroup label="The sale">
          {PLAIN_TARGETS.map(({ to, label }) => (
            <option key={to} value={to}>
              {label}
            </option>
          ))}
        </optgroup>
        {own.length === 0 ? null : (
          <optgroup label="Attributes">
            {own.map(({ key, label }) => (
              <option key={key} value={`attribute ${key}`}>
                {label}
              </option>
            ))}
          </optgroup>
        )}
        <optgroup label="A new attribute">
          {KINDS.map((kind) => (
            <option key={kind} value={`new ${kind}`}>
              new: {KIND_LABELS[kind]}
            </option>
          ))}
        </optgroup>
      </select>
      {target.to === "newAttribute" ? (
        <>
          <input
            aria-label={`Name of the new attribute from ${heading}`}
            value={target.label}
            maxLength={80}
            onChange={(event) => {
              if (event.target.value !== "") onChange({ ...target, label: event.target.value });
            }}
          />
          {target.kind === "number" ? (
            <input
              className={css.unit}
              aria-label={`Unit of the new attribute from ${heading}`}
              placeholder="unit"
              value={target.unit ?? ""}
              maxLength={20}
              onChange={(event) => onChange({ ...target, unit: event.target.value === "" ? null : event.target.value })}
            />
          ) : null}
        </>
      ) : null}
    </div>
  );
}
