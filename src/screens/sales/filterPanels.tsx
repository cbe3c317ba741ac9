/** What stands in the register's filters once they are open. */
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { lowerStart } from "../../domain/format.ts";
import { CHANNEL_LABELS, CHANNELS } from "../../domain/sale.ts";
import { NO_VALUE_FILTER, withValue } from "./filters.ts";
import type { SalesFilter } from "./pageBook.ts";
import css from "./RegisterBar.module.css";

export interface PanelProps {
  readonly filter: SalesFilter;
  readonly onFilter: (filter: SalesFilter) => void;
}

export function SoldPanel({ filter, onFilter }: PanelProps) {
  const day = (end: "soldFrom" | "soldTo", label: string) => (
    <label>
      <span>{label}</span>
      <input
        type="date"
        value={filter[end] ?? ""}
        onChange={(event) => onFilter({ ...filter, [end]: event.target.value === "" ? null : event.target.value })}
      />
    </label>
  );
  return (
    <>
      {day("soldFrom", "from")}
      {day("soldTo", "to")}
    </>
  );
}

export function ChannelPanel({ filter, onFilter }: PanelProps) {
  const chosen = filter.channels ?? CHANNELS;
  return CHANNELS.map((channel) => (
    <label key={channel} className={css.tick}>
      <input
        type="checkbox"
        checked={chosen.includes(channel)}
        onChange={(event) => {
          const next = CHANNELS.filter((one) => (one === channel ? event.target.checked : chosen.includes(one)));
          onFilter({ ...filter, channels: next.length === CHANNELS.length ? null : [...next] });
        }}
      />
      {CHANNEL_LABELS[channel]}
    </label>
  ));
}

const STATES = [
  { value: "any", label: "any" },
  { value: "in", label: "not set aside" },
  { value: "setAside", label: "set aside" },
] as const;

const VERIFIED = [
  { value: "any", label: "verified or not" },
  { value: "yes", label: "verified" },
  { value: "no", label: "not verified" },
] as const;

export function StatePanel({ filter, onFilter }: PanelProps) {
  return (
    <>
      {STATES.map(({ value, label }) => (
        <label key={value} className={css.tick}>
          <input
            type="radio"
            name="state"
            checked={filter.state === value}
            onChange={() => onFilter({ ...filter, state: value })}
          />
          {label}
        </label>
      ))}
      <hr />
      {VERIFIED.map(({ value, label }) => (
        <label key={value} className={css.tick}>
          <input
            type="radio"
            name="verified"
            checked={filter.verified === value}
            onChange={() => onFilter({ ...filter, verified: value })}
          />
          {label}
        </label>
      ))}
    </>
  );
}

export function LevelsPanel({ filter, onFilter, attribute }: PanelProps & { attribute: Attribute }) {
  const all = attribute.kind === "yesNo" ? ["yes", "no"] : attribute.levels;
  const chosen = filter.values[attribute.key]?.levels ?? all;
  return all.map((level) => (
    <label key={level} className={css.tick}>
      <input
        type="checkbox"
        checked={chosen.includes(level)}
        onChange={(event) => {
          const next = all.filter((one) => (one === level ? event.target.checked : chosen.includes(one)));
          onFilter(withValue(filter, attribute.key, { levels: next.length === all.length ? null : next }));
        }}
      />
      {level}
    </label>
  ));
}

export interface NarrowPanelProps extends PanelProps {
  readonly attributes: readonly Attribute[];
  readonly evidence: readonly AttributeEvidence[];
}

/** The hairlines' handles as fields, and the choices that have no filter of their own. */
export function NarrowPanel({ filter, onFilter, attributes, evidence }: NarrowPanelProps) {
  return attributes.map((attribute) => (
    <fieldset key={attribute.key} className={css.narrow}>
      <legend>
        {attribute.label}
        {attribute.kind === "built" ? ", years at sale" : attribute.unit === null ? "" : `, ${attribute.unit}`}
      </legend>
      {attribute.kind === "number" || attribute.kind === "built" ? (
        <Between
          filter={filter}
          onFilter={onFilter}
          attribute={attribute}
          spread={evidence.find(({ key }) => key === attribute.key)?.spread ?? null}
        />
      ) : (
        <div className={css.levels}>
          <LevelsPanel filter={filter} onFilter={onFilter} attribute={attribute} />
        </div>
      )}
      <label className={css.tick}>
        <input
          type="checkbox"
          checked={filter.values[attribute.key]?.missing === true}
          onChange={(event) => {
            const part = event.target.checked ? { ...NO_VALUE_FILTER, missing: true } : { missing: null };
            onFilter(withValue(filter, attribute.key, part));
          }}
        />
        only where not known
      </label>
    </fieldset>
  ));
}

type BetweenProps = PanelProps & { attribute: Attribute; spread: AttributeEvidence["spread"] };

function Between({ filter, onFilter, attribute, spread }: BetweenProps) {
  const part = filter.values[attribute.key] ?? NO_VALUE_FILTER;
  const field = (end: "low" | "high", words: string, evidence: number | undefined) => (
    <label>
      <span>{words}</span>
      <input
        type="number"
        step="any"
        aria-label={`${lowerStart(attribute.label)} ${words}`}
        value={part[end] ?? ""}
        placeholder={evidence === undefined ? "" : String(Number(evidence.toFixed(attribute.decimals)))}
        onChange={(event) => {
          const value = event.target.value === "" ? null : Number(event.target.value);
          onFilter(withValue(filter, attribute.key, { [end]: value }));
        }}
      />
    </label>
  );
  return (
    <>
      {field("low", "from", spread?.low)}
      {field("high", "to", spread?.high)}
    </>
  );
}
