/**
 * Columns moved to mean zero and scaled by powers of two, and what storing them as doubles may have cost.
 * Symbols: n rows, k columns; m means in double-double; c scales; z_ij = (x_ij − m_j)/c_j.
 */

import { type Moments, powerOfTwoNear } from "./accumulateMoments.ts";
import { type Column, isIndicator } from "./column.ts";
import type { DoubleDouble } from "./doubleDouble.ts";

export interface Centring {
  /** Means in double-double, k; zeros when the columns are not centred. */
  readonly means: DoubleDouble[];
  /** Root mean square of x − m, k. */
  readonly spreads: Float64Array;
  /** Powers of two near the spreads, k. */
  readonly scales: Float64Array;
}

/** Means, spreads and scales from moments: about the weighted means, or about zero. */
export function centringOf(moments: Moments, centred: boolean): Centring {
  const { means, meanTails, scales, weightSum, crossProducts } = moments;
  const q = scales.length;
  if (centred) {
    const both = Array.from(means, (hi, j) => ({ hi, lo: meanTails[j]! }));
    const spreads = scales.map((scale, j) => scale * Math.sqrt(crossProducts[j * q + j]! / weightSum));
    return { means: both, spreads, scales };
  }
  const spreads = scales.map((scale, j) =>
    Math.hypot(scale * Math.sqrt(crossProducts[j * q + j]! / weightSum), means[j]!),
  );
  return { means: Array.from(means, () => ({ hi: 0, lo: 0 })), spreads, scales: spreads.map(powerOfTwoNear) };
}

const storedBefore = new WeakMap<Float64Array, number>();

/**
 * Largest error that storing a column's values as doubles can have caused: 0 for whole numbers below 2^53, which are
 * stored exactly, else half a unit in the last place of the largest value. Kept for as long as the column, which must not change.
 */
export function storedError(column: Column): number {
  if (isIndicator(column)) return 0;
  const known = storedBefore.get(column);
  if (known !== undefined) return known;
  const isWhole = column.every(Number.isInteger);
  let largest = 0;
  for (let i = 0; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i]!));
  const error = isWhole && largest <= Number.MAX_SAFE_INTEGER ? 0 : largest * 2 ** -53;
  storedBefore.set(column, error);
  return error;
}
