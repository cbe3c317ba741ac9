/**
 * How much wider coefficients are for standing beside each other. VIF_j = C_jj·(C⁻¹)_jj; for a group of columns the
 * generalised det(C_gg)·det((C⁻¹)_gg) (Fox & Monette 1992). Partial correlation of j and k, the others alike:
 * −P_jk/√(P_jj·P_kk) with P = C⁻¹ of all columns.
 */

import { determinant, Matrix } from "ml-matrix";
import { type Column, numbersOf } from "./column.ts";

/** Generalised variance inflation of the columns numbered `group`; one column gives its VIF. Never below 1 but for rounding. */
export function inflation(columns: readonly Column[], inverse: Float64Array, group: readonly number[]): number {
  const k = columns.length;
  const cross = Matrix.zeros(group.length, group.length);
  const partial = Matrix.zeros(group.length, group.length);
  const centred = group.map((j) => centre(numbersOf(columns[j]!)));
  group.forEach((j, a) => {
    group.forEach((l, b) => {
      cross.set(a, b, dotOf(centred[a]!, centred[b]!));
      partial.set(a, b, inverse[j * k + l]!);
    });
  });
  return Math.max(1, determinant(cross) * determinant(partial));
}

export function partialCorrelation(inverse: Float64Array, k: number, a: number, b: number): number {
  return -inverse[a * k + b]! / Math.sqrt(inverse[a * k + a]! * inverse[b * k + b]!);
}

export function correlation(first: Column, second: Column): number {
  const [x, y] = [numbersOf(first), numbersOf(second)];
  const [a, b] = [centre(x), centre(y)];
  return dotOf(a, b) / Math.sqrt(dotOf(a, a) * dotOf(b, b));
}

function centre(values: Float64Array): Float64Array {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return values.map((value) => value - mean);
}

function dotOf(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
