/**
 * MM: an S estimate that stands even if nearly half of the sales are wrong, then an M step from it at 95 % efficiency and at its
 * scale, both with the bisquare (Yohai 1987). The S estimate makes the M scale of the residuals least (Rousseeuw & Yohai
 * 1984); it is looked for from random exact fits, two concentration steps each, the best carried on to their end
 * (Salibian-Barrera & Yohai 2006). Searches run from fixed seeds, at most five, until two of them end at the least scale.
 * Symbols: β (k + 1), e (n), s the S scale with Σ ρ(e/s) = (n − p)/2.
 */
import { BREAKDOWN_C, bisquare, bisquareLoss, EFFICIENT_C, mScale } from "./bisquare.ts";
import { type Column, indicator, isIndicator } from "./column.ts";
import { elementalSubset } from "./elementalSubset.ts";
import { iterate, type MEstimate, type RobustOptions, roundingOf, usualScale } from "./huber.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { seededRandom, shuffled } from "./seededRandom.ts";
import { type Frame, frameOf, residualsAt, weightedStep } from "./weightedSteps.ts";

/** The seeds of the searches: any numbers do, but they stay these, so that the same sales give the same bits. */
export const SEARCH_SEEDS = [20061129, 19870601, 19840712, 20170304, 19740215] as const;
const STARTS = 500;
const CONCENTRATION_STEPS = 2;
const CARRIED_ON = 5;
/** From more rows than this the search runs on a random part of this size, and its best is carried on over all rows. */
export const SEARCH_ROWS = 2000;
/** Two searches have ended alike when their scales agree this well. */
const ALIKE = 1e-8;

export interface SEstimate {
  /** β of the frame, k + 1. */
  readonly coefficients: Float64Array;
  readonly scale: number;
}

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

/** The best S estimate that the starts of one seed lead to, or null when none could be finished. */
export function sEstimate(
  frame: Frame,
  response: Float64Array,
  weights: Float64Array | null,
  seed: number,
): SEstimate | null {
  const draw = seededRandom(seed);
  const part = searchPart(frame, response, weights, draw);
  if (part === null) return null;
  const ends = candidates(part, draw).map((start) => concentrate(part.frame, part.response, part.weights, start));
  const best = ends.reduce<SEstimate | null>(
    (least, end) => (end !== null && (least === null || end.scale < least.scale) ? end : least),
    null,
  );
  return best === null || part.frame === frame ? best : concentrate(frame, response, weights, best.coefficients);
}

interface SearchPart {
  readonly frame: Frame;
  readonly response: Float64Array;
  readonly weights: Float64Array | null;
}

/** All rows, or SEARCH_ROWS of them among which every column can be told apart. */
function searchPart(
  frame: Frame,
  response: Float64Array,
  weights: Float64Array | null,
  draw: (below: number) => number,
): SearchPart | null {
  if (frame.n <= SEARCH_ROWS) return { frame, response, weights };
  const order = shuffled(frame.n, draw);
  const needed = elementalSubset(frame, response, order);
  if (needed === null) return null;
  const rows = Int32Array.from([...new Set([...needed.rows, ...order.subarray(0, SEARCH_ROWS)])].slice(0, SEARCH_ROWS));
  const columns = frame.columns.map((column) =>
    isIndicator(column)
      ? indicator(
          Uint16Array.from(rows, (i) => column.codes[i]!),
          column.level,
        )
      : Float64Array.from(rows, (i) => column[i]!),
  );
  return {
    frame: { ...frame, n: rows.length, columns },
    response: Float64Array.from(rows, (i) => response[i]!),
    weights: weights && Float64Array.from(rows, (i) => weights[i]!),
  };
}

/** The best of all starts after their concentration steps, best first. */
function candidates({ frame, response, weights }: SearchPart, draw: (below: number) => number): Float64Array[] {
  const p = frame.k + 1;
  const total = weights?.reduce((sum, a) => sum + a, 0) ?? frame.n;
  const target = (0.5 * total * (frame.n - p)) / frame.n;
  const kept: SEstimate[] = [];
  for (let start = 0; start < STARTS; start++) {
    const subset = elementalSubset(frame, response, shuffled(frame.n, draw));
    const ended = subset && fewSteps(frame, response, weights, subset.coefficients);
    if (!ended) continue;
    const worst = kept.length === CARRIED_ON ? kept[CARRIED_ON - 1]!.scale : Number.POSITIVE_INFINITY;
    const { residuals, coefficients } = ended;
    if (worst < Number.POSITIVE_INFINITY && lossOf(residuals, weights, worst) >= target) continue;
    const scale = mScale(residuals, weights, p, usualScale(residuals, weights, response) || roundingOf(response) || 1);
    kept.push({ coefficients, scale });
    kept.sort((a, b) => a.scale - b.scale);
    kept.length = Math.min(kept.length, CARRIED_ON);
  }
  return kept.map((one) => one.coefficients);
}

/** Two weighted steps with the scale moved once at each; null where the rows left do not tell the columns apart. */
function fewSteps(
  frame: Frame,
  response: Float64Array,
  weights: Float64Array | null,
  start: Float64Array,
): { residuals: Float64Array; coefficients: Float64Array } | null {
  const { weight } = bisquare(BREAKDOWN_C);
  const coefficients = Float64Array.from(start);
  let residuals = residualsAt(frame, response, coefficients);
  let scale = usualScale(residuals, weights, response);
  const total = weights?.reduce((sum, a) => sum + a, 0) ?? frame.n;
  for (let steps = 0; steps < CONCENTRATION_STEPS && scale > 0; steps++) {
    scale *= Math.sqrt((2 * lossOf(residuals, weights, scale)) / total);
    const now = residuals.map((e, i) => (weights?.[i] ?? 1) * weight(e / scale));
    const step = stepOrNull(frame, now, residuals, coefficients);
    if (step === null) return null;
    for (let j = 0; j <= frame.k; j++) coefficients[j]! += step[j]!;
    residuals = residualsAt(frame, response, coefficients);
  }
  return { residuals, coefficients };
}

/** Weighted steps at the M scale of each step's residuals until nothing moves; null where columns fall together. */
function concentrate(
  frame: Frame,
  response: Float64Array,
  weights: Float64Array | null,
  start: Float64Array,
): SEstimate | null {
  const rounding = roundingOf(response);
  let last = 0;
  try {
    const end = iterate(frame, response, weights, start, bisquare(BREAKDOWN_C), (residuals) => {
      const usual = usualScale(residuals, weights, response);
      last = usual === 0 && last === 0 ? 0 : mScale(residuals, weights, frame.k + 1, last || usual);
      last = last > rounding ? last : 0;
      return last;
    });
    return { coefficients: end.coefficients, scale: end.scale };
  } catch (cause) {
    if (cause instanceof NumericsError && cause.code === "rankDeficient") return null;
    throw cause;
  }
}

function stepOrNull(frame: Frame, weights: Float64Array, residuals: Float64Array, coefficients: Float64Array) {
  try {
    return weightedStep(frame, weights, residuals, coefficients);
  } catch (cause) {
    if (cause instanceof NumericsError && cause.code === "rankDeficient") return null;
    throw cause;
  }
}

function lossOf(residuals: Float64Array, weights: Float64Array | null, scale: number): number {
  let loss = 0;
  for (let i = 0; i < residuals.length; i++) {
    loss += (weights === null ? 1 : weights[i]!) * bisquareLoss(residuals[i]! / scale, BREAKDOWN_C);
  }
  return loss;
}
