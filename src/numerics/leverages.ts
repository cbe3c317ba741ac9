/**
 * Leverage of each row: h_i = 1/n + d_i′C⁻¹d_i with d_i = x_i − x̄ (Hoaglin & Welsch 1978), as the squared length of T′d_i
 * where C⁻¹ = TT′, so that nothing cancels. Without an intercept the 1/n and the means fall away.
 */
import { type Column, numbersOf } from "./column.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

/** n leverages; they sum to the rank. */
export function leverages(given: readonly Column[], solution: LeastSquaresSolution): Float64Array {
  const columns = given.map(numbersOf);
  const n = solution.residuals.length;
  const k = columns.length;
  const { rootInverse, means } = solution;
  const h = new Float64Array(n).fill(solution.intercept === null ? 0 : 1 / n);
  const d = new Float64Array(k);
  for (let i = 0; i < n; i++) {
    for (let a = 0; a < k; a++) d[a] = columns[a]![i]! - means[a]!;
    h[i]! += quadraticForm(rootInverse, d);
  }
  return h;
}

/** d′C⁻¹d = |T′d|². */
export function quadraticForm(rootInverse: Float64Array, d: Float64Array): number {
  const k = d.length;
  let sum = 0;
  for (let b = 0; b < k; b++) {
    let t = 0;
    for (let a = 0; a < k; a++) t += rootInverse[a * k + b]! * d[a]!;
    sum += t * t;
  }
  return sum;
}
