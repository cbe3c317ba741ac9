/**
 * Repeated weighted least squares for estimators whose weights follow from the residuals. Each step corrects the coefficients
 * by what the residuals still say, so that rounding does not pile up; rows are read in tiles, a choice never becomes a matrix.
 * Symbols: Z n × (k + 1): ones, then z = (x − m)/c; β (k + 1): the response at the means, then slopes per z; W weights;
 * Λ penalties per z (0 for the ones): β ← β + (Z′WZ + Λ)⁻¹(Z′We − Λβ), e = y − Zβ (Holland & Welsch 1977).
 */
import { powerOfTwoNear, rootMeanSquare } from "./accumulateMoments.ts";
import { choleskyFactor, invertUpper, solveByRoot } from "./choleskyFactor.ts";
import { type Column, isIndicator, numbersOf, valueAt } from "./column.ts";
import { NumericsError } from "./numericsError.ts";

export interface Frame {
  readonly n: number;
  readonly k: number;
  readonly columns: readonly Column[];
  /** m, k. */
  readonly means: Float64Array;
  /** c, k: powers of two near the columns' spreads. */
  readonly scales: Float64Array;
  /** Λ, k + 1. */
  readonly penalty: Float64Array;
}

/** Rows in a tile, and the distance between a tile's columns. */
export const TILE_ROWS = 256;
/** Below this relative pivot a weighted column is no longer told from the ones before it. */
const SMALLEST_PIVOT = 1e-13;

export interface FrameOptions {
  /** Means are weighted by these; all alike unless given. */
  readonly weights?: Float64Array | null;
  /** c, k, in place of powers of two. */
  readonly scales?: Float64Array;
}

/** Columns with their centring; `penalty` in raw units, k, or null. Refuses (shape) unequal lengths and no rows. */
export function frameOf(
  columns: readonly Column[],
  n: number,
  penalty: Float64Array | null,
  options: FrameOptions = {},
): Frame {
  const k = columns.length;
  const uneven = columns.flatMap((column, j) => (column.length === n ? [] : [j]));
  if (n === 0) throw new NumericsError("shape", "there are no rows");
  if (uneven.length > 0) throw new NumericsError("shape", `columns must have ${n} rows`, uneven);
  const means = new Float64Array(k);
  const scales = new Float64Array(k);
  const scaledPenalty = new Float64Array(k + 1);
  for (let j = 0; j < k; j++) {
    const values = numbersOf(columns[j]!);
    means[j] = meanOf(values, options.weights);
    scales[j] = options.scales?.[j] ?? powerOfTwoNear(rootMeanSquare(values, means[j]!, 0));
    scaledPenalty[j + 1] = (penalty?.[j] ?? 0) / scales[j]! ** 2;
  }
  return { n, k, columns, means, scales, penalty: scaledPenalty };
}

/** Σ wx/Σw; `weights` null: the plain mean. Corrected once by the mean of what is left, so that offsets do not cost digits. */
export function meanOf(values: Float64Array, weights: Float64Array | null = null): number {
  const total = weights === null ? values.length : weights.reduce((sum, w) => sum + w, 0);
  let centre = 0;
  for (let pass = 0; pass < 2; pass++) {
    let sum = 0;
    for (let i = 0; i < values.length; i++) sum += (weights === null ? 1 : weights[i]!) * (values[i]! - centre);
    centre += sum / total;
  }
  return centre;
}

/** Visits the rows of Z in tiles: column j of a tile of `size` rows from `start` lies at tile[j·256 …]. */
export function eachTile(frame: Frame, visit: (tile: Float64Array, start: number, size: number) => void): void {
  // Three columns to spare, so that four can always be read at once.
  const tile = new Float64Array((frame.k + 4) * TILE_ROWS).fill(1);
  for (let start = 0; start < frame.n; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, frame.n - start);
    for (let j = 0; j < frame.k; j++) packTile(tile, j, frame, start, size);
    visit(tile, start, size);
  }
}

function packTile(tile: Float64Array, j: number, frame: Frame, start: number, size: number): void {
  const column = frame.columns[j]!;
  const mean = frame.means[j]!;
  const factor = 1 / frame.scales[j]!;
  const at = (j + 1) * TILE_ROWS;
  if (isIndicator(column)) {
    const { codes, level } = column;
    const on = (1 - mean) * factor;
    const off = -mean * factor;
    for (let i = 0; i < size; i++) tile[at + i] = codes[start + i] === level ? on : off;
  } else for (let i = 0; i < size; i++) tile[at + i] = (column[start + i]! - mean) * factor;
}

/** Writes row i of Z into `row`, k + 1. */
export function readFrameRow(frame: Frame, i: number, row: Float64Array): void {
  row[0] = 1;
  for (let j = 0; j < frame.k; j++) row[j + 1] = (valueAt(frame.columns[j]!, i) - frame.means[j]!) / frame.scales[j]!;
}

/** e = y − Zβ, n. */
export function residualsAt(frame: Frame, response: Float64Array, coefficients: Float64Array): Float64Array {
  const residuals = Float64Array.from(response);
  eachTile(frame, (tile, start, size) => {
    for (let j = 0; j <= frame.k; j++) {
      const b = coefficients[j]!;
      const at = j * TILE_ROWS;
      if (b !== 0) for (let i = 0; i < size; i++) residuals[start + i]! -= b * tile[at + i]!;
    }
  });
  return residuals;
}

/** Z′Wv, k + 1. */
export function productsWith(frame: Frame, weights: Float64Array | null, v: Float64Array): Float64Array {
  const vector = new Float64Array(frame.k + 1);
  eachTile(frame, (tile, start, size) => {
    for (let j = 0; j <= frame.k; j++) {
      let sum = 0;
      for (let i = 0; i < size; i++) {
        const w = weights === null ? 1 : weights[start + i]!;
        sum += w * tile[j * TILE_ROWS + i]! * v[start + i]!;
      }
      vector[j]! += sum;
    }
  });
  return vector;
}

/** Z′WZ + Λ, (k + 1)² row-major, and Z′Wv, k + 1. `weights` null: all 1. */
export function weightedProducts(
  frame: Frame,
  weights: Float64Array | null,
  v: Float64Array,
): { matrix: Float64Array; vector: Float64Array } {
  const q = frame.k + 1;
  const matrix = new Float64Array(q * q);
  const vector = new Float64Array(q);
  const weighted = new Float64Array(TILE_ROWS);
  eachTile(frame, (tile, start, size) => {
    for (let j = 0; j < q; j++) {
      let withV = 0;
      for (let i = 0; i < size; i++) {
        weighted[i] = weights === null ? tile[j * TILE_ROWS + i]! : weights[start + i]! * tile[j * TILE_ROWS + i]!;
        withV += weighted[i]! * v[start + i]!;
      }
      vector[j]! += withV;
      for (let l = 0; l <= j; l += 4) addFour(matrix, j, l, q, weighted, tile, size);
    }
  });
  for (let j = 0; j < q; j++) {
    for (let l = 0; l < j; l++) matrix[l * q + j] = matrix[j * q + l]!;
    matrix[j * q + j]! += frame.penalty[j]!;
  }
  return { matrix, vector };
}

/** Adds the products of one weighted column j with columns l to l + 3, up to j: four sums at a time do not wait for each other. */
function addFour(
  matrix: Float64Array,
  j: number,
  l: number,
  q: number,
  weighted: Float64Array,
  tile: Float64Array,
  size: number,
): void {
  const a = l * TILE_ROWS;
  const b = a + TILE_ROWS;
  const c = b + TILE_ROWS;
  const d = c + TILE_ROWS;
  let withA = 0;
  let withB = 0;
  let withC = 0;
  let withD = 0;
  for (let i = 0; i < size; i++) {
    const w = weighted[i]!;
    withA += w * tile[a + i]!;
    withB += w * tile[b + i]!;
    withC += w * tile[c + i]!;
    withD += w * tile[d + i]!;
  }
  const at = j * q + l;
  matrix[at]! += withA;
  if (l + 1 <= j) matrix[at + 1]! += withB;
  if (l + 2 <= j) matrix[at + 2]! += withC;
  if (l + 3 <= j) matrix[at + 3]! += withD;
}

/** T with (matrix)⁻¹ = TT′. Refuses rankDeficient, with the column number where one is to blame. */
export function rootOf(matrix: Float64Array, q: number): Float64Array {
  const factor = choleskyFactor(matrix, q, SMALLEST_PIVOT);
  if (typeof factor !== "number") return invertUpper(factor, q);
  const named = factor === 0 ? [] : [factor - 1];
  throw new NumericsError("rankDeficient", "the rows that still count do not tell the columns apart", named);
}

/** How far β moves in one weighted step from where the residuals are `residuals`, k + 1. Refuses rankDeficient. */
export function weightedStep(
  frame: Frame,
  weights: Float64Array | null,
  residuals: Float64Array,
  coefficients: Float64Array,
): Float64Array {
  const { matrix, vector } = weightedProducts(frame, weights, residuals);
  for (let j = 0; j <= frame.k; j++) vector[j]! -= frame.penalty[j]! * coefficients[j]!;
  return solveByRoot(rootOf(matrix, frame.k + 1), vector);
}

/** Largest move of any coefficient, in response units per spread of its column. */
export function largestMove(step: Float64Array): number {
  return step.reduce((largest, move) => Math.max(largest, Math.abs(move)), 0);
}

/** β in raw units: intercept and slopes. */
export function rawCoefficients(frame: Frame, coefficients: Float64Array): { intercept: number; slopes: Float64Array } {
  const slopes = frame.scales.map((scale, j) => coefficients[j + 1]! / scale);
  const intercept = slopes.reduce((sum, b, j) => sum - b * frame.means[j]!, coefficients[0]!);
  return { intercept, slopes };
}
