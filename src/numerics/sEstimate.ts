/**
 * The S estimate: coefficients that make the M scale of the residuals least, so that nearly half of the sales may be wrong
 * (Rousseeuw & Yohai 1984). Looked for from random exact fits, two concentration steps each, the best few carried on to their end
 * (Salibian-Barrera & Yohai 2006). Symbols: β (k + 1), e (n), s the M scale with Σ ρ(e/s) = (n − p)/2.
 */
import { BREAKDOWN_C, bisquare, bisquareLoss, mScale } from "./bisquare.ts";
import { indicator, isIndicator } from "./column.ts";
import { elementalSubset } from "./elementalSubset.ts";
import { iterate, roundingOf, usualScale } from "./huber.ts";
import { NumericsError } from "./numericsError.ts";
import { seededRandom, shuffled } from "./seededRandom.ts";
import { type Frame, residualsAt, weightedStep } from "./weightedSteps.ts";

const STARTS = 500;
const CONCENTRATION_STEPS = 2;
const CARRIED_ON = 5;
/** Moves of this many scales tell which candidate is best: the scale itself errs by their square. */
const NEARLY_THERE = 1e-4;
/** From more rows than this the search runs on a random part of this size, and its best is carried on over all rows. */
export const SEARCH_ROWS = 2000;

export interface SEstimate {
  /** β of the frame, k + 1. */
  readonly coefficients: Float64Array;
  readonly scale: number;
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
  const ends = candidates(part, draw).map((start) =>
    concentrate(part.frame, part.response, part.weights, start, NEARLY_THERE),
  );
  const best = ends.reduce<SEstimate | null>(
    (least, end) => (end !== null && (least === null || end.scale < least.scale) ? end : least),
    null,
  );
  return best && concentrate(frame, response, weights, best.coefficients);
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
  settled?: number,
): SEstimate | null {
  const rounding = roundingOf(response);
  let last = 0;
  try {
    const end = iterate(
      frame,
      response,
      weights,
      start,
      bisquare(BREAKDOWN_C),
      (residuals) => {
        const usual = usualScale(residuals, weights, response);
        last = usual === 0 && last === 0 ? 0 : mScale(residuals, weights, frame.k + 1, last || usual);
        last = last > rounding ? last : 0;
        return last;
      },
      settled,
    );
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
