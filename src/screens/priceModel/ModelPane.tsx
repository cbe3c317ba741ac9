/** What the model rests on: exact dependencies, what moves together, form and fit, and which sales count. */
import type { ModelReport } from "../../domain/appraisal.ts";
import type { MovingReport } from "../../domain/movingTogether.ts";
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
import { useWaysOn, WaysOn } from "./WaysOn.tsx";

export function ModelPane({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const report = bench.appraisal?.report ?? null;
  const found = useWaysOn(bench);
  return (
    <>
      {report === null || report.dependencies.length === 0 ? null : (
        <div className={css.section}>
          <SectionHeading>
            {report.dependencies.length === 1 ? "One attribute said twice" : "Attributes said twice"}
          </SectionHeading>
          <DependencyNotices bench={bench} dependencies={report.dependencies} ways={found?.dependencies ?? []} />
        </div>
      )}
      {report === null ? null : <MovingTogether bench={bench} report={report} found={found} />}
      <ResponseAndFit bench={bench} model={model} report={report} />
      <AttributeForms bench={bench} model={model} />
      <PairsAndBlends bench={bench} model={model} />
      <EvidenceChoice bench={bench} model={model} />
    </>
  );
}

interface MovingTogetherProps {
  readonly bench: Workbench;
  readonly report: ModelReport;
  readonly found: MovingReport | null;
}

function MovingTogether({ bench, report, found }: MovingTogetherProps) {
  const attributes = (bench.assetClass?.attributes ?? [])
    .filter((one) => report.model.attributes.some((member) => member.key === one.key))
    .map(({ key, label }) => ({ key, label }));
  return (
    <div className={css.section}>
      <SectionHeading aside="tie: partial correlation, the others alike">What moves together</SectionHeading>
      <div className={css.map}>
        <MovingTogetherMap report={report} attributes={attributes} justNow={bench.leftOutJustNow} />
      </div>
      <p className="small soft">Dashed tie: one rises as the other falls. Double line: exact.</p>
      {found === null ? null : <WaysOn bench={bench} found={found} />}
    </div>
  );
}
