/**
 * The price on its ruler: outer bracket one sale at the chosen level, inner box one sale 1 in 2, solid bar the average,
 * one needle the price. Redrawn at each width.
 */
import type { PriceEstimate, Range } from "../../domain/appraisal.ts";
import { formatMoney, formatNumber, levelWords, roundOutward, roundTo } from "../../domain/format.ts";
import css from "./charts.module.css";
import { priceStep } from "./figures.ts";
import { placeOn, type Ruler, rangeAt, rulerAround, ticksOf } from "./ruler.ts";
import { useWidth } from "./useWidth.ts";

export interface RangeGaugeProps {
  readonly price: PriceEstimate;
  readonly currencyCode: string;
  /** Level of the outer bracket and of the average's bar. */
  readonly level: number;
  /** What the money is, at the right end: "EUR, premium in, tax out". */
  readonly basisWords?: string;
}

const HEIGHT = 150;
const RULER_TOP = 108;
const RULER_BOTTOM = 144;
const INNER_LEVEL = 0.5;
/** Rough width of a digit at 11.5 px, to keep words off each other. */
const DIGIT = 6.6;

interface Figures {
  readonly amount: string;
  readonly mean: string | null;
  readonly outer: Range | null;
  readonly inner: Range | null;
  readonly average: Range | null;
}

function figuresOf(price: PriceEstimate, level: number, currencyCode: string): Figures {
  const step = priceStep(price);
  const outward = (range: Range | null): Range | null =>
    range === null ? null : { level: range.level, ...roundOutward(range, step) };
  const inner = level === INNER_LEVEL ? null : rangeAt(price.rangeForOneSale, INNER_LEVEL);
  return {
    amount: formatMoney(roundTo(price.amount, step), currencyCode),
    mean:
      price.centre === "median" ? formatMoney(roundTo(price.meanAmount, Math.max(1, step / 5)), currencyCode) : null,
    outer: outward(rangeAt(price.rangeForOneSale, level)),
    inner: outward(inner),
    average: outward(rangeAt(price.rangeForAverage, level)),
  };
}

function between(range: Range, currencyCode: string): string {
  return `${formatMoney(range.low, currencyCode)} to ${formatMoney(range.high, currencyCode)}`;
}

/** The picture in words: its name to a screen reader. */
export function gaugeWords(price: PriceEstimate, level: number, currencyCode: string): string {
  const { amount, outer, inner, average } = figuresOf(price, level, currencyCode);
  const parts = [
    `Price ${amount}, the ${price.centre}.`,
    outer === null ? "No range for one sale can be given." : "",
    outer === null ? "" : `Range for one sale: ${levelWords(level)} from ${between(outer, currencyCode)}.`,
    inner === null ? "" : `1 in 2 from ${between(inner, currencyCode)}.`,
    average === null ? "" : `Range for the average, ${levelWords(level)}: ${between(average, currencyCode)}.`,
  ];
  return parts.filter((part) => part !== "").join(" ");
}

export function RangeGauge({ price, currencyCode, level, basisWords }: RangeGaugeProps) {
  const { box, width } = useWidth<HTMLDivElement>(924);
  const figures = figuresOf(price, level, currencyCode);
  const ruler = rulerAround(
    price.rangeForOneSale.length > 0
      ? price.rangeForOneSale.filter((range) => range.level <= Math.max(level, 0.9))
      : [{ level: 1, low: price.amount * 0.8, high: price.amount * 1.2 }],
  );
  const at = placeOn(ruler, width);
  const words = gaugeWords(price, level, currencyCode);
  return (
    <div ref={box} className={css.gauge}>
      <svg width={width} height={HEIGHT} role="img" aria-label={words}>
        <title>{words}</title>
        <Brackets figures={figures} at={at} width={width} level={level} currencyCode={currencyCode} />
        <Scale ruler={ruler} width={width} />
        <path d={`M${at(price.amount)} 28V125`} className="s-verd" strokeWidth="3" />
        <Head figures={figures} x={at(price.amount)} width={width} basis={basisWords ?? currencyCode} />
      </svg>
    </div>
  );
}

function Scale({ ruler, width }: { ruler: Ruler; width: number }) {
  const length = [3, 6, 12] as const;
  return (
    <g>
      <rect x="0" y={RULER_TOP} width={width} height={RULER_BOTTOM - RULER_TOP} className="f-raised" />
      <path d={`M0 ${RULER_TOP}H${width}`} className="s-ink" strokeWidth="1.3" />
      <path d={`M0 ${RULER_BOTTOM}H${width}M.5 ${RULER_TOP}v36M${width - 0.5} ${RULER_TOP}v36`} className="s-rule" />
      {ticksOf(ruler, width, 84).map((tick) => (
        <g key={tick.amount}>
          <path
            d={`M${tick.at} ${RULER_TOP}v${length[tick.rank]}`}
            className={tick.rank === 2 ? "s-ink" : "s-edge"}
            strokeWidth="1"
          />
          {tick.rank === 2 && tick.at > 24 && tick.at < width - 24 ? (
            <text x={tick.at} y={RULER_TOP + 27} textAnchor="middle" className="t-soft">
              {formatNumber(tick.amount)}
            </text>
          ) : null}
        </g>
      ))}
    </g>
  );
}

interface BracketsProps {
  readonly figures: Figures;
  readonly at: (amount: number) => number;
  readonly width: number;
  readonly level: number;
  readonly currencyCode: string;
}

function Brackets({ figures, at, width, level, currencyCode }: BracketsProps) {
  const { outer, inner, average } = figures;
  return (
    <g>
      {outer === null ? null : <Outer range={outer} at={at} width={width} level={level} currencyCode={currencyCode} />}
      {inner === null ? null : <Inner range={inner} at={at} outer={outer} />}
      {average === null ? null : <Average range={average} at={at} width={width} inner={inner} level={level} />}
    </g>
  );
}

function Outer(props: {
  range: Range;
  at: (amount: number) => number;
  width: number;
  level: number;
  currencyCode: string;
}) {
  const { range, at, width, level, currencyCode } = props;
  const [left, right] = [at(range.low), at(range.high)];
  const isTight = left < 70;
  return (
    <g>
      <path d={`M${left} ${RULER_TOP}V40H${right}V${RULER_TOP}`} className="s-ink f-none" strokeWidth="1.3" />
      <path d={`M${left} ${RULER_TOP}l-3.5 -8h7zM${right} ${RULER_TOP}l-3.5 -8h7z`} className="f-ink" />
      <text
        x={isTight ? left : left - 8}
        y={isTight ? 34 : 54}
        textAnchor={isTight ? "start" : "end"}
        className="t-serif"
        fontSize="16"
      >
        {formatMoney(range.low, currencyCode)}
      </text>
      <text
        x={width - right < 70 ? right : right + 8}
        y={width - right < 70 ? 34 : 54}
        textAnchor={width - right < 70 ? "end" : "start"}
        className="t-serif"
        fontSize="16"
      >
        {formatMoney(range.high, currencyCode)}
      </text>
      <text x={left + 10} y="56">
        one sale, {levelWords(level)}
      </text>
    </g>
  );
}

function Inner({ range, at, outer }: { range: Range; at: (amount: number) => number; outer: Range | null }) {
  const [left, right] = [at(range.low), at(range.high)];
  const room = outer === null ? Number.POSITIVE_INFINITY : left - at(outer.low);
  return (
    <g>
      <rect x={left} y="66" width={right - left} height={RULER_TOP - 66} className="f-vwash" />
      <path d={`M${left} ${RULER_TOP}V66H${right}V${RULER_TOP}`} className="s-verd f-none" strokeWidth="1.6" />
      <text x={left + 10} y="82" className="t-verd">
        one sale, 1 in 2
      </text>
      {room < 60 ? null : (
        <>
          <text x={left - 8} y="82" textAnchor="end">
            {formatNumber(range.low)}
          </text>
          <text x={right + 8} y="82">
            {formatNumber(range.high)}
          </text>
        </>
      )}
    </g>
  );
}

interface AverageProps {
  readonly range: Range;
  readonly at: (amount: number) => number;
  readonly width: number;
  readonly inner: Range | null;
  readonly level: number;
}

function Average({ range, at, width, inner, level }: AverageProps) {
  const [left, right] = [at(range.low), at(range.high)];
  const words = `average, ${levelWords(level)}: ${formatNumber(range.low)}–${formatNumber(range.high)}`;
  const stands = Math.max(right, inner === null ? 0 : at(inner.high)) + 8;
  const isRoom = stands + words.length * DIGIT < width;
  return (
    <g>
      <rect x={left} y="98" width={Math.max(1, right - left)} height="10" className="f-verd" />
      {isRoom ? (
        <>
          <path d={`M${right} 102H${stands - 3}`} className="s-verd" strokeWidth="1" />
          <text x={stands} y="105" className="t-verd halo">
            {words}
          </text>
        </>
      ) : null}
    </g>
  );
}

function Head({ figures, x, width, basis }: { figures: Figures; x: number; width: number; basis: string }) {
  const half = figures.amount.length * 5.6;
  const centre = Math.min(Math.max(x, half), width - half);
  return (
    <g>
      <text x={centre} y="20" textAnchor="middle" className="t-serif t-verd" fontSize="21">
        {figures.amount}
      </text>
      {figures.mean === null ? null : (
        <text x={centre + half + 6} y="20" className="t-soft">
          median; the mean is {figures.mean}
        </text>
      )}
      {width < 640 ? null : (
        <text x={width} y="20" textAnchor="end" className="t-soft">
          {basis}
        </text>
      )}
    </g>
  );
}
