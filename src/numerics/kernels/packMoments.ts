// Moments of q columns as 2 + 3q + q² doubles in a row: row count, weight sum, means, tails, scales, cross-products.
import type { Moments } from "../mergeMoments.ts";

export function packedSize(q: number): number {
  return 2 + 3 * q + q * q;
}

export function writeMoments(moments: Moments, to: Float64Array): void {
  const q = moments.scales.length;
  to[0] = moments.rowCount;
  to[1] = moments.weightSum;
  to.set(moments.means, 2);
  to.set(moments.meanTails, 2 + q);
  to.set(moments.scales, 2 + 2 * q);
  to.set(moments.crossProducts, 2 + 3 * q);
}

/** The moments that are packed there, on the same memory. */
export function readMoments(from: Float64Array, q: number): Moments {
  return {
    rowCount: from[0]!,
    weightSum: from[1]!,
    means: from.subarray(2, 2 + q),
    meanTails: from.subarray(2 + q, 2 + 2 * q),
    scales: from.subarray(2 + 2 * q, 2 + 3 * q),
    crossProducts: from.subarray(2 + 3 * q, packedSize(q)),
  };
}
