/**
 * What each row says about a fit and the fit without it, in one pass over the rows, all in closed form.
 * Symbols: w weights, e = y − ŷ, d = x − x̄, C⁻¹ = TT′, h = w(1/W + |T′d|²) leverage (Hoaglin & Welsch 1978), p rank, s² = Σ w e²/(n − p).
 * Internally studentised r = √w e/(s√(1 − h)); externally, with the s of the other rows, t = r√((n − p − 1)/(n − p − r²))
 * (Beckman & Trussell 1974); Cook's distance r²h/(p(1 − h)) (Cook 1977); DFFITS t√(h/(1 − h)), DFBETAS and
 * COVRATIO (Belsley, Kuh & Welsch 1980); price without the row y − e/(1 − h) (Allen 1974).
 */
import { type Column, valueAt } from "./column.ts";
import { currentKernel } from "./kernels/currentKernel.ts";
import {
  blocksOf,
  COLUMN_BYTES,
  type DesignChoice,
  type DesignPlan,
  planDesign,
  putBlock,
} from "./kernels/designBlocks.ts";
import type { Kernel } from "./kernels/kernel.ts";
import { COLUMN_STRIDE } from "./kernels/layout.ts";
import { NumericsError } from "./numericsError.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

/** Arrays over rows. A row of weight 0 counts for nothing: leverage, r, t, Cook and DFFITS 0, price without it = fitted. */
export interface RowDiagnostics {
  readonly fitted: Float64Array;
  readonly leverages: Float64Array;
  /** r; NaN for this and all that follow where 1 − h is only rounding: the row is the only one of its kind. */
  readonly internallyStudentised: Float64Array;
  /** t, with n − p − 1 degrees of freedom; NaN with DFFITS where there are none left. */
  readonly externallyStudentised: Float64Array;
  readonly cooksDistances: Float64Array;
  readonly dffits: Float64Array;
  readonly fittedWithout: Float64Array;
}

/** Places of a block in the kernel's memory, in bytes. */
interface Layout {
  readonly columns: number;
  /** Columns filled up to threes. */
  readonly filled: number;
  readonly rootInverse: number;
  readonly isUpper: boolean;
  readonly lengths: number;
  readonly residuals: number;
  readonly response: number;
  readonly roots: number;
  readonly out: number;
}

const OUTPUTS = 7;

/**
 * Diagnostics of a fit of these columns and this response, which its residuals, root of the inverse and s are taken from.
 * Refuses (shape) lengths that disagree and (tooFewRows) a fit without residual degrees of freedom. Under a penalty leverages
 * and prices without a row stay exact for that penalty; t is then as if s changed as it does without one.
 */
export function rowDiagnostics(
  columns: readonly Column[],
  response: Float64Array,
  solution: LeastSquaresSolution,
  weights: Float64Array | null = null,
): RowDiagnostics {
  const n = response.length;
  const s = checkFit(columns, response, solution, weights);
  const kernel = currentKernel();
  const plan = planDesign(columns, n);
  const layout = layOut(kernel, columns.length, solution.rootInverse);
  const results = Array.from({ length: OUTPUTS }, () => new Float64Array(n));
  const freedom = solution.residualDf > 1 ? solution.residualDf - 1 : Number.NaN;
  const roots = weights?.map(Math.sqrt) ?? null;
  if (roots === null) kernel.f64.fill(1, layout.roots / 8, layout.roots / 8 + COLUMN_STRIDE);
  for (const { start, size } of blocksOf(n)) {
    putLengths(kernel, layout, plan, columns, solution, start, size);
    const { f64, operations } = kernel;
    putBlock(f64, layout.residuals, solution.residuals, start, size);
    putBlock(f64, layout.response, response, start, size);
    if (roots !== null) putBlock(f64, layout.roots, roots, start, size);
    const { residuals, lengths, out } = layout;
    operations.diagnoseRows(residuals, layout.response, layout.roots, lengths, size, s, freedom, solution.rank, out);
    results.forEach((result, at) => {
      const from = (out + at * COLUMN_BYTES) / 8;
      result.set(f64.subarray(from, from + size), start);
    });
  }
  const [fitted, leverages, internallyStudentised, externallyStudentised, cooksDistances, dffits, fittedWithout] =
    results as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  return {
    fitted,
    leverages,
    internallyStudentised,
    externallyStudentised,
    cooksDistances,
    dffits,
    fittedWithout,
  };
}

function checkFit(
  columns: readonly Column[],
  response: Float64Array,
  { residuals, slopes, residualStandardError }: LeastSquaresSolution,
  weights: Float64Array | null,
): number {
  const n = response.length;
  const isWrong = residuals.length !== n || (weights !== null && weights.length !== n);
  if (isWrong || columns.some(({ length }) => length !== n) || slopes.length !== columns.length)
    throw new NumericsError("shape", `the fit, ${columns.length} columns and ${n} responses do not go together`);
  if (residualStandardError === null)
    throw new NumericsError("tooFewRows", "a fit without residual degrees of freedom says nothing about its rows");
  return residualStandardError;
}

function layOut(kernel: Kernel, k: number, rootInverse: Float64Array): Layout {
  const filled = Math.ceil(k / 3) * 3;
  const first = kernel.reserve(0);
  const at = (column: number): number => first + (filled + column) * COLUMN_BYTES;
  const root = at(4 + OUTPUTS);
  kernel.reserve(root + filled * filled * 8 - first);
  const { f64 } = kernel;
  f64.fill(0, first / 8, (root + filled * filled * 8) / 8);
  let isUpper = true;
  for (let a = 0; a < k; a++) {
    for (let b = 0; b < k; b++) {
      const value = rootInverse[a * k + b]!;
      f64[root / 8 + a * filled + b] = value;
      if (b < a && value !== 0) isUpper = false;
    }
  }
  return {
    columns: first,
    filled,
    rootInverse: root,
    isUpper,
    lengths: at(0),
    residuals: at(1),
    response: at(2),
    roots: at(3),
    out: at(4),
  };
}

/** 1/W + |T′d|² of the block's rows. */
function putLengths(
  { f64, operations }: Kernel,
  layout: Layout,
  { numbers, choices }: DesignPlan,
  columns: readonly Column[],
  { means, intercept, weightSum }: LeastSquaresSolution,
  start: number,
  size: number,
): void {
  for (const j of numbers) {
    const at = layout.columns + j * COLUMN_BYTES;
    putBlock(f64, at, columns[j] as Float64Array, start, size);
    operations.centreColumn(at, size, means[j]!, 0, 1);
  }
  for (const choice of choices) putLevels(f64, layout, choice, means, start, size);
  const { lengths, filled, rootInverse, isUpper } = layout;
  f64.fill(intercept === null ? 0 : 1 / weightSum, lengths / 8, lengths / 8 + size);
  operations.addSquaredLengths(layout.columns, filled, size, rootInverse, isUpper ? 1 : 0, lengths);
}

/** Each level's column less its mean: −m everywhere, then 1 − m once per row, in the column of the row's level if it has one. */
function putLevels(
  f64: Float64Array,
  layout: Layout,
  { codes, levels, size: codeCount }: DesignChoice,
  means: Float64Array,
  start: number,
  size: number,
): void {
  const columnOf = new Int32Array(codeCount).fill(-1);
  for (const { column, code } of levels) {
    columnOf[code] = column;
    const at = layout.columns / 8 + column * COLUMN_STRIDE;
    f64.fill(-means[column]!, at, at + size);
  }
  for (let i = 0; i < size; i++) {
    const column = columnOf[codes[start + i]!]!;
    if (column >= 0) f64[layout.columns / 8 + column * COLUMN_STRIDE + i] = 1 - means[column]!;
  }
}

/**
 * COVRATIO per row: the determinant of the coefficients' covariance without the row over that with it,
 * ((n − p − r²)/(n − p − 1))^p/(1 − h). NaN where the diagnostics are.
 */
export function covarianceRatios(found: RowDiagnostics, { residualDf, rank }: LeastSquaresSolution): Float64Array {
  return found.leverages.map((h, i) => {
    const r = found.internallyStudentised[i]!;
    return residualDf > 1 ? (Math.max(0, residualDf - r * r) / (residualDf - 1)) ** rank / (1 - h) : Number.NaN;
  });
}

/**
 * DFBETAS of one row: by how many of its standard errors (with the s of the other rows) each slope moves through it,
 * (C⁻¹d)_j · w e/((1 − h) · s₍ᵢ₎ · √C⁻¹_jj), in column order, and the intercept last when there is one. NaN where t is.
 */
export function coefficientMoves(
  columns: readonly Column[],
  solution: LeastSquaresSolution,
  found: RowDiagnostics,
  row: number,
  weight = 1,
): Float64Array {
  const { inverse, means, weightSum, intercept } = solution;
  const k = columns.length;
  const t = found.externallyStudentised[row]!;
  const gap = 1 - found.leverages[row]!;
  // w e/((1 − h)s₍ᵢ₎) = √w t/√(1 − h).
  const factor = (Math.sqrt(weight) * t) / Math.sqrt(gap);
  const moves = new Float64Array(k + (intercept === null ? 0 : 1));
  let toIntercept = 1 / weightSum;
  let interceptVariance = 1 / weightSum;
  for (let j = 0; j < k; j++) {
    let move = 0;
    let spread = 0;
    for (let l = 0; l < k; l++) {
      move += inverse[j * k + l]! * (valueAt(columns[l]!, row) - means[l]!);
      spread += inverse[j * k + l]! * means[l]!;
    }
    moves[j] = (move * factor) / Math.sqrt(inverse[j * k + j]!);
    toIntercept -= move * means[j]!;
    interceptVariance += spread * means[j]!;
  }
  if (intercept !== null) moves[k] = (toIntercept * factor) / Math.sqrt(interceptVariance);
  return moves;
}
