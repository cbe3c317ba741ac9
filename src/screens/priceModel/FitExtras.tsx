/** What an estimator did, in figures: levels drawn together before and after, sales that count for little, the ridge penalty tried. */
import type { FitAccount } from "../../domain/appraisal.ts";
import { formatNumber, formatPercent, formatSigned } from "../../domain/format.ts";
import type { ResponseForm } from "../../domain/priceModel.ts";
import css from "./settings.module.css";

export function FitExtras({ fitted, response }: { fitted: FitAccount; response: ResponseForm }) {
  return (
    <>
      {fitted.pooled.map((choice) => (
        <details key={choice.key} className="small">
          <summary>
            {choice.label}: {formatNumber(choice.levels.length)} levels drawn together, before and after
          </summary>
          <Pooled choice={choice} response={response} />
        </details>
      ))}
      {fitted.countedLess.length === 0 ? null : (
        <details className="small">
          <summary>Sales that count for less than half, least first</summary>
          <p>
            {fitted.countedLess
              .map(({ sale, weight }) => `no. ${formatNumber(sale)} (${formatPercent(weight)})`)
              .join(", ")}
          </p>
        </details>
      )}
      {fitted.ridge === null || fitted.ridge.curve.length < 2 ? null : (
        <details className="small">
          <summary>
            Penalty of {formatNumber(fitted.ridge.penalty, fitted.ridge.penalty < 10 ? 2 : 0)} sales, and what others
            would give
          </summary>
          <RidgeCurve ridge={fitted.ridge} />
        </details>
      )}
    </>
  );
}

function Pooled({ choice, response }: { choice: FitAccount["pooled"][number]; response: ResponseForm }) {
  const shown = (value: number | null): string => {
    if (value === null) return "not told apart";
    return response === "lnPrice" ? `${formatSigned(Math.expm1(value) * 100, 1)}\u00a0%` : formatSigned(value);
  };
  return (
    <table className={css.extras}>
      <caption className="vh">
        Levels of {choice.label} against their mean, before and after they are drawn together
      </caption>
      <thead>
        <tr>
          <td />
          <th scope="col">sales</th>
          <th scope="col">before</th>
          <th scope="col">after</th>
        </tr>
      </thead>
      <tbody>
        {choice.levels.map(({ level, sales, before, after }) => (
          <tr key={level}>
            <th scope="row">{level}</th>
            <td>{formatNumber(sales)}</td>
            <td>{shown(before)}</td>
            <td>{shown(after)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

const WIDTH = 300;
const HEIGHT = 90;

/** Leave-one-out error over the penalty, the chosen one marked. */
function RidgeCurve({ ridge }: { ridge: NonNullable<FitAccount["ridge"]> }) {
  const curve = ridge.curve.filter(({ penalty }) => penalty > 0);
  const lows = curve.map(({ looError }) => looError);
  const [least, most] = [Math.min(...lows), Math.max(...lows)];
  const [from, to] = [Math.log10(curve[0]!.penalty), Math.log10(curve.at(-1)!.penalty)];
  const x = (penalty: number): number => 8 + ((Math.log10(penalty) - from) / (to - from || 1)) * (WIDTH - 16);
  const y = (error: number): number => 8 + ((most - error) / (most - least || 1)) * (HEIGHT - 34);
  const path = curve
    .map((one, i) => `${i === 0 ? "M" : "L"}${x(one.penalty).toFixed(1)} ${y(one.looError).toFixed(1)}`)
    .join("");
  const words = `Error on sales not seen over the penalty; least at ${formatNumber(ridge.penalty, 2)} sales.`;
  return (
    <svg width={WIDTH} height={HEIGHT} role="img" aria-label={words}>
      <path d={path} fill="none" className="s-slate" strokeWidth="1.6" />
      {ridge.penalty > 0 ? <path d={`M${x(ridge.penalty)} 4V${HEIGHT - 24}`} className={css.chosen} /> : null}
      <path d={`M8 ${HEIGHT - 24}H${WIDTH - 8}`} className="s-ink" />
      <text x="8" y={HEIGHT - 8}>
        {formatNumber(curve[0]!.penalty, 3)}
      </text>
      <text x={WIDTH - 8} y={HEIGHT - 8} textAnchor="end">
        {formatNumber(curve.at(-1)!.penalty)} sales
      </text>
    </svg>
  );
}
