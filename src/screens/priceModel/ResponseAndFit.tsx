/** Form of the response, market movement, the channel, and the fit in words. */
import type { FitAccount, ModelReport } from "../../domain/appraisal.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import { formatNumber, formatPercent } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import { SectionHeading, SegmentedChoice } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { FitExtras } from "./FitExtras.tsx";
import { FitSettings } from "./FitSettings.tsx";
import { isIn, setChannelIn } from "./modelChanges.ts";
import css from "./PriceModelPlace.module.css";

interface ResponseAndFitProps {
  readonly bench: Workbench;
  readonly model: PriceModel;
  readonly report: ModelReport | null;
}

export function ResponseAndFit({ bench, model, report }: ResponseAndFitProps) {
  const { changeModel } = bench;
  return (
    <div className={css.section}>
      <SectionHeading>Response and fit</SectionHeading>
      <dl className={css.facts}>
        <dt>Response</dt>
        <dd>
          <SegmentedChoice
            label="Response"
            value={model.response}
            options={[
              { value: "lnPrice", label: "ln price", title: "each attribute moves the price by a share" },
              { value: "price", label: "plain price", title: "each attribute moves the price by an amount" },
            ]}
            onChoose={(response) => changeModel((now) => ({ ...now, response }))}
          />
        </dd>
        <FitSettings bench={bench} model={model} />
        <dt>Sold through</dt>
        <dd>
          <SegmentedChoice
            label="Sold through, in the model"
            value={isIn(model, CHANNEL_KEY)}
            options={[
              { value: true, label: "in the model" },
              { value: false, label: "not" },
            ]}
            onChoose={(wanted) => changeModel((now) => setChannelIn(now, wanted))}
          />
        </dd>
        {report === null ? null : <FitFacts report={report} milliseconds={bench.milliseconds} />}
      </dl>
    </div>
  );
}

const PATH_WORDS: Readonly<Record<ModelReport["path"], string>> = {
  moments: "from sums of products",
  careful: "the careful way, as the attributes nearly say each other",
};

function FitFacts({ report, milliseconds }: { report: ModelReport; milliseconds: number | null }) {
  const { n, p, looTypicalError, r2, looR2, digitsToTrust, path } = report;
  const time =
    milliseconds === null ? "" : ` · refit in ${formatNumber(milliseconds, milliseconds < 10 ? 1 : 0)}\u00a0ms`;
  return (
    <>
      <dt>Sales, coefficients</dt>
      <dd>
        {formatNumber(n)} sales, {formatNumber(p)} coefficients
      </dd>
      <dt>Typical error</dt>
      <dd>
        {looTypicalError === null
          ? "not known: a sale is the only one of its kind"
          : `${formatPercent(looTypicalError, 1)} on a sale not yet seen`}
      </dd>
      {r2 === null ? null : (
        <>
          <dt>Explains</dt>
          <dd>
            {formatPercent(r2, 1)} of the variation
            {looR2 === null ? "" : `, ${formatPercent(looR2, 1)} of it in sales not yet seen`}
          </dd>
        </>
      )}
      <dt>Computed</dt>
      <dd>
        {PATH_WORDS[path]}; about {formatNumber(digitsToTrust)} digits to trust
        <span className="soft">{time}</span>
      </dd>
      {report.fitted === undefined ? null : <FitWords fitted={report.fitted} response={report.response} />}
    </>
  );
}

/** What the fit did to these sales and supposes of them, in sentences. */
function FitWords({ fitted, response }: { fitted: FitAccount; response: PriceModel["response"] }) {
  return (
    <>
      <dt>In words</dt>
      <dd className="small">
        {fitted.sentence} {fitted.errorsSentence}
        {fitted.errorsCaution === null ? null : <span className="soft"> {fitted.errorsCaution}</span>}{" "}
        <span className="soft">{fitted.whichRange}</span>
        {fitted.notes.map((note) => (
          <span key={note}> {note}</span>
        ))}
        <FitExtras fitted={fitted} response={response} />
      </dd>
    </>
  );
}
