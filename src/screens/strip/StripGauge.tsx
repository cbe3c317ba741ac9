/** The price strip's ruler. While a move is shown the ruler stays as it was, so that the eye can compare. */
import { useRef } from "react";
import type { PriceEstimate, Range } from "../../domain/appraisal.ts";
import { formatNumber, roundOutward } from "../../domain/format.ts";
import { priceStep } from "../charts/figures.ts";
import { gaugeWords } from "../charts/RangeGauge.tsx";
import { holds, placeOn, type Ruler, rangeAt, rulerAround, shortAmount, ticksOf } from "../charts/ruler.ts";
import { useWidth } from "../charts/useWidth.ts";
import type { PriceMove } from "../workbench/workbench.ts";
import css from "./PriceStrip.module.css";

interface StripGaugeProps {
  readonly price: PriceEstimate;
  readonly move: PriceMove | null;
  readonly level: number;
  readonly currencyCode: string;
}

const HEIGHT = 68;
const LINE = 44;
const INNER_LEVEL = 0.5;
/** A range that fills less of the ruler than this, with no move shown, gets a ruler of its own. */
const SMALLEST_SHARE = 0.45;

/** Keeps `kept` while it still holds everything shown; else a new ruler around all of it. */
export function keepRuler(kept: Ruler | null, shown: readonly Range[], isMoving: boolean): Ruler {
  if (kept === null || shown.length === 0) return rulerAround(shown, 0.3);
  const isSensible =
    isMoving || shown.some((range) => range.high - range.low > SMALLEST_SHARE * (kept.high - kept.low));
  return isSensible && holds(kept, shown) ? kept : rulerAround(shown, 0.3);
}

export function StripGauge({ price, move, level, currencyCode }: StripGaugeProps) {
  const { box, width } = useWidth<HTMLDivElement>(620);
  const kept = useRef<Ruler | null>(null);
  const now = rangeAt(price.rangeForOneSale, level);
  const before = move === null ? null : rangeAt(move.fromRanges, level);
  const shown = [now, before].filter((range) => range !== null);
  const point = { level, low: price.amount * 0.9, high: price.amount * 1.1 };
  kept.current = keepRuler(kept.current, shown.length > 0 ? shown : [point], move !== null);
  const ruler = kept.current;
  const at = placeOn(ruler, width);
  return (
    <div ref={box} className={css.gauge}>
      <svg width={width} height={HEIGHT} role="img" aria-label={gaugeWords(price, level, currencyCode)}>
        <Scale ruler={ruler} width={width} />
        {before === null || move === null ? null : <Before range={before} amount={move.from} at={at} />}
        <Now price={price} level={level} at={at} width={width} isMoving={before !== null} />
      </svg>
    </div>
  );
}

function Scale({ ruler, width }: { ruler: Ruler; width: number }) {
  const length = [3, 6, 9] as const;
  return (
    <g>
      <path d={`M0 ${LINE}H${width}`} className="s-ink" strokeWidth="1" />
      {ticksOf(ruler, width, 110).map((tick) => (
        <g key={tick.amount}>
          <path d={`M${tick.at} ${LINE}v${length[tick.rank]}`} className="s-edge" strokeWidth="1" />
          {tick.rank === 2 && tick.at > 12 && tick.at < width - 12 ? (
            <text x={tick.at} y={LINE + 19} textAnchor="middle" className="t-soft t-scale">
              {shortAmount(tick.amount)}
            </text>
          ) : null}
        </g>
      ))}
    </g>
  );
}

function Before({ range, amount, at }: { range: Range; amount: number; at: (amount: number) => number }) {
  return (
    <g>
      <path
        d={`M${at(range.low)} ${LINE - 1}V24H${at(range.high)}V${LINE - 1}`}
        className="s-brass f-none"
        strokeWidth="1.2"
        strokeDasharray="3 3"
      />
      <path d={`M${at(amount)} 26V${LINE}`} className="s-brass" strokeWidth="1.2" strokeDasharray="3 3" />
    </g>
  );
}

interface NowProps {
  readonly price: PriceEstimate;
  readonly level: number;
  readonly at: (amount: number) => number;
  readonly width: number;
  /** The former bracket is drawn too, so words keep above it. */
  readonly isMoving: boolean;
}

function Now({ price, level, at, width, isMoving }: NowProps) {
  const outer = rangeAt(price.rangeForOneSale, level);
  const inner = level === INNER_LEVEL ? null : rangeAt(price.rangeForOneSale, INNER_LEVEL);
  const average = rangeAt(price.rangeForAverage, level);
  const words = outer === null ? null : roundOutward(outer, priceStep(price));
  const [left, right] = outer === null ? [0, 0] : [at(outer.low), at(outer.high)];
  return (
    <g>
      {outer === null ? null : (
        <path d={`M${left} ${LINE - 1}V14H${right}V${LINE - 1}`} className="s-ink f-none" strokeWidth="1.2" />
      )}
      {inner === null ? null : (
        <path
          d={`M${at(inner.low)} ${LINE - 1}V32H${at(inner.high)}V${LINE - 1}`}
          className="s-verd f-vwash"
          strokeWidth="1.4"
        />
      )}
      {average === null ? null : (
        <rect
          x={at(average.low)}
          y="39"
          width={Math.max(1, at(average.high) - at(average.low))}
          height="5"
          className="f-verd"
        />
      )}
      <path d={`M${at(price.amount)} 10V48`} className="s-verd" strokeWidth="2.4" />
      {words === null ? null : (
        <>
          <EndWords x={left} isRoom={!isMoving && left > 48} side="low" amount={words.low} />
          <EndWords x={right} isRoom={!isMoving && width - right > 48} side="high" amount={words.high} />
        </>
      )}
    </g>
  );
}

/** Beside the bracket where there is room, else above its corner. */
function EndWords(props: { x: number; isRoom: boolean; side: "low" | "high"; amount: number }) {
  const { x, isRoom, side, amount } = props;
  const isLow = side === "low";
  const anchor = isRoom === isLow ? "end" : "start";
  return (
    <text x={isRoom ? x + (isLow ? -6 : 6) : x} y={isRoom ? 23 : 10} textAnchor={anchor}>
      {formatNumber(amount)}
    </text>
  );
}
