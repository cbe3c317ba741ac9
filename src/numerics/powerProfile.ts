/**
 * Which power of the response suits a straight model: the profile of the normal log-likelihood (Box & Cox 1964). With g the
 * geometric mean and u = y/g, the response becomes (u^λ − 1)/λ (ln u at 0), whose residual sum of squares compares directly:
 * ℓ(λ) = −(n/2)·ln(RSS(λ)/n). The interval holds every λ with ℓ ≥ ℓ_max − χ²₁(0.95)/2.
 */

import { solveByRoot } from "./choleskyFactor.ts";
import type { Column } from "./column.ts";
import { findRoot } from "./findRoot.ts";
import { goldenSection } from "./goldenSection.ts";
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
  const [from, to] = [powers[Math.max(0, top - 1)]!, powers[Math.min(CURVE_STEPS, top + 1)]!];
  const best = goldenSection((power) => -at(power), from, to, 1e-7);
  const most = Math.max(at(best), values[top]!);
  const above = (power: number) => at(power) - most + HALF_CHI_SQUARE;
  return {
    curve: powers.map((power, step) => ({ power, logLikelihood: values[step]! - most })),
    best,
    low: above(LOWEST_POWER) >= 0 ? null : findRoot(above, LOWEST_POWER, best, 1e-10),
    high: above(HIGHEST_POWER) >= 0 ? null : findRoot(above, HIGHEST_POWER, best, 1e-10),
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

/**
 * ℓ(λ) up to a constant; very large, but a number, when the residuals are zero. One step is enough: near its minimum the residual sum of
 * squares errs by the square of what the coefficients err by.
 */
function logLikelihood({ frame, root, weights, logs }: Profile, power: number): number {
  const v = power === 0 ? logs : logs.map((log) => Math.expm1(power * log) / power);
  const residuals = residualsAt(frame, v, solveByRoot(root, productsWith(frame, weights, v)));
  let rss = Number.MIN_VALUE;
  for (let i = 0; i < residuals.length; i++) rss += (weights === null ? 1 : weights[i]!) * residuals[i]! ** 2;
  return (-logs.length / 2) * Math.log(rss / logs.length);
}
