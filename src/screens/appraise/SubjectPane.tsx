/** The cause: what is being priced, for whom, and what is known of it. */
import type { Workbench } from "../workbench/workbench.ts";
import css from "./AppraisePlace.module.css";
import { EngagementForm } from "./EngagementForm.tsx";
import { SubjectForm } from "./SubjectForm.tsx";

export function SubjectPane({ bench }: { readonly bench: Workbench }) {
  const { subject, engagement, assetClass, appraisal, changeSubject, changeEngagement } = bench;
  if (subject === null || engagement === null || assetClass === null) return null;
  const text = (key: "serial" | "identifiedBy", value: string) =>
    changeSubject((now) => ({ ...now, [key]: value === "" ? null : value }), key);
  return (
    <>
      <input
        className={css.title}
        aria-label="Item"
        placeholder={`Maker and model of the ${assetClass.itemWord}`}
        value={subject.title}
        onChange={(event) => changeSubject((now) => ({ ...now, title: event.target.value }), "title")}
      />
      <div className={css.identity}>
        <label>
          Serial
          <input value={subject.serial ?? ""} onChange={(event) => text("serial", event.target.value)} />
        </label>
        <label>
          Identified by
          <input value={subject.identifiedBy ?? ""} onChange={(event) => text("identifiedBy", event.target.value)} />
        </label>
      </div>
      <EngagementForm
        engagement={engagement}
        subject={subject}
        onEngagement={(change) => changeEngagement((now) => ({ ...now, ...change }))}
        onSubject={(change) => changeSubject((now) => ({ ...now, ...change }), Object.keys(change).join())}
      />
      <h2 className={css.section}>Attributes of this {assetClass.itemWord}</h2>
      <SubjectForm
        subject={subject}
        attributes={assetClass.attributes}
        evidence={appraisal?.report.attributeEvidence ?? []}
        reach={appraisal?.priced?.reach ?? null}
        onChange={(key, value) => changeSubject((now) => ({ ...now, values: { ...now.values, [key]: value } }), key)}
      />
      {appraisal?.priced === null || appraisal === null ? null : (
        <p className={css.reach} data-verdict={appraisal.priced.reach.verdict}>
          {appraisal.priced.reach.sentence}
        </p>
      )}
    </>
  );
}
