/**
 * Count, means and centred cross-products of columns: all that coefficients, ranges and attribute sets need. They add up:
 * parts merge, one row comes and goes in O(q²).
 * Symbols: q columns, w weights (1 without weights), W = Σ w, m means Σ w x / W (q), c scales (q),
 * S cross-products (q × q): S_jk = Σ w (x_ij − m_j)(x_ik − m_k)/(c_j c_k).
 * Merging: Chan, Golub & LeVeque 1983. Adding or removing one row: Welford 1962; with weights West 1979.
 */
import { add, fromNumber, subtract } from "./doubleDouble.ts";
import { NumericsError } from "./numericsError.ts";
import { powerOfTwoNear } from "./spread.ts";

export interface Moments {
  /** Rows with a weight above 0. */
  readonly rowCount: number;
  /** W; the row count without weights. */
  readonly weightSum: number;
  /** Means, q. */
  readonly means: Float64Array;
  /** What rounding the means to doubles took, q: keeps merging exact for columns with a large offset. */
  readonly meanTails: Float64Array;
  /** Powers of two near each column's root mean square deviation, q; 1 for a constant column. */
  readonly scales: Float64Array;
  /** S, q × q row-major, symmetric. */
  readonly crossProducts: Float64Array;
}

/** The moments of no rows. */
export function emptyMoments(q: number): Moments {
  return {
    rowCount: 0,
    weightSum: 0,
    means: new Float64Array(q),
    meanTails: new Float64Array(q),
    scales: new Float64Array(q).fill(1),
    crossProducts: new Float64Array(q * q),
  };
}

/**
 * The moments of all parts together: neighbours are merged in pairs, then the pairs, so that rounding grows with the logarithm
 * of the number of parts. Refuses (shape) no parts and unequal column counts.
 */
export function mergeMoments(parts: readonly Moments[]): Moments {
  if (parts.length === 0) throw new NumericsError("shape", "there are no moments to merge");
  return rescaled(mergeParts(parts));
}

/** As `mergeMoments`, with scales as they come. Parts that nobody else holds may give their memory to the result. */
export function mergeParts(parts: readonly Moments[], areOwn = false): Moments {
  let level = parts;
  while (level.length > 1) {
    const pairs: Moments[] = [];
    for (let i = 0; i < level.length; i += 2) {
      const second = level[i + 1];
      pairs.push(second === undefined ? level[i]! : mergeTwo(level[i]!, second, areOwn));
    }
    level = pairs;
  }
  return level[0]!;
}

/** The moments with one row more; O(q²). A row of weight 0 changes nothing. */
export function addRow(moments: Moments, row: ArrayLike<number>, weight = 1): Moments {
  checkRow(moments, row, weight);
  return weight === 0 ? moments : moveRow(moments, row, weight, 1);
}

/**
 * The moments without one row that is in them, at the weight it has there; O(q²). Digits go when rows far from the mean leave
 * one after another: accumulate anew after some ten thousand edits. Refuses (tooFewRows) to remove the last row.
 */
export function removeRow(moments: Moments, row: ArrayLike<number>, weight = 1): Moments {
  checkRow(moments, row, weight);
  if (weight === 0) return moments;
  if (moments.rowCount < 2 || !(moments.weightSum > weight))
    throw new NumericsError("tooFewRows", "the last row cannot be removed");
  return moveRow(moments, row, -weight, -1);
}

/** W′ = W + w, m′ = m + (x − m)w/W′, S′ = S + (wW/W′)zz′ with z = (x − m)/c; w below 0 for a row that leaves. */
function moveRow(moments: Moments, row: ArrayLike<number>, weight: number, rows: number): Moments {
  const q = moments.scales.length;
  const weightSum = moments.weightSum + weight;
  const share = weight / weightSum;
  const means = new Float64Array(q);
  const meanTails = new Float64Array(q);
  const scales = new Float64Array(q);
  const z = new Float64Array(q);
  for (let j = 0; j < q; j++) {
    const old = { hi: moments.means[j]!, lo: moments.meanTails[j]! };
    const exact = subtract(fromNumber(row[j]!), old);
    const distance = exact.hi + exact.lo;
    const next = add(old, fromNumber(distance * share));
    means[j] = next.hi;
    meanTails[j] = next.lo;
    scales[j] = moments.crossProducts[j * q + j]! > 0 ? moments.scales[j]! : powerOfTwoNear(Math.abs(distance));
    z[j] = distance / scales[j]!;
  }
  const factor = moments.weightSum * share;
  const crossProducts = moments.crossProducts.slice();
  for (let j = 0, at = 0; j < q; j++) {
    const zj = z[j]!;
    for (let k = 0; k < q; k++, at++) crossProducts[at] = crossProducts[at]! + factor * (zj * z[k]!);
  }
  return { rowCount: moments.rowCount + rows, weightSum, means, meanTails, scales, crossProducts };
}

function checkRow({ scales }: Moments, row: ArrayLike<number>, weight: number): void {
  const q = scales.length;
  if (row.length !== q) throw new NumericsError("shape", `a row has ${row.length} values where ${q} were expected`);
  if (!(weight >= 0 && weight < Number.POSITIVE_INFINITY))
    throw new NumericsError("notFinite", `a weight of ${weight} where a number from 0 up was expected`);
  const bad: number[] = [];
  for (let j = 0; j < q; j++) if (!Number.isFinite(row[j]!)) bad.push(j);
  if (bad.length > 0) throw new NumericsError("notFinite", "some values are not finite numbers", bad);
}

/** S = S₁ + S₂ + W₁W₂/(W₁ + W₂)·δδ′ with δ the difference of the means, in the scales of the larger spread. */
function mergeTwo(a: Moments, b: Moments, areOwn: boolean): Moments {
  const q = a.scales.length;
  if (b.scales.length !== q) throw new NumericsError("shape", `moments of ${q} and ${b.scales.length} columns`);
  if (b.rowCount === 0) return a;
  if (a.rowCount === 0) return b;
  const weightSum = a.weightSum + b.weightSum;
  const share = b.weightSum / weightSum;
  const scales = new Float64Array(q);
  const means = new Float64Array(q);
  const meanTails = new Float64Array(q);
  const z = new Float64Array(q);
  for (let j = 0; j < q; j++) {
    const ma = { hi: a.means[j]!, lo: a.meanTails[j]! };
    const distance = subtract({ hi: b.means[j]!, lo: b.meanTails[j]! }, ma);
    const merged = add(ma, fromNumber((distance.hi + distance.lo) * share));
    means[j] = merged.hi;
    meanTails[j] = merged.lo;
    scales[j] = mergedScale(a, b, j, distance.hi);
    z[j] = (distance.hi + distance.lo) / scales[j]!;
  }
  const crossProducts = areOwn ? a.crossProducts : new Float64Array(q * q);
  mergeCrossProducts(crossProducts, a, b, scales, z, a.weightSum * share);
  return { rowCount: a.rowCount + b.rowCount, weightSum, means, meanTails, scales, crossProducts };
}

function mergeCrossProducts(
  crossProducts: Float64Array,
  a: Moments,
  b: Moments,
  scales: Float64Array,
  z: Float64Array,
  factor: number,
): void {
  const q = scales.length;
  const ratioA = a.scales.map((scale, j) => scale / scales[j]!);
  const ratioB = b.scales.map((scale, j) => scale / scales[j]!);
  for (let j = 0, at = 0; j < q; j++) {
    const zj = z[j]!;
    const inA = ratioA[j]!;
    const inB = ratioB[j]!;
    for (let k = 0; k < q; k++, at++) {
      const fromA = a.crossProducts[at]! * (inA * ratioA[k]!);
      const fromB = b.crossProducts[at]! * (inB * ratioB[k]!);
      crossProducts[at] = fromA + fromB + factor * (zj * z[k]!);
    }
  }
}

/** Sets S_jk and S_kj. */
export function setBoth(crossProducts: Float64Array, q: number, j: number, k: number, value: number): void {
  crossProducts[j * q + k] = value;
  crossProducts[k * q + j] = value;
}

/** The larger scale; a column that is constant in one part takes the other's, in both that of the distance between them. */
function mergedScale(a: Moments, b: Moments, j: number, distance: number): number {
  const at = j * a.scales.length + j;
  const spreadA = a.crossProducts[at]! > 0;
  const spreadB = b.crossProducts[at]! > 0;
  if (!spreadA && !spreadB) return powerOfTwoNear(Math.abs(distance));
  if (!spreadA) return b.scales[j]!;
  return spreadB ? Math.max(a.scales[j]!, b.scales[j]!) : a.scales[j]!;
}

/** The same moments with each scale near the root mean square deviation √(S_jj/W)·c_j; exact. */
function rescaled(moments: Moments): Moments {
  const { weightSum, crossProducts: old } = moments;
  const q = moments.scales.length;
  const scales = moments.scales.map((scale, j) => {
    const spread = old[j * q + j]!;
    return spread > 0 ? powerOfTwoNear(scale * Math.sqrt(spread / weightSum)) : 1;
  });
  const ratios = moments.scales.map((scale, j) => scale / scales[j]!);
  const crossProducts = new Float64Array(q * q);
  for (let j = 0, at = 0; j < q; j++)
    for (let k = 0; k < q; k++, at++) crossProducts[at] = old[at]! * (ratios[j]! * ratios[k]!);
  return { ...moments, scales, crossProducts };
}
