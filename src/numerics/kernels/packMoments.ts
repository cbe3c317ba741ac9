// Moments of q columns as 2 + 3q + q² doubles in a row: row count, weight sum, means, tails, scales, cross-products.
import { emptyMoments, type Moments } from "../mergeMoments.ts";

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

export function readMoments(from: Float64Array, q: number): Moments {
  const moments = { ...emptyMoments(q), rowCount: from[0]!, weightSum: from[1]! };
  moments.means.set(from.subarray(2, 2 + q));
  moments.meanTails.set(from.subarray(2 + q, 2 + 2 * q));
  moments.scales.set(from.subarray(2 + 2 * q, 2 + 3 * q));
  moments.crossProducts.set(from.subarray(2 + 3 * q, packedSize(q)));
  return moments;
}
