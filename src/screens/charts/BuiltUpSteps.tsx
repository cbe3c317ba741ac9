/**
 * From the average sale to the item, one step per attribute, in money along the path. The picture is a column of the table:
 * solid raises, hollow lowers. Printed steps add up to the printed price; the exact value is on hover and focus.
 */
import type { BuiltUp, BuiltUpStep } from "../../domain/appraisal.ts";
import { formatMoney, formatNumber, formatSigned, roundTo, roundToAddUp } from "../../domain/format.ts";
import css from "./charts.module.css";
import { useWidth } from "./useWidth.ts";

export interface BuiltUpStepsProps {
  readonly builtUp: BuiltUp;
  readonly saleCount: number;
  /** What the item is called in the last row. */
  readonly subject: string;
  readonly currencyCode: string;
  /** Step that the parts are rounded to. */
  readonly step?: number;
  /** Step that the price itself is rounded to; a last row says what that rounding adds. */
  readonly priceStep?: number;
}

const ROW = 28;

export function BuiltUpSteps(props: BuiltUpStepsProps) {
  const { builtUp, saleCount, subject, currencyCode, step = 10, priceStep = step } = props;
  const { box, width } = useWidth<HTMLTableCellElement>(190);
  const printed = roundToAddUp([builtUp.start, ...builtUp.steps.map((one) => one.step)], builtUp.end, step);
  const sum = printed.reduce((total, part) => total + part, 0);
  const price = roundTo(builtUp.end, priceStep);
  const at = scaleOf(builtUp, width - 10);
  const exact = (amount: number): string => formatMoney(amount, currencyCode, undefined, 2);
  return (
    <div className={css.steps}>
      <table>
        <caption className="vh">From the average sale to the price, in {currencyCode}</caption>
        <tbody>
          <tr className={css.ends}>
            <th scope="row" colSpan={2}>
              Average of {formatNumber(saleCount)} sales
            </th>
            <td className={css.picture} ref={box}>
              <EndPicture at={at} amount={builtUp.start} kind="start" />
            </td>
            <td className="num" title={exact(builtUp.start)}>
              {formatMoney(printed[0]!, currencyCode)}
            </td>
          </tr>
          {builtUp.steps.map((one, index) => (
            <StepRow key={one.key} step={one} printed={printed[index + 1]!} at={at} currencyCode={currencyCode} />
          ))}
          {price === sum ? null : (
            <tr>
              <th scope="row" className={css.name}>
                Rounding
              </th>
              <td className={css.values}>to the nearest {formatNumber(priceStep)}</td>
              <td className={css.picture}>
                <svg width="100%" height={ROW} aria-hidden="true">
                  <path d={`M${at(builtUp.end)} 0V${ROW}`} className="s-ink" strokeWidth="1" />
                </svg>
              </td>
              <td className="num soft">{formatSigned(price - sum)}</td>
            </tr>
          )}
          <tr className={css.ends}>
            <th scope="row" colSpan={2}>
              {subject === "" ? "This item" : subject}
            </th>
            <td className={css.picture}>
              <EndPicture at={at} amount={builtUp.end} kind="end" />
            </td>
            <td className={`num ${css.price}`} title={exact(builtUp.end)}>
              {formatMoney(price, currencyCode)}
            </td>
          </tr>
        </tbody>
      </table>
    </div>
  );
}

function scaleOf(builtUp: BuiltUp, width: number): (amount: number) => number {
  const stands = [builtUp.start, builtUp.end, ...builtUp.steps.map((one) => one.standsAt)];
  const [low, high] = [Math.min(...stands), Math.max(...stands)];
  const from = 18;
  const extent = Math.max(high - low, Math.abs(high) * 1e-6, 1e-9);
  return (amount) => Math.round((from + ((amount - low) / extent) * (width - from - 6)) * 10) / 10;
}

interface StepRowProps {
  readonly step: BuiltUpStep;
  readonly printed: number;
  readonly at: (amount: number) => number;
  readonly currencyCode: string;
}

function StepRow({ step, printed, at, currencyCode }: StepRowProps) {
  const words = `${step.averageWords} → ${step.subjectWords}`;
  const exact = formatMoney(step.step, currencyCode, undefined, 2);
  return (
    <tr>
      <th scope="row" className={css.name}>
        {step.label}
      </th>
      <td className={css.values} title={words}>
        {words}
      </td>
      <td className={css.picture}>
        <StepPicture step={step} at={at} />
      </td>
      <td className="num" title={exact}>
        {formatSigned(printed)}
      </td>
    </tr>
  );
}

function StepPicture({ step, at }: { step: BuiltUpStep; at: (amount: number) => number }) {
  const [from, to] = [at(step.standsAt - step.step), at(step.standsAt)];
  const left = Math.min(from, to);
  const width = Math.max(1, Math.abs(to - from));
  return (
    <svg width="100%" height={ROW} aria-hidden="true">
      <path d={`M${from} 0V9M${to} 18V${ROW}`} className="s-ink" strokeWidth="1" />
      {step.step < 0 ? (
        <rect x={left} y="10" width={width} height="8" className="f-paper s-slate" strokeWidth="1.3" />
      ) : (
        <rect x={left} y="9.5" width={width} height="9" className="f-slate" />
      )}
    </svg>
  );
}

function EndPicture({ at, amount, kind }: { at: (amount: number) => number; amount: number; kind: "start" | "end" }) {
  const x = at(amount);
  if (kind === "start") {
    return (
      <svg width="100%" height={ROW} aria-hidden="true">
        <path d={`M0 14H${x}`} className="s-ink" strokeWidth="2" />
        <circle cx={x} cy="14" r="3.5" className="f-ink" />
        <path d={`M${x} 14V${ROW}`} className="s-ink" strokeWidth="1" />
      </svg>
    );
  }
  return (
    <svg width="100%" height={ROW} aria-hidden="true">
      <path d={`M${x} 0V9`} className="s-ink" strokeWidth="1" />
      <path d={`M0 14H${x}`} className="s-verd" strokeWidth="3" />
      <rect x={x - 5} y="9" width="10" height="10" className="f-verd" />
    </svg>
  );
}
