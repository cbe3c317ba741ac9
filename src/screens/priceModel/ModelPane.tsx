/** What the model rests on: exact dependencies, what moves together, form and fit, and which sales count. */
import type { ModelReport } from "../../domain/appraisal.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import { MovingTogetherMap } from "../charts/MovingTogetherMap.tsx";
import { SectionHeading } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { AttributeForms } from "./AttributeForms.tsx";
import { DependencyNotices } from "./DependencyNotices.tsx";
import { EvidenceChoice } from "./EvidenceChoice.tsx";
import { PairsAndBlends } from "./PairsAndBlends.tsx";
import css from "./PriceModelPlace.module.css";
import { ResponseAndFit } from "./ResponseAndFit.tsx";

export function ModelPane({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const report = bench.appraisal?.report ?? null;
  return (
    <>
      {report === null || report.dependencies.length === 0 ? null : (
        <div className={css.section}>
          <SectionHeading>
            {report.dependencies.length === 1 ? "One attribute said twice" : "Attributes said twice"}
          </SectionHeading>
          <DependencyNotices bench={bench} dependencies={report.dependencies} />
        </div>
      )}
      {report === null ? null : <MovingTogether bench={bench} report={report} />}
      <ResponseAndFit bench={bench} model={model} report={report} />
      <AttributeForms bench={bench} model={model} />
      <PairsAndBlends bench={bench} model={model} />
      <EvidenceChoice bench={bench} model={model} />
    </>
  );
}

function MovingTogether({ bench, report }: { bench: Workbench; report: ModelReport }) {
  const attributes = (bench.assetClass?.attributes ?? [])
    .filter((one) => report.model.attributes.some((member) => member.key === one.key))
    .map(({ key, label }) => ({ key, label }));
  return (
    <div className={css.section}>
      <SectionHeading aside="tie: partial correlation, the others alike">What moves together</SectionHeading>
      <div className={css.map}>
        <MovingTogetherMap report={report} attributes={attributes} justNow={bench.leftOutJustNow} />
      </div>
      <p className="small">
        <StrongestPair report={report} />{" "}
        <span className="soft">Dashed tie: one rises as the other falls. Double line: exact.</span>
      </p>
    </div>
  );
}

/** The strongest pair, and how much wider standing side by side makes their ranges. */
function StrongestPair({ report }: { report: ModelReport }) {
  const pair = report.movingTogether[0];
  if (pair === undefined) return <b>No two attributes move together.</b>;
  const labelOf = (key: string): string => report.attributeEvidence.find((one) => one.key === key)?.label ?? key;
  const timesOf = (key: string): number | null => report.widening.find((one) => one.key === key)?.times ?? null;
  const [a, b] = [timesOf(pair.a), timesOf(pair.b)];
  const strength = formatNumber(pair.partialCorrelation, 2);
  return (
    <>
      <b>
        {labelOf(pair.a)} and {lowerStart(labelOf(pair.b))} move together most: {strength}, the others alike.
      </b>{" "}
      {a === null || b === null ? null : (
        <span className="soft">
          Side by side their ranges are {formatNumber(a, 1)} and {formatNumber(b, 1)} × wider than alone.
        </span>
      )}
    </>
  );
}
