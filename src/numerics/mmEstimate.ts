/**
 * MM: an S estimate that stands even if nearly half of the sales are wrong, then an M step from it at 95 % efficiency and at its
 * scale, both with the bisquare (Yohai 1987). The S estimate makes the M scale of the residuals least (Rousseeuw & Yohai
 * 1984); it is looked for from random exact fits, two concentration steps each, the best carried on to their end
 * (Salibian-Barrera & Yohai 2006). Searches run from fixed seeds, at most five, until two of them end at the least scale.
 * Symbols: β (k + 1), e (n), s the S scale with Σ ρ(e/s) = (n − p)/2.
 */
import { bisquare, EFFICIENT_C } from "./bisquare.ts";
import type { Column } from "./column.ts";
import { iterate, type MEstimate, type RobustOptions, roundingOf } from "./huber.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { type SEstimate, sEstimate } from "./sEstimate.ts";
import { type Frame, frameOf, residualsAt } from "./weightedSteps.ts";

/** The seeds of the searches: any numbers do, but they stay these, so that the same sales give the same bits. */
export const SEARCH_SEEDS = [20061129, 19870601, 19840712, 20170304, 19740215] as const;
/** Two searches have ended alike when their scales agree this well. */
const ALIKE = 1e-8;

export interface MmEstimate extends MEstimate {
  readonly sCoefficients: Float64Array;
  /** Whether two searches ended at the least S scale. */
  readonly isReproduced: boolean;
}

/**
 * Refuses: tooFewRows (n < 2(k + 1) + 1); rankDeficient when no search could be finished, because a column hangs on so few
 * rows that a fit which sets those rows aside cannot tell it from the others.
 * More than half of the residuals zero: scale 0, weight 1 for these and 0 for the others.
 */
export function mmEstimate(
  columns: readonly Column[],
  response: Float64Array,
  options: RobustOptions = {},
): MmEstimate {
  checkColumns([], response);
  const n = response.length;
  const p = columns.length + 1;
  if (n < 2 * p + 1) throw new NumericsError("tooFewRows", `${n} rows are too few to set half of them aside`);
  const frame = frameOf(columns, n, null);
  const given = options.weights ?? null;
  const { best, isReproduced } = searchAll(frame, response, given);
  if (best === null) {
    throw new NumericsError("rankDeficient", "some columns hang on too few rows for rows to be set aside");
  }
  const last =
    best.scale > 0
      ? iterate(frame, response, given, best.coefficients, bisquare(EFFICIENT_C), () => best.scale)
      : exactFit(frame, response, given, best.coefficients);
  return { ...last, sCoefficients: best.coefficients, isReproduced };
}

/** The least S estimate; searches stop as soon as two have ended at it. */
function searchAll(
  frame: Frame,
  response: Float64Array,
  given: Float64Array | null,
): { best: SEstimate | null; isReproduced: boolean } {
  let best: SEstimate | null = null;
  const scales: number[] = [];
  for (const seed of SEARCH_SEEDS) {
    const end = sEstimate(frame, response, given, seed);
    if (end === null) continue;
    scales.push(end.scale);
    if (best === null || end.scale < best.scale) best = end;
    const least = best.scale;
    if (scales.filter((scale) => scale - least <= ALIKE * least).length >= 2) return { best, isReproduced: true };
  }
  return { best, isReproduced: false };
}

/** More than half of the rows lie on one plane: they count in full and the others not at all. */
function exactFit(
  frame: Frame,
  response: Float64Array,
  given: Float64Array | null,
  coefficients: Float64Array,
): MEstimate {
  const rounding = roundingOf(response);
  const robustness = residualsAt(frame, response, coefficients).map((e) => (Math.abs(e) <= rounding ? 1 : 0));
  const weights = given === null ? robustness : robustness.map((w, i) => w * given[i]!);
  return { weights, robustness, curvature: weights, scale: 0, iterations: 0, hasSettled: true, coefficients };
}
