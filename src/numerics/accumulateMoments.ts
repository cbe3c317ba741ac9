/**
 * Count, means and centred cross-products of columns: all that coefficients, ranges and attribute sets need.
 * Rows go in blocks of 64 Ki, each shifted by its own mean and scaled by powers of two, in tiles of 256 rows whose sums are
 * added with TwoSum; blocks are merged in order, so the bits do not depend on who computed which block.
 * Symbols: n rows, q columns, m means (q), c scales (q), S cross-products (q × q): S_jk = Σ (x_ij − m_j)(x_ik − m_k)/(c_j c_k).
 * Pairwise merging: Chan, Golub & LeVeque 1983. Adding or removing one row: Welford 1962.
 */
import { type Column, numbersOf } from "./column.ts";
import { add, fromNumber, mean, subtract } from "./doubleDouble.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";

export interface Moments {
  readonly rowCount: number;
  /** Means, q. */
  readonly means: Float64Array;
  /** What rounding the means to doubles took, q: keeps merging exact for columns with a large offset. */
  readonly meanTails: Float64Array;
  /** Powers of two near each column's root mean square deviation, q; 1 for a constant column. */
  readonly scales: Float64Array;
  /** S, q × q row-major, symmetric. */
  readonly crossProducts: Float64Array;
}

export const BLOCK_ROWS = 65536;
const TILE_ROWS = 256;
/** Eight doubles apart, so that tile columns do not fall on the same cache sets. */
const TILE_STRIDE = TILE_ROWS + 8;

/** Moments of the columns. Refuses (shape, notFinite) unequal lengths, no rows, values that are not finite. */
export function accumulateMoments(given: readonly Column[]): Moments {
  const columns = given.map(numbersOf);
  const rowCount = checkColumns(columns);
  if (columns.length === 0) throw new NumericsError("shape", "there are no columns");
  const parts: Moments[] = [];
  for (let start = 0; start < rowCount; start += BLOCK_ROWS) {
    const end = Math.min(rowCount, start + BLOCK_ROWS);
    parts.push(blockMoments(columns.map((column) => column.subarray(start, end))));
  }
  return mergeMoments(parts);
}

/** The moments of all parts together, merged from left to right. Refuses no parts and unequal column counts. */
export function mergeMoments(parts: readonly Moments[]): Moments {
  const first = parts[0];
  if (first === undefined) throw new NumericsError("shape", "there are no moments to merge");
  return parts.slice(1).reduce(mergeTwo, first);
}

/** The moments with one row more; O(q²). */
export function addRow(moments: Moments, row: ArrayLike<number>): Moments {
  return mergeTwo(moments, singleRow(moments, row));
}

/**
 * The moments without one row that is in them; O(q²). Digits go when rows far from the mean leave one after another:
 * accumulate anew after some ten thousand edits. Refuses (tooFewRows) to remove the last row.
 */
export function removeRow(moments: Moments, row: ArrayLike<number>): Moments {
  const { rowCount, scales } = moments;
  const q = scales.length;
  singleRow(moments, row);
  if (rowCount < 2) throw new NumericsError("tooFewRows", "the last row cannot be removed");
  const means = new Float64Array(q);
  const meanTails = new Float64Array(q);
  const z = new Float64Array(q);
  for (let j = 0; j < q; j++) {
    const old = { hi: moments.means[j]!, lo: moments.meanTails[j]! };
    const distance = subtract(fromNumber(row[j]!), old);
    const next = subtract(old, fromNumber((distance.hi + distance.lo) / (rowCount - 1)));
    means[j] = next.hi;
    meanTails[j] = next.lo;
    z[j] = (distance.hi + distance.lo) / scales[j]!;
  }
  const factor = rowCount / (rowCount - 1);
  const crossProducts = moments.crossProducts.map((s, at) => s - factor * z[Math.floor(at / q)]! * z[at % q]!);
  return { rowCount: rowCount - 1, means, meanTails, scales: scales.slice(), crossProducts };
}

function singleRow(moments: Moments, row: ArrayLike<number>): Moments {
  const q = moments.scales.length;
  const values = Float64Array.from(row);
  if (values.length !== q)
    throw new NumericsError("shape", `a row has ${values.length} values where ${q} were expected`);
  const bad = [...values.keys()].filter((j) => !Number.isFinite(values[j]!));
  if (bad.length > 0) throw new NumericsError("notFinite", "some values are not finite numbers", bad);
  const zeros = new Float64Array(q);
  return {
    rowCount: 1,
    means: values,
    meanTails: zeros,
    scales: moments.scales,
    crossProducts: new Float64Array(q * q),
  };
}

/** S = S₁ + S₂ + n₁n₂/(n₁ + n₂)·δδ′ with δ the difference of the means, in the scales of the larger spread. */
function mergeTwo(a: Moments, b: Moments): Moments {
  const q = a.scales.length;
  if (b.scales.length !== q) throw new NumericsError("shape", `moments of ${q} and ${b.scales.length} columns`);
  const rowCount = a.rowCount + b.rowCount;
  const scales = mergedScales(a, b);
  const means = new Float64Array(q);
  const meanTails = new Float64Array(q);
  const z = new Float64Array(q);
  for (let j = 0; j < q; j++) {
    const ma = { hi: a.means[j]!, lo: a.meanTails[j]! };
    const distance = subtract({ hi: b.means[j]!, lo: b.meanTails[j]! }, ma);
    const merged = add(ma, fromNumber((distance.hi + distance.lo) * (b.rowCount / rowCount)));
    means[j] = merged.hi;
    meanTails[j] = merged.lo;
    z[j] = (distance.hi + distance.lo) / scales[j]!;
  }
  const factor = (a.rowCount * b.rowCount) / rowCount;
  const crossProducts = new Float64Array(q * q);
  for (let j = 0; j < q; j++) {
    for (let k = 0; k <= j; k++) {
      const at = j * q + k;
      const fromA = a.crossProducts[at]! * (a.scales[j]! / scales[j]!) * (a.scales[k]! / scales[k]!);
      const fromB = b.crossProducts[at]! * (b.scales[j]! / scales[j]!) * (b.scales[k]! / scales[k]!);
      const value = fromA + fromB + factor * z[j]! * z[k]!;
      crossProducts[at] = value;
      crossProducts[k * q + j] = value;
    }
  }
  return { rowCount, means, meanTails, scales, crossProducts };
}

/** A column that is constant in one part takes the scale of the other. */
function mergedScales(a: Moments, b: Moments): Float64Array {
  const q = a.scales.length;
  return a.scales.map((scale, j) => {
    const spreadA = a.crossProducts[j * q + j]! > 0;
    const spreadB = b.crossProducts[j * q + j]! > 0;
    return spreadA && spreadB ? Math.max(scale, b.scales[j]!) : spreadB ? b.scales[j]! : scale;
  });
}

function blockMoments(columns: readonly Float64Array[]): Moments {
  const q = columns.length;
  const rowCount = columns[0]!.length;
  const means = new Float64Array(q);
  const meanTails = new Float64Array(q);
  const scales = new Float64Array(q);
  for (let j = 0; j < q; j++) {
    const m = mean(columns[j]!);
    means[j] = m.hi;
    meanTails[j] = m.lo;
    scales[j] = powerOfTwoNear(rootMeanSquare(columns[j]!, m.hi, m.lo));
  }
  const crossProducts = tileCrossProducts(columns, means, meanTails, scales);
  return { rowCount, means, meanTails, scales, crossProducts };
}

/** √(Σ (x − m)²/n), first divided by the largest deviation so that nothing overflows. */
export function rootMeanSquare(column: Float64Array, centreHi: number, centreLo: number): number {
  let largest = 0;
  for (let i = 0; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i]! - centreHi - centreLo));
  if (largest === 0) return 0;
  let total = 0;
  for (let i = 0; i < column.length; i++) {
    const z = (column[i]! - centreHi - centreLo) / largest;
    total += z * z;
  }
  return largest * Math.sqrt(total / column.length);
}

/** The power of two next to a size (exact to divide by); 1 for 0. */
export function powerOfTwoNear(size: number): number {
  return size > 0 && Number.isFinite(size) ? 2 ** Math.max(-1000, Math.min(1000, Math.round(Math.log2(size)))) : 1;
}

function tileCrossProducts(
  columns: readonly Float64Array[],
  means: Float64Array,
  meanTails: Float64Array,
  scales: Float64Array,
): Float64Array {
  const q = columns.length;
  const padded = Math.ceil(q / 3) * 3;
  const rowCount = columns[0]!.length;
  const tile = new Float64Array(padded * TILE_STRIDE);
  const high = new Float64Array(padded * padded);
  const low = new Float64Array(padded * padded);
  for (let start = 0; start < rowCount; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, rowCount - start);
    for (let j = 0; j < q; j++) {
      packColumn(tile, j * TILE_STRIDE, columns[j]!, start, size, means[j]!, meanTails[j]!, 1 / scales[j]!);
    }
    for (let j = 0; j < padded; j += 3) for (let k = 0; k <= j; k += 3) addTile(tile, j, k, size, high, low, padded);
  }
  const crossProducts = new Float64Array(q * q);
  for (let j = 0; j < q; j++) {
    for (let k = 0; k <= j; k++) {
      const value = high[j * padded + k]! + low[j * padded + k]!;
      crossProducts[j * q + k] = value;
      crossProducts[k * q + j] = value;
    }
  }
  return crossProducts;
}

function packColumn(
  tile: Float64Array,
  at: number,
  column: Float64Array,
  start: number,
  size: number,
  meanHi: number,
  meanLo: number,
  factor: number,
): void {
  for (let i = 0; i < size; i++) tile[at + i] = (column[start + i]! - meanHi - meanLo) * factor;
}

/** Adds the 3 × 3 block (j, k) of one tile to the sums, TwoSum per tile; zero columns pad the last block. */
function addTile(
  tile: Float64Array,
  j: number,
  k: number,
  size: number,
  high: Float64Array,
  low: Float64Array,
  padded: number,
): void {
  const a0 = j * TILE_STRIDE;
  const a1 = a0 + TILE_STRIDE;
  const a2 = a1 + TILE_STRIDE;
  const b0 = k * TILE_STRIDE;
  const b1 = b0 + TILE_STRIDE;
  const b2 = b1 + TILE_STRIDE;
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s20 = 0;
  let s21 = 0;
  let s22 = 0;
  for (let i = 0; i < size; i++) {
    const x0 = tile[a0 + i]!;
    const x1 = tile[a1 + i]!;
    const x2 = tile[a2 + i]!;
    const z0 = tile[b0 + i]!;
    const z1 = tile[b1 + i]!;
    const z2 = tile[b2 + i]!;
    s00 += x0 * z0;
    s01 += x0 * z1;
    s02 += x0 * z2;
    s10 += x1 * z0;
    s11 += x1 * z1;
    s12 += x1 * z2;
    s20 += x2 * z0;
    s21 += x2 * z1;
    s22 += x2 * z2;
  }
  const row = j * padded + k;
  addCompensated(high, low, row, s00);
  addCompensated(high, low, row + 1, s01);
  addCompensated(high, low, row + 2, s02);
  addCompensated(high, low, row + padded, s10);
  addCompensated(high, low, row + padded + 1, s11);
  addCompensated(high, low, row + padded + 2, s12);
  addCompensated(high, low, row + 2 * padded, s20);
  addCompensated(high, low, row + 2 * padded + 1, s21);
  addCompensated(high, low, row + 2 * padded + 2, s22);
}

function addCompensated(high: Float64Array, low: Float64Array, at: number, x: number): void {
  const old = high[at]!;
  const s = old + x;
  const part = s - old;
  low[at] = low[at]! + (old - (s - part) + (x - part));
  high[at] = s;
}
