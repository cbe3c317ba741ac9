/**
 * How much wider coefficients are for standing beside each other. VIF_j = C_jj·(C⁻¹)_jj; for a group of columns the
 * generalised det(C_gg)·det((C⁻¹)_gg) (Fox & Monette 1992). Partial correlation of j and k, the others alike:
 * −P_jk/√(P_jj·P_kk) with P = C⁻¹ of all columns.
 */

import { determinant, Matrix } from "ml-matrix";
import type { Moments } from "./accumulateMoments.ts";

/**
 * Generalised variance inflation of a group of columns; one column gives its VIF. Never below 1 but for rounding.
 * `columns`: places in the moments of the columns that `inverse` (k × k, raw units) is about; `group`: places among those.
 */
export function inflation(
  { crossProducts, scales }: Moments,
  columns: readonly number[],
  inverse: Float64Array,
  group: readonly number[],
): number {
  const k = columns.length;
  const q = scales.length;
  const cross = Matrix.zeros(group.length, group.length);
  const partial = Matrix.zeros(group.length, group.length);
  group.forEach((j, a) => {
    group.forEach((l, b) => {
      const [first, second] = [columns[j]!, columns[l]!];
      cross.set(a, b, crossProducts[first * q + second]!);
      partial.set(a, b, inverse[j * k + l]! * scales[first]! * scales[second]!);
    });
  });
  return Math.max(1, determinant(cross) * determinant(partial));
}

export function partialCorrelation(inverse: Float64Array, k: number, a: number, b: number): number {
  return -inverse[a * k + b]! / Math.sqrt(inverse[a * k + a]! * inverse[b * k + b]!);
}

/** Correlation of two columns of the moments, at their weights. */
export function correlation({ crossProducts, scales }: Moments, a: number, b: number): number {
  const q = scales.length;
  return crossProducts[a * q + b]! / Math.sqrt(crossProducts[a * q + a]! * crossProducts[b * q + b]!);
}
