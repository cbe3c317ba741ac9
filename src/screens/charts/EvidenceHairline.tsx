/** Where a value stands in the evidence: lowest to highest, thick middle half, verdigris tick for the subject. */
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import { formatNumber } from "../../domain/format.ts";

export interface EvidenceHairlineProps {
  readonly label: string;
  readonly spread: NonNullable<AttributeEvidence["spread"]>;
  /** The subject's value; null = not known. A value beyond the evidence stands past the end, in brick. */
  readonly value: number | null;
  readonly decimals: number;
  readonly width?: number;
}

/** Room on both sides for a value beyond the evidence. */
const MARGIN = 5;

export function EvidenceHairline({ label, spread, value, decimals, width = 74 }: EvidenceHairlineProps) {
  const words = (number: number): string => formatNumber(number, decimals);
  const extent = spread.high - spread.low;
  const at = (number: number): number => {
    const share = extent > 0 ? (number - spread.low) / extent : 0.5;
    const inside = MARGIN + share * (width - 2 * MARGIN);
    return Math.min(width - 1, Math.max(1, inside));
  };
  const isBeyond = value !== null && (value < spread.low || value > spread.high);
  const isAtEdge = value !== null && !isBeyond && extent > 0 && (value === spread.low || value === spread.high);
  const place = value === null ? "not known" : `${words(value)}${isBeyond ? ", beyond the evidence" : ""}`;
  const sentence = `${label}: evidence from ${words(spread.low)} to ${words(spread.high)}, middle half ${words(spread.q1)} to ${words(spread.q3)}; this item ${place}`;
  const tick = isBeyond ? "s-brick" : isAtEdge ? "s-brass" : "s-verd";
  return (
    <svg width={width} height="14" role="img" aria-label={sentence}>
      <title>{sentence}</title>
      <path
        d={`M${at(spread.low)} 4v6M${at(spread.high)} 4v6M${at(spread.low)} 7H${at(spread.high)}`}
        className="s-edge f-none"
        strokeWidth="1"
      />
      <path d={`M${at(spread.q1)} 7H${at(spread.q3)}`} className="s-mid" strokeWidth="4" />
      {value === null ? null : <path d={`M${at(value)} 1V13`} className={tick} strokeWidth="2.4" />}
    </svg>
  );
}
