/**
 * Which power of the response suits a straight model: the profile of the normal log-likelihood (Box & Cox 1964). With g the
 * geometric mean and u = y/g, the response becomes (u^λ − 1)/λ (ln u at 0), whose residual sum of squares compares directly:
 * ℓ(λ) = −(n/2)·ln(RSS(λ)/n). The interval holds every λ with ℓ ≥ ℓ_max − χ²₁(0.95)/2.
 */

import { solveByRoot } from "./choleskyFactor.ts";
import type { Column } from "./column.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { type Frame, frameOf, productsWith, residualsAt, rootOf, weightedProducts } from "./weightedSteps.ts";

export interface PowerProfile {
  /** From −2 to 2 in tenths; ℓ less its maximum. */
  readonly curve: readonly { readonly power: number; readonly logLikelihood: number }[];
  readonly best: number;
  /** 95 %; null where the interval goes on beyond −2 or 2. */
  readonly low: number | null;
  readonly high: number | null;
}

export const LOWEST_POWER = -2;
export const HIGHEST_POWER = 2;
const CURVE_STEPS = 40;
/** χ²₁ at 0.95, halved: 3.841458820694124/2. */
const HALF_CHI_SQUARE = 1.920729410347062;

interface Profile {
  readonly frame: Frame;
  readonly root: Float64Array;
  readonly weights: Float64Array | null;
  /** ln(y/g), n. */
  readonly logs: Float64Array;
}

/** Refuses: shape, notFinite, tooFewRows (n ≤ p), rankDeficient, and (notFinite) a response that is not above zero. */
export function profilePower(
  columns: readonly Column[],
  response: Float64Array,
  options: { weights?: Float64Array | null; penalty?: Float64Array | null } = {},
): PowerProfile {
  const profile = prepare(columns, response, options);
  const at = (power: number) => logLikelihood(profile, power);
  const powers = Array.from({ length: CURVE_STEPS + 1 }, (_, step) => (step - CURVE_STEPS / 2) / 10);
  const values = powers.map(at);
  const top = values.reduce((most, value, step) => (value > values[most]! ? step : most), 0);
  const best = highestBetween(at, powers[Math.max(0, top - 1)]!, powers[Math.min(CURVE_STEPS, top + 1)]!);
  const most = Math.max(at(best), values[top]!);
  const cut = most - HALF_CHI_SQUARE;
  return {
    curve: powers.map((power, step) => ({ power, logLikelihood: values[step]! - most })),
    best,
    low: at(LOWEST_POWER) >= cut ? null : crossing(at, cut, LOWEST_POWER, best),
    high: at(HIGHEST_POWER) >= cut ? null : crossing(at, cut, HIGHEST_POWER, best),
  };
}

function prepare(
  columns: readonly Column[],
  response: Float64Array,
  options: { weights?: Float64Array | null; penalty?: Float64Array | null },
): Profile {
  checkColumns([], response);
  const n = response.length;
  if (n <= columns.length + 1) throw new NumericsError("tooFewRows", `${n} rows leave no residuals to judge by`);
  if (response.some((y) => y <= 0)) throw new NumericsError("notFinite", "powers ask for a response above zero", [-1]);
  const lnResponse = response.map(Math.log);
  const geometric = lnResponse.reduce((sum, value) => sum + value, 0) / n;
  const weights = options.weights ?? null;
  const frame = frameOf(columns, n, options.penalty ?? null, { weights });
  const logs = lnResponse.map((value) => value - geometric);
  const { matrix } = weightedProducts(frame, weights, logs);
  return { frame, root: rootOf(matrix, frame.k + 1), weights, logs };
}

/** ℓ(λ) up to a constant; +Infinity when the residuals are zero to rounding. */
function logLikelihood({ frame, root, weights, logs }: Profile, power: number): number {
  const v = power === 0 ? logs : logs.map((log) => Math.expm1(power * log) / power);
  const q = frame.k + 1;
  const coefficients = new Float64Array(q);
  let residuals = v;
  for (let pass = 0; pass < 2; pass++) {
    const vector = productsWith(frame, weights, residuals);
    for (let j = 0; j < q; j++) vector[j]! -= frame.penalty[j]! * coefficients[j]!;
    const step = solveByRoot(root, vector);
    for (let j = 0; j < q; j++) coefficients[j]! += step[j]!;
    residuals = residualsAt(frame, v, coefficients);
  }
  let rss = 0;
  for (let i = 0; i < residuals.length; i++) rss += (weights === null ? 1 : weights[i]!) * residuals[i]! ** 2;
  return (-logs.length / 2) * Math.log(rss / logs.length);
}

/** The maximum of a curve with one top between two powers, by thirds. */
function highestBetween(at: (power: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  while (b - a > 1e-7) {
    const third = (b - a) / 3;
    if (at(a + third) >= at(b - third)) b -= third;
    else a += third;
  }
  return (a + b) / 2;
}

/** Where ℓ passes `cut` between a power outside the interval and one inside, by halving. */
function crossing(at: (power: number) => number, cut: number, outside: number, inside: number): number {
  let out = outside;
  let within = inside;
  while (Math.abs(within - out) > 1e-9) {
    const middle = (out + within) / 2;
    if (at(middle) >= cut) within = middle;
    else out = middle;
  }
  return within;
}
