/** Price level by quarter with its range as a band; the same as a table for whoever reads rather than looks. */
import { formatNumber } from "../../domain/format.ts";
import type { IndexPoint } from "../../domain/modelHealth.ts";
import css from "./IndexLine.module.css";
import { useWidth } from "./useWidth.ts";

const HEIGHT = 170;
const LEFT = 40;
const BOTTOM = 24;

export function IndexLine({ index }: { index: readonly IndexPoint[] }) {
  const { box, width } = useWidth<HTMLDivElement>(700);
  const low = Math.min(100, ...index.map((one) => one.low95));
  const high = Math.max(100, ...index.map((one) => one.high95));
  const room = (high - low) * 0.08 || 1;
  const x = (i: number): number => LEFT + 8 + (i / Math.max(1, index.length - 1)) * (width - LEFT - 24);
  const y = (value: number): number => 8 + ((high + room - value) / (high - low + 2 * room)) * (HEIGHT - BOTTOM - 12);
  const line = (value: (one: IndexPoint) => number): string =>
    index.map((one, i) => `${i === 0 ? "M" : "L"}${x(i).toFixed(1)} ${y(value(one)).toFixed(1)}`).join("");
  const back = [...index.keys()]
    .reverse()
    .map((i) => `L${x(i).toFixed(1)} ${y(index[i]!.low95).toFixed(1)}`)
    .join("");
  const every = Math.max(1, Math.ceil(index.length / Math.max(2, Math.floor(width / 78))));
  return (
    <div ref={box}>
      <svg width={width} height={HEIGHT} role="img" aria-label={summary(index)}>
        <path d={`${line((one) => one.high95)}${back}Z`} className={css.band} />
        <path d={`M${LEFT} ${y(100)}H${width - 8}`} className="s-rule" />
        <text x={LEFT - 6} y={y(100) + 4} textAnchor="end">
          100
        </text>
        {[low, high].map((value) => (
          <text key={value} x={LEFT - 6} y={y(value) + 4} textAnchor="end" className="t-soft">
            {Math.abs(y(value) - y(100)) < 14 ? "" : formatNumber(value)}
          </text>
        ))}
        <path d={line((one) => one.level)} fill="none" className="s-slate" strokeWidth="2" />
        {index.map((one, i) => (
          <g key={one.period}>
            <circle cx={x(i)} cy={y(one.level)} r="3" className="f-slate">
              <title>
                {one.period}: {formatNumber(one.level, 1)}, {formatNumber(one.sales)} sales
              </title>
            </circle>
            {i % every === 0 ? (
              <text x={x(i)} y={HEIGHT - 6} textAnchor="middle">
                {one.period}
              </text>
            ) : null}
          </g>
        ))}
      </svg>
      <details className="small">
        <summary className="soft">as a table</summary>
        <table className={css.table}>
          <caption className="vh">Price level by quarter</caption>
          <thead>
            <tr>
              <th scope="col">quarter</th>
              <th scope="col">sales</th>
              <th scope="col">level</th>
              <th scope="col">19 in 20</th>
            </tr>
          </thead>
          <tbody>
            {index.map((one) => (
              <tr key={one.period}>
                <th scope="row">{one.period}</th>
                <td>{formatNumber(one.sales)}</td>
                <td>{formatNumber(one.level, 1)}</td>
                <td>
                  {formatNumber(one.low95, 1)}–{formatNumber(one.high95, 1)}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </details>
    </div>
  );
}

function summary(index: readonly IndexPoint[]): string {
  const [first, last] = [index[0]!, index.at(-1)!];
  return `Price level from 100 in ${first.period} to ${formatNumber(last.level, 1)} in ${last.period}, range ${formatNumber(last.low95, 1)} to ${formatNumber(last.high95, 1)}.`;
}
