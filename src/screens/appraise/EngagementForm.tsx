/** The assignment as a sheet states it: read as a list, changed in place. Every word is the valuer's. */
import { useState } from "react";
import { formatDay } from "../../domain/format.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";
import { SectionHeading } from "../parts/index.ts";
import css from "./EngagementForm.module.css";

export interface EngagementFormProps {
  readonly engagement: Engagement;
  readonly subject: Subject;
  readonly onEngagement: (change: Partial<Engagement>) => void;
  readonly onSubject: (change: Partial<Subject>) => void;
}

type TextField = Exclude<keyof Engagement, "reportOn" | "ownCaveats">;

/** A price may not stand on a sheet without these. */
const HEADLINE: readonly TextField[] = ["basisOfValue", "premise", "marketLevel", "priceBasisWords"];

const FIELDS: readonly { key: TextField; label: string; isLong?: boolean }[] = [
  { key: "basisOfValue", label: "Basis of value" },
  { key: "premise", label: "Premise of value" },
  { key: "marketLevel", label: "Market level" },
  { key: "priceBasisWords", label: "Price basis" },
  { key: "basisDefinition", label: "Definition of the basis, and where it comes from", isLong: true },
  { key: "client", label: "Client" },
  { key: "intendedUsers", label: "Intended users" },
  { key: "intendedUse", label: "Intended use" },
  { key: "interest", label: "Interest valued" },
  { key: "inspected", label: "Inspected" },
  { key: "exposureTime", label: "Exposure time" },
  { key: "earlierSales", label: "Earlier sales of this item" },
  { key: "equipment", label: "Equipment" },
  { key: "practice", label: "Practice" },
  { key: "practiceLine", label: "Practice, second line" },
  { key: "valuer", label: "Valuer" },
];

/** Shown while nothing is being changed. */
const SHOWN: readonly TextField[] = [
  "basisOfValue",
  "premise",
  "marketLevel",
  "priceBasisWords",
  "client",
  "intendedUse",
  "inspected",
];

export function EngagementForm(props: EngagementFormProps) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <section aria-labelledby="engagement-heading">
      <SectionHeading
        id="engagement-heading"
        aside={
          <button type="button" className={css.change} aria-expanded={isOpen} onClick={() => setIsOpen(!isOpen)}>
            {isOpen ? "Done" : "Change"}
          </button>
        }
      >
        Engagement
      </SectionHeading>
      {isOpen ? <Fields {...props} /> : <Facts {...props} />}
    </section>
  );
}

function Facts({ engagement, subject }: EngagementFormProps) {
  return (
    <dl className={css.facts}>
      <div>
        <dt>Effective date</dt>
        <dd>{formatDay(subject.effectiveOn)}</dd>
      </div>
      <div>
        <dt>Report date</dt>
        <dd>{formatDay(engagement.reportOn)}</dd>
      </div>
      {SHOWN.map((key) => (
        <div key={key}>
          <dt>{FIELDS.find((field) => field.key === key)!.label}</dt>
          <dd>
            {engagement[key] === "" ? (
              <span className={HEADLINE.includes(key) ? css.needed : css.empty}>
                {HEADLINE.includes(key) ? "needed for a sheet" : "not stated"}
              </span>
            ) : (
              engagement[key]
            )}
          </dd>
        </div>
      ))}
    </dl>
  );
}

function Fields({ engagement, subject, onEngagement, onSubject }: EngagementFormProps) {
  return (
    <div className={css.fields}>
      <Day label="Effective date" value={subject.effectiveOn} onChange={(effectiveOn) => onSubject({ effectiveOn })} />
      <Day label="Report date" value={engagement.reportOn} onChange={(reportOn) => onEngagement({ reportOn })} />
      {FIELDS.map(({ key, label, isLong }) => (
        <label key={key} className={isLong === true ? css.wide : undefined}>
          <span>
            {label}
            {HEADLINE.includes(key) ? " (needed)" : ""}
          </span>
          <input value={engagement[key]} onChange={(event) => onEngagement({ [key]: event.target.value })} />
        </label>
      ))}
      <label className={css.wide}>
        <span>Own caveats, one a line; they print after the program's</span>
        <textarea
          rows={2}
          value={engagement.ownCaveats.join("\n")}
          onChange={(event) =>
            onEngagement({ ownCaveats: event.target.value === "" ? [] : event.target.value.split("\n") })
          }
        />
      </label>
    </div>
  );
}

function Day({ label, value, onChange }: { label: string; value: string; onChange: (day: string) => void }) {
  return (
    <label>
      <span>{label}</span>
      <input
        type="date"
        value={value}
        onChange={(event) => {
          if (event.target.value !== "") onChange(event.target.value);
        }}
      />
    </label>
  );
}
