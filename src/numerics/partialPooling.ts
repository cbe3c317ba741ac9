/**
 * Partial pooling: the levels of a choice are taken as draws around their mean, so that a level with few sales is drawn towards
 * it and one with many hardly (empirical Bayes; Robinson 1991). Every level has its own column and a penalty λ = σ²/τ² on it;
 * the intercept has none, so that at the least the levels' effects sum to zero: they are drawn to the mean over the levels.
 * λ by restricted maximum likelihood (Patterson & Thompson 1971) through Henderson's matrix C = [X Z]′W[X Z] + Λ (1950):
 * −2ℓ = (n − p)·ln(RSS_λ/(n − p)) + ln|C| − Σ_a q_a ln λ_a; its slope in ln λ_a is (n − p)·λ_a u_a′u_a/RSS_λ + λ_a tr(C⁻¹)_aa − q_a.
 * Symbols: p columns without λ (the intercept too), q_a levels of choice a, u_a their effects, RSS_λ = Σ we² + Σ λ u².
 */
import { choleskyFactor, invertUpper } from "./choleskyFactor.ts";
import type { Column } from "./column.ts";
import { findRoot } from "./findRoot.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { type Frame, frameOf, weightedProducts } from "./weightedSteps.ts";

export interface PooledGroup {
  /** Column numbers of all levels of one choice. */
  readonly columns: readonly number[];
  /** λ = σ²/τ²; very large (NO_DIFFERENCE) when the levels do not differ by more than chance. */
  readonly penalty: number;
  /** τ, in response units: how far levels lie from their mean. */
  readonly spread: number;
}

export interface Pooling {
  readonly groups: readonly PooledGroup[];
  /** σ² = RSS_λ/(n − p). */
  readonly residualVariance: number;
  /** Whether λ stopped moving (several choices are found in turn). */
  readonly hasSettled: boolean;
}

/** λ of this many times all sales' weight leaves nothing of the levels in nine digits: what stands for τ = 0. */
export const NO_DIFFERENCE = 1e9;
/** From this many times all sales' weight on, −2ℓ is flat to rounding and τ counts as 0. */
const NEARLY_NO_DIFFERENCE = 1e6;
/** λ below this leaves the levels as they are to nine digits. */
const NO_POOLING = 1e-9;
/** Cells that the range of ln λ is looked at in. */
const GRID_STEPS = 48;
const MOST_ROUNDS = 100;
/** What stands for RSS_λ, against the response's own sum of squares, where rounding leaves none. */
const FITTED_EXACTLY = 1e-13;

/** Products of the columns and the response; everything else follows from these. */
interface Products {
  readonly frame: Frame;
  readonly q: number;
  /** (k + 2)²: ones, columns, response. */
  readonly matrix: Float64Array;
  readonly degrees: number;
  readonly totalWeight: number;
}

/** A fit at some λ. */
interface Solved {
  readonly inverseDiagonal: Float64Array;
  readonly coefficients: Float64Array;
  readonly rss: number;
  readonly logDeterminant: number;
}

/**
 * λ of each group of level columns; `penalty` (k, raw) stands on the other columns besides.
 * Refuses: tooFewRows (no residual degrees of freedom beside the unpooled columns); rankDeficient (those columns depend).
 * Balanced one-way: λ = σ̂²/τ̂² with σ̂² = MS within, τ̂² = (MS between − MS within)/m, m sales per level.
 */
export function poolLevels(
  columns: readonly Column[],
  response: Float64Array,
  groups: readonly (readonly number[])[],
  options: { weights?: Float64Array | null; penalty?: Float64Array | null } = {},
): Pooling {
  checkColumns([], response);
  const products = productsOf(columns, response, groups, options);
  let penalties = groups.map(() => 1);
  let hasSettled = groups.length === 0;
  for (let round = 0; round < MOST_ROUNDS && !hasSettled; round++) {
    const before = penalties;
    for (const at of groups.keys()) penalties = penalties.with(at, bestPenalty(products, groups, penalties, at));
    hasSettled =
      groups.length === 1 || penalties.every((penalty, at) => Math.abs(Math.log(penalty / before[at]!)) < 1e-12);
  }
  const { rss } = solveAt(products, groups, penalties);
  const residualVariance = rss / products.degrees;
  return {
    groups: groups.map((members, at) => {
      const penalty = penalties[at]!;
      const spread = penalty >= NO_DIFFERENCE * products.totalWeight ? 0 : Math.sqrt(residualVariance / penalty);
      return { columns: members, penalty, spread };
    }),
    residualVariance,
    hasSettled,
  };
}

function productsOf(
  columns: readonly Column[],
  response: Float64Array,
  groups: readonly (readonly number[])[],
  options: { weights?: Float64Array | null; penalty?: Float64Array | null },
): Products {
  const n = response.length;
  const weights = options.weights ?? null;
  const counted = weights === null ? n : weights.reduce((count, w) => count + (w > 0 ? 1 : 0), 0);
  const frame = frameOf([...columns, response], n, options.penalty ?? null, { weights });
  const degrees = counted - (columns.length + 1 - groups.flat().length);
  if (degrees < 1) throw new NumericsError("tooFewRows", `${counted} rows leave nothing to tell the levels' spread by`);
  const { matrix } = weightedProducts(frame, weights, response);
  return { frame, q: columns.length + 2, matrix, degrees, totalWeight: matrix[0]! };
}

/** λ of one group with the others held: the root of the slope in the grid cell where −2ℓ is least, or an end of the grid. */
function bestPenalty(
  products: Products,
  groups: readonly (readonly number[])[],
  penalties: readonly number[],
  at: number,
): number {
  const lowest = Math.log(NO_POOLING);
  const none = NO_DIFFERENCE * products.totalWeight;
  const cell = (Math.log(none) - lowest) / GRID_STEPS;
  const look = (x: number) => lookAt(products, groups, penalties.with(at, Math.exp(x)), at);
  const seen = Array.from({ length: GRID_STEPS + 1 }, (_, step) => look(lowest + step * cell));
  const least = seen.reduce((best, one, step) => (one.deviance < seen[best]!.deviance ? step : best), 0);
  const start = seen[least]!.slope > 0 ? least - 1 : least;
  if (start < 0) return NO_POOLING;
  const isFlat = lowest + start * cell > Math.log(NEARLY_NO_DIFFERENCE * products.totalWeight);
  if (isFlat || start >= GRID_STEPS) return none;
  const low = lowest + start * cell;
  return Math.exp(findRoot((x) => look(x).slope, low, low + cell, 1e-15));
}

/** −2ℓ and its slope in ln λ of one group. */
function lookAt(
  products: Products,
  groups: readonly (readonly number[])[],
  penalties: readonly number[],
  at: number,
): { deviance: number; slope: number } {
  const { rss, logDeterminant, coefficients, inverseDiagonal } = solveAt(products, groups, penalties);
  const { degrees, frame } = products;
  const shrinks = groups.reduce((sum, members, group) => sum + members.length * Math.log(penalties[group]!), 0);
  let size = 0;
  let trace = 0;
  for (const column of groups[at]!) {
    size += (coefficients[column + 1]! / frame.scales[column]!) ** 2;
    trace += inverseDiagonal[column + 1]! / frame.scales[column]! ** 2;
  }
  const lambda = penalties[at]!;
  return {
    deviance: degrees * Math.log(rss / degrees) + logDeterminant - shrinks,
    slope: (degrees * lambda * size) / rss + lambda * trace - groups[at]!.length,
  };
}

/** Henderson's equations at some λ; RSS_λ is the last pivot of the factor with the response as its last column. */
function solveAt(products: Products, groups: readonly (readonly number[])[], penalties: readonly number[]): Solved {
  const { frame, q } = products;
  const c = Float64Array.from(products.matrix);
  for (const [at, members] of groups.entries()) {
    for (const column of members) c[(column + 1) * (q + 1)]! += penalties[at]! / frame.scales[column]! ** 2;
  }
  let r = choleskyFactor(c, q, 0);
  if (r === q - 1) {
    c[q * q - 1]! *= 1 + FITTED_EXACTLY;
    r = choleskyFactor(c, q, 0);
  }
  if (typeof r === "number") {
    throw new NumericsError("rankDeficient", "the other columns depend on each other", r === 0 ? [] : [r - 1]);
  }
  const t = invertUpper(r, q);
  const last = q - 1;
  const pivot = r[last * q + last]!;
  const inverseDiagonal = new Float64Array(last);
  const coefficients = new Float64Array(last);
  let logDeterminant = 0;
  for (let j = 0; j < last; j++) {
    logDeterminant += 2 * Math.log(r[j * q + j]!);
    for (let l = j; l < last; l++) inverseDiagonal[j]! += t[j * q + l]! ** 2;
    coefficients[j] = -t[j * q + last]! * pivot * frame.scales[q - 2]!;
  }
  return { inverseDiagonal, coefficients, rss: (pivot * frame.scales[q - 2]!) ** 2, logDeterminant };
}
