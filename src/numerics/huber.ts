/**
 * Huber's M estimate with a scale of its own: sales far from the model count less, in proportion to k·s/|e|.
 * ψ(u) = max(−k, min(k, u)), w = min(1, k·s/|e|), s = median|e|/0.6745 taken anew at each step, without a centre
 * (Huber 1964; Huber 1981, chapter 7). k = 1.345 keeps 95 % efficiency when residuals are normal (Holland & Welsch 1977).
 * Symbols: a weights that sales have already, e residuals (n), s scale.
 */
import type { Column } from "./column.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { weightedMedian } from "./weightedMedian.ts";
import { type Frame, frameOf, largestMove, meanOf, residualsAt, weightedStep } from "./weightedSteps.ts";

export const HUBER_K = 1.345;
/** 0.75 quantile of the normal distribution, as rounded in the usual definition of the scale. */
const NORMAL_QUARTILE = 0.6745;
/** Moves this small against the scale count as none. */
const SETTLED = 1e-12;
/** Rounding may keep moves above SETTLED on columns near a dependency; below this they no longer show in ten digits. */
const NEARLY_SETTLED = 1e-10;
const MOST_STEPS = 2000;

export interface MEstimate {
  /** a·w at the last residuals, n. */
  readonly weights: Float64Array;
  /** w alone, n: 1 = counts in full, 0 = not at all. */
  readonly robustness: Float64Array;
  /** a·ψ′(e/s), n: the weights of the inner matrix in the estimate's own covariance. */
  readonly curvature: Float64Array;
  /** s; 0 when residuals are zero (to rounding), and then every w is 1. */
  readonly scale: number;
  readonly iterations: number;
  readonly hasSettled: boolean;
  /** β of the frame (weightedSteps), k + 1. */
  readonly coefficients: Float64Array;
}

export interface RobustOptions {
  readonly weights?: Float64Array | null;
  /** Raw units, k. */
  readonly penalty?: Float64Array | null;
}

/** One ψ: its weight ψ(u)/u and its slope ψ′(u), for u = e/s. */
export interface Psi {
  readonly weight: (u: number) => number;
  readonly slope: (u: number) => number;
}

export const HUBER: Psi = {
  weight: (u) => Math.min(1, HUBER_K / Math.abs(u)),
  slope: (u) => (Math.abs(u) <= HUBER_K ? 1 : 0),
};

/** Refuses shape, notFinite, tooFewRows (n ≤ k + 1 without penalties), rankDeficient. Residuals of zero (more than half of them): scale 0, and least squares stands. */
export function huberEstimate(
  columns: readonly Column[],
  response: Float64Array,
  options: RobustOptions = {},
): MEstimate {
  checkColumns([], response);
  const n = response.length;
  const count = columns.length + 1;
  if (!options.penalty && n <= count)
    throw new NumericsError("tooFewRows", `${n} rows cannot carry ${count} coefficients`);
  const frame = frameOf(columns, n, options.penalty ?? null);
  const given = options.weights ?? null;
  const start = weightedStep(frame, given, response, new Float64Array(frame.k + 1));
  return iterate(frame, response, given, start, HUBER, (residuals) => usualScale(residuals, given, response));
}

/** median|e|/0.6745; 0 when that is no more than rounding of the response. */
export function usualScale(residuals: Float64Array, weights: Float64Array | null, response: Float64Array): number {
  const scale = weightedMedian(residuals.map(Math.abs), weights) / NORMAL_QUARTILE;
  return scale > roundingOf(response) ? scale : 0;
}

/** Residuals below this are rounding, not news. */
export function roundingOf(response: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < response.length; i++) largest = Math.max(largest, Math.abs(response[i]!));
  return 64 * Number.EPSILON * largest;
}

/** Weighted steps from `start` until nothing moves by `settled` scales; `scaleOf` may hold the scale or take it anew from the residuals. */
export function iterate(
  frame: Frame,
  response: Float64Array,
  given: Float64Array | null,
  start: Float64Array,
  psi: Psi,
  scaleOf: (residuals: Float64Array) => number,
  settled = SETTLED,
): MEstimate {
  const middle = meanOf(response);
  const centred = response.map((y) => y - middle);
  const coefficients = Float64Array.from(start);
  coefficients[0]! -= middle;
  let smallest = Number.POSITIVE_INFINITY;
  let stalled = 0;
  let move = Number.POSITIVE_INFINITY;
  for (let steps = 0; ; steps++) {
    const residuals = residualsAt(frame, centred, coefficients);
    const scale = scaleOf(residuals);
    const robustness = residuals.map((e) => (scale > 0 && e !== 0 ? psi.weight(e / scale) : 1));
    const isDone = scale === 0 || move <= settled * scale || stalled > 20 || steps === MOST_STEPS;
    if (isDone) {
      const curvature = residuals.map((e, i) => (given?.[i] ?? 1) * (scale > 0 ? psi.slope(e / scale) : 1));
      const weights = times(robustness, given);
      const hasSettled = scale === 0 || smallest <= NEARLY_SETTLED * scale;
      coefficients[0]! += middle;
      return { weights, robustness, curvature, scale, iterations: steps, hasSettled, coefficients };
    }
    const step = weightedStep(frame, times(robustness, given), residuals, coefficients);
    for (let j = 0; j <= frame.k; j++) coefficients[j]! += step[j]!;
    move = largestMove(step);
    stalled = move < smallest ? 0 : smallest <= NEARLY_SETTLED * scale ? stalled + 1 : 0;
    smallest = Math.min(smallest, move);
  }
}

function times(values: Float64Array, given: Float64Array | null): Float64Array {
  return given === null ? values : values.map((v, i) => v * given[i]!);
}
