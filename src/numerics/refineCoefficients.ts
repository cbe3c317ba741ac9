/**
 * One pass over the rows in double-double: residuals of given coefficients and what they still have in common with the
 * columns. Correcting the coefficients by C⁻¹X′e until nothing is left gives the correctly rounded least-squares solution
 * of the stored data (Björck 1967; extra-precise residuals: Demmel, Hida, Riedy & Li 2009).
 * Symbols: b slopes, b₀ intercept, e = y − b₀ − Xb, g = X′e (centred columns when there is an intercept).
 */
import { solveByRoot } from "./choleskyFactor.ts";
import { add, type DoubleDouble, fromNumber, multiply, SPLITTER, subtract } from "./doubleDouble.ts";

import { NumericsError } from "./numericsError.ts";

const TILE_ROWS = 512;

export interface RowPass {
  /** e rounded to doubles, n. */
  readonly residuals: Float64Array;
  /** Σ e² in double-double, rounded. */
  readonly residualSumOfSquares: number;
  /** g, k. */
  readonly gradient: Float64Array;
}

/** b₀ = ȳ − Σ m_j b_j, so that residuals have mean zero. */
export function interceptOf(
  responseMean: DoubleDouble,
  means: readonly DoubleDouble[],
  slopes: readonly DoubleDouble[],
): DoubleDouble {
  return slopes.reduce((rest, b, j) => subtract(rest, multiply(b, means[j]!)), responseMean);
}

/** Residuals, their sum of squares, and g. `means` are zero without an intercept. */
export function passOverRows(
  columns: readonly Float64Array[],
  response: Float64Array,
  slopes: readonly DoubleDouble[],
  intercept: DoubleDouble,
  means: readonly DoubleDouble[],
): RowPass {
  const n = response.length;
  const k = columns.length;
  const residuals = new Float64Array(n);
  const high = new Float64Array(TILE_ROWS);
  const low = new Float64Array(TILE_ROWS);
  const sums = new Float64Array(2 * k);
  const squares = new Float64Array(2);
  const total = new Float64Array(2);
  const ones = new Float64Array(TILE_ROWS).fill(1);
  for (let start = 0; start < n; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, n - start);
    for (let i = 0; i < size; i++) {
      high[i] = response[start + i]!;
      low[i] = 0;
    }
    subtractMultiple(ones, 0, size, intercept, high, low);
    for (let j = 0; j < k; j++) subtractMultiple(columns[j]!, start, size, slopes[j]!, high, low);
    for (let i = 0; i < size; i++) {
      const hi = high[i]! + low[i]!;
      low[i] = low[i]! - (hi - high[i]!);
      high[i] = hi;
      residuals[start + i] = hi;
    }
    for (let j = 0; j < k; j++) addProducts(columns[j]!, start, size, high, low, sums, 2 * j);
    addProducts(ones, 0, size, high, low, total, 0);
    addProducts(high, 0, size, high, low, squares, 0);
  }
  const sumOfResiduals = { hi: total[0]!, lo: total[1]! };
  const gradient = Float64Array.from({ length: k }, (_, j) => {
    const g = add({ hi: sums[2 * j]!, lo: 0 }, fromNumber(sums[2 * j + 1]!));
    return subtract(g, multiply(means[j]!, sumOfResiduals)).hi;
  });
  return { residuals, residualSumOfSquares: squares[0]! + squares[1]!, gradient };
}

/** (high, low) −= x·b for one tile; x·b.hi exactly, by Dekker's product. */
function subtractMultiple(
  x: Float64Array,
  start: number,
  size: number,
  b: DoubleDouble,
  high: Float64Array,
  low: Float64Array,
): void {
  const bh = b.hi;
  const bl = b.lo;
  const tb = SPLITTER * bh;
  const b1 = tb - (tb - bh);
  const b2 = bh - b1;
  for (let i = 0; i < size; i++) {
    const v = x[start + i]!;
    const p = v * bh;
    const t = SPLITTER * v;
    const v1 = t - (t - v);
    const v2 = v - v1;
    const rest = v2 * b2 - (p - v1 * b1 - v2 * b1 - v1 * b2) + v * bl;
    const old = high[i]!;
    const s = old - p;
    const part = s - old;
    low[i] = low[i]! + (old - (s - part) - (p + part)) - rest;
    high[i] = s;
  }
}

/** sums[at], sums[at + 1] += Σ x·(high + low) over one tile. */
function addProducts(
  x: Float64Array,
  start: number,
  size: number,
  high: Float64Array,
  low: Float64Array,
  sums: Float64Array,
  at: number,
): void {
  let hi = sums[at]!;
  let lo = sums[at + 1]!;
  for (let i = 0; i < size; i++) {
    const v = x[start + i]!;
    const w = high[i]!;
    const p = v * w;
    const tv = SPLITTER * v;
    const v1 = tv - (tv - v);
    const v2 = v - v1;
    const tw = SPLITTER * w;
    const w1 = tw - (tw - w);
    const w2 = w - w1;
    const s = hi + p;
    const part = s - hi;
    lo += hi - (s - part) + (p - part) + (v2 * w2 - (p - v1 * w1 - v2 * w1 - v1 * w2)) + v * low[i]!;
    hi = s;
  }
  sums[at] = hi;
  sums[at + 1] = lo;
}

export interface Refined {
  readonly slopes: DoubleDouble[];
  readonly intercept: DoubleDouble;
  readonly pass: RowPass;
  /** Size of each correction, largest over the slopes and relative to the slope. */
  readonly corrections: number[];
}

/** A correction below a quarter of a unit in the last place changes no printed digit. */
const NEGLIGIBLE = 2 ** -54;
const MOST_PASSES = 15;

/**
 * Slopes corrected until a correction is negligible. With `demanded`, null as soon as a correction is not below that share
 * of the one before; without it, the best that was reached.
 */
export function refineCoefficients(
  columns: readonly Float64Array[],
  response: Float64Array,
  start: {
    readonly centring: { readonly means: readonly DoubleDouble[]; readonly scales: Float64Array };
    readonly responseMean: DoubleDouble;
    readonly rootInverse: Float64Array;
    readonly slopes: Float64Array;
  },
  hasIntercept: boolean,
  demanded: number | null,
): Refined | null {
  const { means, scales } = start.centring;
  const corrections: number[] = [];
  let slopes: DoubleDouble[] = Array.from(start.slopes, fromNumber);
  for (;;) {
    const intercept = hasIntercept ? interceptOf(start.responseMean, means, slopes) : { hi: 0, lo: 0 };
    const pass = passOverRows(columns, response, slopes, intercept, means);
    const step = solveByRoot(start.rootInverse, pass.gradient);
    const size = correctionSize(step, slopes, pass, start.rootInverse, scales);
    const previous = corrections.at(-1) ?? 1;
    corrections.push(size);
    if (!Number.isFinite(size)) throw new NumericsError("notFinite", "the values are too large or too small to fit");
    if (size <= NEGLIGIBLE || corrections.length === MOST_PASSES) return { slopes, intercept, pass, corrections };
    const isSlow = !(size < (demanded ?? 0.5) * previous) && size > 1e-15;
    if (isSlow && demanded !== null) return null;
    if (isSlow && corrections.length > 1) return { slopes, intercept, pass, corrections };
    slopes = slopes.map((b, j) => add(b, fromNumber(step[j]!)));
  }
}

/**
 * Largest |δ_j| against |b_j|. A slope that is zero but for noise is measured against a thousandth of its standard error,
 * and never against less than 1e-12 of the largest slope in the columns' own scale, else it would never settle.
 */
function correctionSize(
  step: Float64Array,
  slopes: readonly DoubleDouble[],
  pass: RowPass,
  rootInverse: Float64Array,
  scales: Float64Array,
): number {
  const k = step.length;
  const s = Math.sqrt(pass.residualSumOfSquares / Math.max(1, pass.residuals.length - k - 1));
  const largest = slopes.reduce((most, b, j) => Math.max(most, Math.abs(b.hi) * scales[j]!), 0);
  let size = 0;
  for (let j = 0; j < k; j++) {
    if (step[j] === 0) continue;
    let variance = 0;
    for (let l = 0; l < k; l++) variance += rootInverse[j * k + l]! ** 2;
    const measure = Math.max(Math.abs(slopes[j]!.hi), 1e-3 * s * Math.sqrt(variance), (1e-12 * largest) / scales[j]!);
    size = Math.max(size, Math.abs(step[j]!) / measure);
  }
  return size;
}
