/**
 * One ledger row as a picture: own part in the first lane, then each carried part where the last ended, one lane each, to the
 * ink tick that is the coefficient. Never stacked in one lane: parts of opposite sign would hide each other.
 */
import { niceStep } from "../../domain/format.ts";

export const LANE_PATTERNS = ["own", "first", "second"] as const;
const FILLS = ["var(--slate)", "url(#carried-first)", "url(#carried-second)"] as const;
const EDGES = ["s-slate", "s-brass", "s-slate"] as const;
const LANE = [4, 12, 20] as const;
export const BARS_HEIGHT = 30;

export interface BarScale {
  readonly low: number;
  readonly high: number;
  readonly width: number;
}

export function barAt(scale: BarScale, amount: number): number {
  const extent = scale.high - scale.low || 1;
  return Math.round((6 + ((amount - scale.low) / extent) * (scale.width - 12)) * 10) / 10;
}

/** A scale that holds every running total of every row, and zero. */
export function barScale(rows: readonly (readonly number[])[], width: number): BarScale {
  let [low, high] = [0, 0];
  for (const parts of rows) {
    let stands = 0;
    for (const part of parts) {
      stands += part;
      low = Math.min(low, stands);
      high = Math.max(high, stands);
    }
  }
  return { low, high, width };
}

/** Round amounts for the axis, about one in 60 pixels, zero among them. */
export function barTicks(scale: BarScale): number[] {
  const extent = scale.high - scale.low;
  if (!(extent > 0)) return [0];
  const fitting = Math.max(2, Math.floor(scale.width / 62));
  let step = niceStep(extent / fitting);
  while (extent / step > fitting) step *= 2;
  const ticks: number[] = [];
  for (let k = Math.ceil(scale.low / step - 1e-9); k * step <= scale.high + 1e-9; k++) ticks.push(k * step);
  return ticks;
}

/** Hatch and dots of the carried lanes: once on the page that uses them. */
export function LanePatterns() {
  return (
    <svg width="0" height="0" style={{ position: "absolute" }} aria-hidden="true">
      <defs>
        <pattern id="carried-first" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width="5" height="5" fill="var(--raised)" />
          <path d="M0 0V5" stroke="var(--brass)" strokeWidth="3.4" />
        </pattern>
        <pattern id="carried-second" width="4" height="4" patternUnits="userSpaceOnUse">
          <rect width="4" height="4" fill="var(--raised)" />
          <rect width="2" height="2" fill="var(--slate)" />
          <rect x="2" y="2" width="2" height="2" fill="var(--slate)" />
        </pattern>
      </defs>
    </svg>
  );
}

/** The mark of a lane in a legend. */
export function LaneKey({ lane }: { lane: 0 | 1 | 2 }) {
  return (
    <svg width="14" height="8" style={{ display: "inline-block", marginRight: 5 }} aria-hidden="true">
      <rect x=".4" y=".4" width="13.2" height="7.2" fill={FILLS[lane]} className={EDGES[lane]} strokeWidth=".8" />
    </svg>
  );
}

export interface CarryOverBarsProps {
  /** Own part first, then at most two carried parts; their sum is the coefficient. */
  readonly parts: readonly number[];
  readonly scale: BarScale;
  /** The row in words. */
  readonly label: string;
}

export function CarryOverBars({ parts, scale, label }: CarryOverBarsProps) {
  const ends = parts.map((_, index) => parts.slice(0, index + 1).reduce((sum, part) => sum + part, 0));
  const total = barAt(scale, ends[ends.length - 1] ?? 0);
  return (
    <svg width={scale.width} height={BARS_HEIGHT} role="img" aria-label={label}>
      <path d={`M${barAt(scale, 0)} 0V${BARS_HEIGHT}`} className="s-edge" />
      {parts.slice(0, LANE.length).map((_, index) => {
        const from = barAt(scale, index === 0 ? 0 : ends[index - 1]!);
        const to = barAt(scale, ends[index]!);
        const hasNext = index + 1 < parts.length;
        return (
          <g key={LANE_PATTERNS[index]}>
            <rect
              x={Math.min(from, to)}
              y={LANE[index]}
              width={Math.max(0.8, Math.abs(to - from))}
              height="6"
              fill={FILLS[index]}
              className={index === 0 ? undefined : EDGES[index]}
              strokeWidth=".8"
            />
            {hasNext ? <path d={`M${to} ${LANE[index]}v14`} className={EDGES[index]} strokeWidth="1" /> : null}
          </g>
        );
      })}
      <path d={`M${total} 1V29`} className="s-ink" strokeWidth="2.4" />
    </svg>
  );
}
