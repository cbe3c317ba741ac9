/** How far each coefficient moves over the sets: a thin line over all, a bar over the defensible ones, a tick for the set in use. */
import type { CoefficientSpan, EverySet, Span } from "../../../domain/attributeSets.ts";
import { formatNumber, formatSigned, roundTo } from "../../../domain/format.ts";
import { type BarScale, barAt, barTicks } from "../../charts/CarryOverBars.tsx";
import { useWidth } from "../../charts/useWidth.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./everySet.module.css";
import { amountStep } from "./setWords.ts";

/** Widths of the columns beside the picture. */
const BESIDE = 388;
const ROW = 22;

export function SpanBars({ found }: { readonly found: EverySet }) {
  const { coefficients, currencyCode, turns, defensible, marks } = found;
  const { box, width } = useWidth<HTMLElement>(620);
  const picture = Math.max(120, width - BESIDE);
  const scale = scaleOf(coefficients, picture);
  const sets = formatNumber(marks.price.filter((price) => price !== null).length);
  return (
    <section ref={box} aria-labelledby="spans">
      <SectionHeading id="spans" aside={<SpanKey all={sets} defensible={formatNumber(defensible.length)} />}>
        Span of each coefficient
      </SectionHeading>
      <p className={css.note}>{turns}</p>
      <table className={css.spans}>
        <caption className="vh">
          Each coefficient over the attribute sets, {currencyCode} per step at the average sale
        </caption>
        <thead>
          <tr>
            <th scope="col">{currencyCode} per step</th>
            <th scope="col" style={{ width: picture }}>
              <Axis scale={scale} />
            </th>
            <th scope="col" className="num">
              lowest
            </th>
            <th scope="col" className="num">
              now
            </th>
            <th scope="col" className="num">
              highest
            </th>
          </tr>
        </thead>
        <tbody>
          {coefficients.map((one) => (
            <SpanRow key={`${one.attribute} ${one.level ?? one.label}`} one={one} scale={scale} />
          ))}
        </tbody>
      </table>
      <p className="small soft">
        Lowest and highest over the defensible sets; per step at the average sale. A coefficient has no meaning apart
        from the attributes beside it.
      </p>
    </section>
  );
}

function scaleOf(coefficients: readonly CoefficientSpan[], width: number): BarScale {
  const ends = coefficients.flatMap(({ money: { all } }) => [all.low, all.high]);
  return { low: Math.min(0, ...ends), high: Math.max(0, ...ends), width };
}

function Axis({ scale }: { readonly scale: BarScale }) {
  return (
    <svg width={scale.width} height="18" aria-hidden="true">
      {barTicks(scale).map((amount) => (
        <g key={amount}>
          <text x={barAt(scale, amount)} y="11" textAnchor="middle" className="t-soft t-scale">
            {formatNumber(amount)}
          </text>
          <path d={`M${barAt(scale, amount)} 14v4`} className="s-edge" />
        </g>
      ))}
    </svg>
  );
}

function SpanRow({ one, scale }: { readonly one: CoefficientSpan; readonly scale: BarScale }) {
  const { money, label, level, stepWords } = one;
  const step = amountStep([money.now ?? money.all.high, money.all.low / 10]);
  const amount = (value: number | null): string => (value === null ? "" : formatSigned(roundTo(value, step)));
  const turnsHere = isTurning(one.defensibleSigns);
  return (
    <tr>
      <th scope="row" title={signWords(one)}>
        {level === null || level === "yes" ? label : `${label} ${level}`}{" "}
        <span className="soft fine">{stepWords ?? (level === "yes" ? "yes" : "")}</span>
        {isTurning(one.signs) ? (
          <span className={turnsHere ? "brick fine" : "brass fine"}> {turnsHere ? "sign turns" : "turns"}</span>
        ) : null}
      </th>
      <td className={css.picture}>
        <SpanPicture one={one} scale={scale} />
      </td>
      <td className="num">{amount(money.defensible?.low ?? null)}</td>
      <td className="num">
        {money.now === null ? <span className="soft">left out</span> : <b>{amount(money.now)}</b>}
      </td>
      <td className="num">{amount(money.defensible?.high ?? null)}</td>
    </tr>
  );
}

function isTurning({ above, below }: { above: number; below: number }): boolean {
  return above > 0 && below > 0;
}

function signWords({ signs, defensibleSigns }: CoefficientSpan): string {
  const words = ({ above, below }: CoefficientSpan["signs"]) =>
    `above zero in ${formatNumber(above)}, below in ${formatNumber(below)}`;
  return `Of the sets that have it: ${words(signs)}; of the defensible ones: ${words(defensibleSigns)}`;
}

function SpanPicture({ one: { money }, scale }: { readonly one: CoefficientSpan; readonly scale: BarScale }) {
  const at = (amount: number): number => barAt(scale, amount);
  const middle = ROW / 2;
  const line = ({ low, high }: Span): string =>
    `M${at(low)} ${middle - 3}v6M${at(low)} ${middle}H${at(high)}M${at(high)} ${middle - 3}v6`;
  return (
    <svg width={scale.width} height={ROW} aria-hidden="true">
      <path d={`M${at(0)} 0V${ROW + 1}`} className="s-edge" />
      <path d={line(money.all)} className="s-mid f-none" />
      {money.defensible === null ? null : (
        <rect
          x={at(money.defensible.low)}
          y={middle - 4}
          width={Math.max(1.5, at(money.defensible.high) - at(money.defensible.low))}
          height="8"
          className="f-slate"
        />
      )}
      {money.now === null ? null : (
        <rect x={at(money.now) - 1.25} y={middle - 8} width="2.5" height="16" className="f-verd" />
      )}
    </svg>
  );
}

function SpanKey({ all, defensible }: { readonly all: string; readonly defensible: string }) {
  return (
    <span className={css.key}>
      <svg width="22" height="10" aria-hidden="true">
        <path d="M0 5H22" className="s-mid" />
      </svg>
      all {all}
      <svg width="18" height="10" aria-hidden="true">
        <rect y="1" width="18" height="8" className="f-slate" />
      </svg>
      {defensible} defensible
      <svg width="3" height="14" aria-hidden="true">
        <rect width="2.5" height="14" className="f-verd" />
      </svg>
      in use
    </span>
  );
}
