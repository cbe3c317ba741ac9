/**
 * The inverse cross-product with all its digits: C accumulated and factored in double-double.
 * Needed for standard errors, whose digits fall with the square of the condition number otherwise. About twenty times the
 * work of plain cross-products, so the caller decides when it is worth it.
 * Symbols: Z n × k centred, scaled; C = Z′WZ + Λ = R′R; T = R⁻¹ so that C⁻¹ = TT′.
 */
import type { Centring } from "./centring.ts";
import {
  add,
  type DoubleDouble,
  divide,
  fromNumber,
  multiply,
  negate,
  SPLITTER,
  squareRoot,
  subtract,
  twoProduct,
  twoSum,
} from "./doubleDouble.ts";

const TILE_ROWS = 256;

export interface ExactInverse {
  /** C⁻¹ in raw units, k × k row-major. */
  readonly inverse: Float64Array;
  /** T in raw units, k × k row-major, upper triangular. */
  readonly rootInverse: Float64Array;
  /** m′C⁻¹m in raw units, m the means the columns were moved by: what an intercept's variance needs. */
  readonly meanForm: number;
}

/** C⁻¹ and its root in raw units, or null when 32 digits do not suffice to find all pivots positive. */
export function exactInverse(
  columns: readonly Float64Array[],
  centring: Centring,
  weights: Float64Array | null,
  penalty: Float64Array | null,
): ExactInverse | null {
  const k = columns.length;
  const c = crossProducts(columns, centring, weights);
  penalty?.forEach((one, j) => {
    const scale = centring.scales[j]!;
    c[j * k + j] = add(c[j * k + j]!, { hi: one / scale / scale, lo: 0 });
  });
  const r = factor(c, k);
  if (r === null) return null;
  const t = invert(r, k);
  const inverse = new Float64Array(k * k);
  const rootInverse = new Float64Array(k * k);
  const { scales } = centring;
  for (let i = 0; i < k; i++) {
    for (let j = 0; j <= i; j++) {
      let s: DoubleDouble = { hi: 0, lo: 0 };
      for (let l = i; l < k; l++) s = add(s, multiply(t[i * k + l]!, t[j * k + l]!));
      inverse[i * k + j] = s.hi / scales[i]! / scales[j]!;
      inverse[j * k + i] = inverse[i * k + j]!;
    }
    for (let j = i; j < k; j++) rootInverse[i * k + j] = t[i * k + j]!.hi / scales[i]!;
  }
  return { inverse, rootInverse, meanForm: quadraticForm(t, centring, k) };
}

/** ‖T′(m/c)‖²; the division by a power of two is exact. */
function quadraticForm(t: DoubleDouble[], centring: Centring, k: number): number {
  let total: DoubleDouble = { hi: 0, lo: 0 };
  for (let j = 0; j < k; j++) {
    let s: DoubleDouble = { hi: 0, lo: 0 };
    for (let i = 0; i <= j; i++) {
      const { hi, lo } = centring.means[i]!;
      const c = centring.scales[i]!;
      s = add(s, multiply(t[i * k + j]!, { hi: hi / c, lo: lo / c }));
    }
    total = add(total, multiply(s, s));
  }
  return total.hi;
}

function crossProducts(
  columns: readonly Float64Array[],
  centring: Centring,
  weights: Float64Array | null,
): DoubleDouble[] {
  const k = columns.length;
  const n = columns[0]?.length ?? 0;
  const sums = new Float64Array(2 * k * k);
  const high = columns.map(() => new Float64Array(TILE_ROWS));
  const low = columns.map(() => new Float64Array(TILE_ROWS));
  const weightedHigh = new Float64Array(TILE_ROWS);
  const weightedLow = new Float64Array(TILE_ROWS);
  for (let start = 0; start < n; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, n - start);
    for (let j = 0; j < k; j++) {
      pack(columns[j]!, start, size, centring.means[j]!, 1 / centring.scales[j]!, high[j]!, low[j]!);
      const [own, rest] = weights === null ? [high[j]!, low[j]!] : [weightedHigh, weightedLow];
      if (weights !== null) weigh(weights, start, size, high[j]!, low[j]!, own, rest);
      for (let l = 0; l <= j; l++) addTile(own, rest, high[l]!, low[l]!, size, sums, 2 * (j * k + l));
    }
  }
  return Array.from({ length: k * k }, (_, at) => {
    const j = Math.max(Math.floor(at / k), at % k);
    const l = Math.min(Math.floor(at / k), at % k);
    return twoSum(sums[2 * (j * k + l)]!, sums[2 * (j * k + l) + 1]!);
  });
}

function pack(
  column: Float64Array,
  start: number,
  size: number,
  centre: DoubleDouble,
  factor: number,
  high: Float64Array,
  low: Float64Array,
): void {
  for (let i = 0; i < size; i++) {
    const x = column[start + i]!;
    const s = x - centre.hi;
    const part = s - x;
    const rest = x - (s - part) - (centre.hi + part) - centre.lo;
    const hi = s + rest;
    low[i] = (rest - (hi - s)) * factor;
    high[i] = hi * factor;
  }
}

/** w·(high + low), the product of w and high exact. */
function weigh(
  weights: Float64Array,
  start: number,
  size: number,
  high: Float64Array,
  low: Float64Array,
  outHigh: Float64Array,
  outLow: Float64Array,
): void {
  for (let i = 0; i < size; i++) {
    const w = weights[start + i]!;
    const p = twoProduct(w, high[i]!);
    outHigh[i] = p.hi;
    outLow[i] = p.lo + w * low[i]!;
  }
}

function addTile(
  ah: Float64Array,
  al: Float64Array,
  bh: Float64Array,
  bl: Float64Array,
  size: number,
  sums: Float64Array,
  at: number,
): void {
  let hi = sums[at]!;
  let lo = sums[at + 1]!;
  for (let i = 0; i < size; i++) {
    const x = ah[i]!;
    const y = bh[i]!;
    const p = x * y;
    const tx = SPLITTER * x;
    const x1 = tx - (tx - x);
    const x2 = x - x1;
    const ty = SPLITTER * y;
    const y1 = ty - (ty - y);
    const y2 = y - y1;
    const s = hi + p;
    const part = s - hi;
    const rest = x2 * y2 - (p - x1 * y1 - x2 * y1 - x1 * y2) + (x * bl[i]! + al[i]! * y);
    lo += hi - (s - part) + (p - part) + rest;
    hi = s;
  }
  sums[at] = hi;
  sums[at + 1] = lo;
}

function factor(c: DoubleDouble[], k: number): DoubleDouble[] | null {
  const r: DoubleDouble[] = Array.from({ length: k * k }, () => ({ hi: 0, lo: 0 }));
  for (let j = 0; j < k; j++) {
    for (let i = 0; i <= j; i++) {
      let s = c[i * k + j]!;
      for (let l = 0; l < i; l++) s = subtract(s, multiply(r[l * k + i]!, r[l * k + j]!));
      if (i < j) r[i * k + j] = divide(s, r[i * k + i]!);
      else if (!(s.hi > 1e-25 * c[j * k + j]!.hi)) return null;
      else r[j * k + j] = squareRoot(s);
    }
  }
  return r;
}

function invert(r: DoubleDouble[], k: number): DoubleDouble[] {
  const t: DoubleDouble[] = Array.from({ length: k * k }, () => ({ hi: 0, lo: 0 }));
  for (let j = 0; j < k; j++) {
    t[j * k + j] = divide(fromNumber(1), r[j * k + j]!);
    for (let i = j - 1; i >= 0; i--) {
      let s: DoubleDouble = { hi: 0, lo: 0 };
      for (let l = i + 1; l <= j; l++) s = add(s, multiply(r[i * k + l]!, t[l * k + j]!));
      t[i * k + j] = negate(divide(s, r[i * k + i]!));
    }
  }
  return t;
}
