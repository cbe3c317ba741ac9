/**
 * Leverage of each row: h_i = w_i(1/Σw + d_i′C⁻¹d_i) with d_i = x_i − x̄ (Hoaglin & Welsch 1978), as the squared length of T′d_i
 * where C⁻¹ = TT′, so that nothing cancels. Without an intercept the 1/Σw and the means fall away; without weights w = 1.
 */
import type { Column } from "./column.ts";
import { currentKernel } from "./kernels/currentKernel.ts";
import { blocksOf, COLUMN_BYTES, putColumn } from "./kernels/designBlocks.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

/** n leverages; they sum to the rank, less under a penalty. */
export function leverages(
  columns: readonly Column[],
  solution: LeastSquaresSolution,
  weights: Float64Array | null = null,
): Float64Array {
  const kernel = currentKernel();
  const n = solution.residuals.length;
  const k = columns.length;
  const { rootInverse, means, weightSum } = solution;
  const first = kernel.reserve(0);
  const out = first + k * COLUMN_BYTES;
  const t = out + COLUMN_BYTES;
  kernel.reserve(t + k * k * 8 - first);
  const { f64, operations } = kernel;
  f64.set(rootInverse, t / 8);
  const h = new Float64Array(n);
  const base = solution.intercept === null ? 0 : 1 / weightSum;
  for (const { start, size } of blocksOf(n)) {
    columns.forEach((column, j) => {
      const at = first + j * COLUMN_BYTES;
      putColumn(f64, at, column, start, size);
      operations.centreColumn(at, size, means[j]!, 0, 1);
    });
    f64.fill(base, out / 8, out / 8 + size + 1);
    operations.addSquaredForms(first, k, size, t, out);
    h.set(f64.subarray(out / 8, out / 8 + size), start);
  }
  if (weights !== null) for (let i = 0; i < n; i++) h[i] = h[i]! * weights[i]!;
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
