/**
 * Weights that are not negative, sum to 1 and make w′Gw least, G = E′E the cross-products of m lists of errors: the mixture of
 * predictions that errs least. The point of a polytope nearest to the origin, found exactly through its Gram matrix (Wolfe
 * 1976, "Finding the nearest point in a polytope"): a support grows by the member that lowers w′Gw fastest and shrinks at the
 * edge of the simplex.
 * w: m weights, u: solution of (G + 11′)u = 1 on the support, whose share u/Σu is the least there without signs.
 */
import { NumericsError } from "./numericsError.ts";

/** A slope above this share of the largest squared error is rounding: nothing more to gain. */
const NO_GAIN = 1e-12;

/**
 * m weights; ties and members that repeat others get none beyond the first. `gram`: m × m, symmetric, not negative. Refuses
 * (shape) another length and no members, (notFinite) entries that are no numbers.
 */
export function simplexWeights(gram: Float64Array, members: number): Float64Array {
  if (!(members > 0) || gram.length !== members * members)
    throw new NumericsError("shape", `${gram.length} cross-products for ${members} members`);
  if (gram.some((value) => !Number.isFinite(value)))
    throw new NumericsError("notFinite", "a cross-product is not a finite number");
  const diagonal = Float64Array.from({ length: members }, (_, j) => gram[j * (members + 1)]!);
  const largest = diagonal.reduce((most, value) => Math.max(most, value), 0);
  const weights = new Float64Array(members);
  weights[diagonal.indexOf(diagonal.reduce((least, value) => Math.min(least, value)))] = 1;
  if (largest === 0) return weights;
  const scaled = gram.map((value) => value / largest);
  let least = Number.POSITIVE_INFINITY;
  for (;;) {
    const slopes = timesWeights(scaled, weights);
    const value = slopes.reduce((sum, slope, j) => sum + slope * weights[j]!, 0);
    const steepest = slopes.indexOf(slopes.reduce((low, slope) => Math.min(low, slope)));
    if (slopes[steepest]! >= value - NO_GAIN || weights[steepest]! > 0 || !(value < least)) return weights;
    least = value;
    if (!moveToLeast(scaled, weights, steepest)) return weights;
  }
}

function timesWeights(gram: Float64Array, weights: Float64Array): Float64Array {
  const m = weights.length;
  return weights.map((_, j) => weights.reduce((sum, weight, l) => sum + gram[j * m + l]! * weight, 0));
}

/** Takes `joining` into the support and goes to the least there, dropping who would go below zero. False when it cannot be told apart. */
function moveToLeast(gram: Float64Array, weights: Float64Array, joining: number): boolean {
  let support = [...weights.keys()].filter((j) => weights[j]! > 0 || j === joining);
  while (support.length > 0) {
    const aim = leastOn(gram, support, weights.length);
    if (aim === null) return false;
    const step = support.reduce((least, j, at) => {
      return aim[at]! > 0 ? least : Math.min(least, weights[j]! / (weights[j]! - aim[at]!));
    }, 1);
    support.forEach((j, at) => {
      const value = weights[j]! + step * (aim[at]! - weights[j]!);
      weights[j] = value > 1e-14 ? value : 0;
    });
    if (step === 1) break;
    support = support.filter((j) => weights[j]! > 0);
  }
  const sum = weights.reduce((total, weight) => total + weight, 0);
  weights.forEach((weight, j) => {
    weights[j] = weight / sum;
  });
  return true;
}

/** u/Σu with (G + 11′)u = 1 on the support, by Cholesky; null where members cannot be told apart. */
function leastOn(gram: Float64Array, support: readonly number[], members: number): Float64Array | null {
  const k = support.length;
  const lower = new Float64Array(k * k);
  const u = new Float64Array(k).fill(1);
  for (let a = 0; a < k; a++) {
    for (let b = 0; b <= a; b++) {
      let value = gram[support[a]! * members + support[b]!]! + 1;
      for (let l = 0; l < b; l++) value -= lower[a * k + l]! * lower[b * k + l]!;
      if (a !== b) lower[a * k + b] = value / lower[b * k + b]!;
      else if (value > 1e-14) lower[a * k + a] = Math.sqrt(value);
      else return null;
    }
    for (let l = 0; l < a; l++) u[a] = u[a]! - lower[a * k + l]! * u[l]!;
    u[a] = u[a]! / lower[a * k + a]!;
  }
  for (let a = k - 1; a >= 0; a--) {
    for (let l = a + 1; l < k; l++) u[a] = u[a]! - lower[l * k + a]! * u[l]!;
    u[a] = u[a]! / lower[a * k + a]!;
  }
  const sum = u.reduce((total, value) => total + value, 0);
  return u.map((value) => value / sum);
}
