/**
 * Columns moved to mean zero and scaled by powers of two, and what storing them as doubles may have cost.
 * Symbols: n rows, k columns; m means in double-double; c scales; z_ij = (x_ij − m_j)/c_j.
 */
import { type Moments, powerOfTwoNear, rootMeanSquare } from "./accumulateMoments.ts";
import { type DoubleDouble, mean } from "./doubleDouble.ts";

export interface Centring {
  /** Means in double-double, k; zeros when the columns are not centred. */
  readonly means: DoubleDouble[];
  /** Root mean square of x − m, k. */
  readonly spreads: Float64Array;
  /** Powers of two near the spreads, k. */
  readonly scales: Float64Array;
}

/** Means, spreads and scales of the columns; without `centred` the means are zero and spreads are about zero. */
export function measureCentring(columns: readonly Float64Array[], centred: boolean): Centring {
  const means = columns.map((column) => (centred ? mean(column) : { hi: 0, lo: 0 }));
  const spreads = Float64Array.from(columns, (column, j) => rootMeanSquare(column, means[j]!.hi, means[j]!.lo));
  return { means, spreads, scales: spreads.map(powerOfTwoNear) };
}

/** The same from moments: about the weighted means, or about zero. */
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

/** New columns z. */
export function centreColumns(columns: readonly Float64Array[], centring: Centring): Float64Array[] {
  return columns.map((column, j) => {
    const { hi, lo } = centring.means[j]!;
    const factor = 1 / centring.scales[j]!;
    const z = new Float64Array(column.length);
    for (let i = 0; i < z.length; i++) z[i] = (column[i]! - hi - lo) * factor;
    return z;
  });
}

/**
 * Largest error that storing a column's values as doubles can have caused: 0 for whole numbers below 2^53, which are
 * stored exactly, else half a unit in the last place of the largest value.
 */
export function storedError(column: Float64Array): number {
  const isWhole = column.every(Number.isInteger);
  let largest = 0;
  for (let i = 0; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i]!));
  return isWhole && largest <= Number.MAX_SAFE_INTEGER ? 0 : largest * 2 ** -53;
}
