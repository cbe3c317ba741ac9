/**
 * The evidence hairline as a filter: lowest to highest, thick middle half, and a handle at each end that is dragged inwards. A mouse's
 * short cut: the same two numbers are fields under "Narrow", so this is left out for a screen reader.
 */
import { type PointerEvent, useState } from "react";
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import css from "./Register.module.css";

export interface RangeHandlesProps {
  readonly spread: NonNullable<AttributeEvidence["spread"]>;
  readonly decimals: number;
  readonly low: number | null;
  readonly high: number | null;
  readonly width: number;
  readonly onChange: (range: { low: number | null; high: number | null }) => void;
}

const EDGE = 3;

export function RangeHandles({ spread, decimals, low, high, width, onChange }: RangeHandlesProps) {
  const [dragged, setDragged] = useState<{ end: "low" | "high"; value: number } | null>(null);
  const extent = spread.high - spread.low;
  const at = (value: number): number =>
    EDGE + (extent > 0 ? Math.min(1, Math.max(0, (value - spread.low) / extent)) : 0.5) * (width - 2 * EDGE);
  const shown = {
    low: dragged?.end === "low" ? dragged.value : (low ?? spread.low),
    high: dragged?.end === "high" ? dragged.value : (high ?? spread.high),
  };
  const valueUnder = (event: PointerEvent<SVGSVGElement>): number => {
    const box = event.currentTarget.getBoundingClientRect();
    const share = Math.min(1, Math.max(0, (event.clientX - box.left - EDGE) / (width - 2 * EDGE)));
    return Number((spread.low + share * extent).toFixed(decimals));
  };
  const start = (event: PointerEvent<SVGSVGElement>): void => {
    const value = valueUnder(event);
    const end = Math.abs(value - shown.low) < Math.abs(value - shown.high) ? "low" : "high";
    event.currentTarget.setPointerCapture(event.pointerId);
    setDragged({ end, value });
  };
  const drop = (event: PointerEvent<SVGSVGElement>): void => {
    if (dragged === null) return;
    const value = valueUnder(event);
    setDragged(null);
    if (dragged.end === "low") onChange({ low: value <= spread.low ? null : Math.min(value, shown.high), high });
    else onChange({ low, high: value >= spread.high ? null : Math.max(value, shown.low) });
  };
  const isNarrowed = shown.low > spread.low || shown.high < spread.high;
  return (
    <svg
      width={width}
      height="14"
      aria-hidden="true"
      className={css.handles}
      onPointerDown={start}
      onPointerMove={(event) => {
        if (dragged !== null) setDragged({ ...dragged, value: valueUnder(event) });
      }}
      onPointerUp={drop}
      onPointerCancel={() => setDragged(null)}
    >
      <rect width={width} height="14" className="f-none" pointerEvents="all" />
      <path d={`M${EDGE} 7H${width - EDGE}`} className="s-edge" />
      <path d={`M${at(spread.q1)} 7H${at(spread.q3)}`} className="s-mid" strokeWidth="4" />
      {isNarrowed ? <path d={`M${at(shown.low)} 7H${at(shown.high)}`} className="s-verd" strokeWidth="1.6" /> : null}
      <path d={`M${at(shown.low)} 2v10M${at(shown.high)} 2v10`} className="s-verd" strokeWidth="2.4" />
    </svg>
  );
}
