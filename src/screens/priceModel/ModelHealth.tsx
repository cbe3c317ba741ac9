/** The health of the model: each check a sentence with what to do, the power the sales speak for, and the market's path. */
import { useMemo } from "react";
import type { RequestInput } from "../../contract/requests.ts";
import { formatMoney, formatNumber, formatPercent } from "../../domain/format.ts";
import type { HealthCheck, ModelHealth, PowerOfPrice, ResponsesCompared } from "../../domain/modelHealth.ts";
import { IndexLine } from "../charts/IndexLine.tsx";
import { Busy, ErrorNote, SectionHeading, Sentence, TextLink } from "../parts/index.ts";
import { isBlank } from "../workbench/blank.ts";
import { useRead } from "../workbench/useTask.ts";
import type { Workbench } from "../workbench/workbench.ts";
import css from "./health.module.css";

export function HealthOutcome({ bench }: { bench: Workbench }) {
  const { client, classId, model, subject } = bench;
  const ask = useMemo(() => {
    if (classId === null || model === null) return null;
    const known = subject === null || isBlank(subject) ? null : subject;
    return () => client.ask("health", { classId, model, subject: known } as unknown as RequestInput<"health">);
  }, [client, classId, model, subject]);
  const { value, error, isAwaited } = useRead(ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null) return <Busy words="Checking the model" />;
  return (
    <div aria-busy={isAwaited}>
      <Sentence>{value.headline}</Sentence>
      <Checks health={value} />
      {value.power === null || value.responses === null ? null : (
        <Response power={value.power} responses={value.responses} bench={bench} currencyCode={value.currencyCode} />
      )}
      {value.index.length < 2 ? null : (
        <section className={css.section}>
          <SectionHeading aside="items alike, first quarter = 100, range 19 in 20">
            Price level of the class
          </SectionHeading>
          <IndexLine index={value.index} />
        </section>
      )}
    </div>
  );
}

const MARKS: Readonly<Record<HealthCheck["verdict"], { mark: string; word: string }>> = {
  fine: { mark: "●", word: "fine" },
  look: { mark: "◆", word: "look" },
  trouble: { mark: "▲", word: "trouble" },
};

function Checks({ health }: { health: ModelHealth }) {
  return (
    <section className={css.section}>
      <SectionHeading aside={`${formatNumber(health.saleCount)} sales; most serious first`}>Checks</SectionHeading>
      <ul className={css.checks}>
        {health.checks.map((check) => (
          <Check key={check.code} check={check} />
        ))}
      </ul>
      {health.leftOut.length === 0 ? null : (
        <p className="small soft">
          Not run:{" "}
          {health.leftOut.map(({ code, label, reason }) => (
            <span key={code}>
              {label} — {reason}{" "}
            </span>
          ))}
        </p>
      )}
    </section>
  );
}

function Check({ check }: { check: HealthCheck }) {
  const { mark, word } = MARKS[check.verdict];
  return (
    <li className={css.check} data-verdict={check.verdict}>
      <span className={css.mark}>
        <span aria-hidden="true">{mark}</span> {word}
      </span>
      <details>
        <summary>
          <b>{check.label}.</b> {check.sentence}
          {check.verdict === "fine" ? null : <span className={css.advice}> {check.whatToDo}</span>}
        </summary>
        <dl className={css.figures}>
          <dt>Statistic</dt>
          <dd>
            {formatNumber(check.statistic, 3)}
            {check.df.length === 0
              ? ""
              : `, ${check.df.map((df) => formatNumber(df)).join(" and ")} degrees of freedom`}
            {check.p === null ? "" : `, p ${check.p < 0.0001 ? "below 0.0001" : formatNumber(check.p, 4)}`}
          </dd>
          {(check.details ?? []).map(({ label, value, limit }) => (
            <FigureRow key={label} label={label} value={value} limit={limit} />
          ))}
          {check.sales.length === 0 ? null : (
            <>
              <dt>Sales</dt>
              <dd>
                {check.sales.map(({ sale, reference, title }) => `${reference ?? `no. ${sale}`} ${title}`).join("; ")}
              </dd>
            </>
          )}
          <dt>Source</dt>
          <dd>{check.source}</dd>
        </dl>
      </details>
    </li>
  );
}

function FigureRow({ label, value, limit }: { label: string; value: number; limit: number | null }) {
  const decimals = Number.isInteger(value) ? 0 : 3;
  return (
    <>
      <dt>{label}</dt>
      <dd>
        {formatNumber(value, decimals)}
        {limit === null ? "" : `, large from ${formatNumber(limit, Number.isInteger(limit) ? 0 : 3)}`}
      </dd>
    </>
  );
}

interface ResponseProps {
  readonly power: PowerOfPrice;
  readonly responses: ResponsesCompared;
  readonly bench: Workbench;
  readonly currencyCode: string;
}

function Response({ power, responses, bench, currencyCode }: ResponseProps) {
  const now = bench.model?.response;
  const rows = [
    { form: "price" as const, label: "plain price", errors: responses.price },
    { form: "lnPrice" as const, label: "ln price", errors: responses.lnPrice },
  ];
  return (
    <section className={css.section}>
      <SectionHeading aside="power of the price that suits a straight model">Price or its logarithm</SectionHeading>
      <p className="small">
        {power.sentence} {responses.sentence}
      </p>
      <div className={css.two}>
        <PowerCurve power={power} />
        <table className={css.table}>
          <caption className="vh">Errors of both responses on sales not seen, in money</caption>
          <thead>
            <tr>
              <td />
              <th scope="col">root mean square</th>
              <th scope="col">median</th>
              <td />
            </tr>
          </thead>
          <tbody>
            {rows.map(({ form, label, errors }) => (
              <tr key={form}>
                <th scope="row">{label}</th>
                <td>
                  {formatMoney(errors.rootMeanSquare, currencyCode)}{" "}
                  <span className="soft">{formatPercent(errors.rootMeanSquareFraction, 1)}</span>
                </td>
                <td>
                  {formatMoney(errors.medianAbsolute, currencyCode)}{" "}
                  <span className="soft">{formatPercent(errors.medianAbsoluteFraction, 1)}</span>
                </td>
                <td>
                  {form === now ? (
                    "in use"
                  ) : (
                    <TextLink onPress={() => bench.changeModel((model) => ({ ...model, response: form }))}>
                      Use it
                    </TextLink>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}

const WIDTH = 300;
const HEIGHT = 110;
/** χ²₁ at 0.95, halved: how far the likelihood may fall within the interval. */
const FALL = 1.92;

/** How well each power suits: the fall of the log-likelihood from its top, the interval shaded. */
function PowerCurve({ power }: { power: PowerOfPrice }) {
  const depth = FALL * 6;
  const x = (value: number): number => 10 + ((value + 2) / 4) * (WIDTH - 20);
  const y = (value: number): number => 12 + (Math.min(depth, -value) / depth) * (HEIGHT - 36);
  const path = power.curve
    .map(
      ({ power: at, logLikelihood }, i) => `${i === 0 ? "M" : "L"}${x(at).toFixed(1)} ${y(logLikelihood).toFixed(1)}`,
    )
    .join("");
  const [low, high] = [power.low ?? -2, power.high ?? 2];
  const words = `Power ${formatNumber(power.best, 2)} suits best; 95 percent from ${formatNumber(low, 2)} to ${formatNumber(high, 2)}.`;
  return (
    <svg width={WIDTH} height={HEIGHT} role="img" aria-label={words} className={css.power}>
      <rect x={x(low)} y="6" width={Math.max(1.5, x(high) - x(low))} height={HEIGHT - 30} className={css.band} />
      <path d={path} fill="none" className="s-slate" strokeWidth="1.6" />
      <path d={`M10 ${HEIGHT - 22}H${WIDTH - 10}`} className="s-ink" />
      {[-2, -1, 0, 1, 2].map((at) => (
        <g key={at}>
          <path d={`M${x(at)} ${HEIGHT - 22}v4`} className="s-ink" />
          <text x={x(at)} y={HEIGHT - 6} textAnchor="middle">
            {at === 0 ? "0, ln" : at === 1 ? "1, price" : String(at).replace("-", "−")}
          </text>
        </g>
      ))}
      <path d={`M${x(power.best)} 6V${HEIGHT - 22}`} className={css.best} />
    </svg>
  );
}
