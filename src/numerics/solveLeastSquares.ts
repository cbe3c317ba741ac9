/**
 * Least squares with a stated path and an honest count of digits: the one entry point for a fit that is reported.
 * Moments first; from the rows by pivoted Householder QR when the moments would lose too much (condition 1e5 and up, a
 * pivot that is not positive, or corrections that do not shrink a hundredfold per pass). Either way the coefficients are
 * then corrected with residuals in double-double until nothing is left to correct.
 * Symbols: X n × k, y n, b k, e = y − b₀ − Xb, C = X′X (centred with an intercept), T with C⁻¹ = TT′, s² = e′e/(n − p).
 */

import { accumulateMoments, type Moments } from "./accumulateMoments.ts";
import { type Centring, measureCentring } from "./centreColumns.ts";
import { choleskyFactor, invertUpper, scaledCondition, solveByRoot, timesOwnTranspose } from "./choleskyFactor.ts";
import { type Column, numbersOf } from "./column.ts";
import { type DoubleDouble, dot, fromNumber, mean } from "./doubleDouble.ts";
import { type ExactInverse, exactInverse } from "./exactInverse.ts";
import { findDependencies } from "./findDependencies.ts";
import { measureDigits } from "./measureDigits.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { type Refined, refineCoefficients } from "./refineCoefficients.ts";
import { solvePivotedQr } from "./solvePivotedQr.ts";

export interface LeastSquaresOptions {
  readonly intercept: boolean;
  /** auto unless said; "moments" still gives way to "careful" where it would fail altogether. */
  readonly path?: "auto" | "moments" | "careful";
  /** Moments of [...columns, response], when they are at hand already. */
  readonly moments?: Moments;
  /** One weight per row, n, ≥ 0 and not all zero: Σ w e² is made least. Rows of weight zero do not count. */
  readonly weights?: Float64Array;
  /** One penalty per column, k, ≥ 0: Σ w e² + Σ λ_j b_j² is made least. The intercept has none. */
  readonly penalty?: Float64Array;
}

export interface LeastSquaresSolution {
  /** b₀, or null for a fit without an intercept. */
  readonly intercept: number | null;
  /** b in raw units, column order, k. */
  readonly slopes: Float64Array;
  /** Means of the columns, k; zeros without an intercept. */
  readonly means: Float64Array;
  readonly responseMean: number;
  /** C⁻¹ in raw units, k × k row-major. */
  readonly inverse: Float64Array;
  /** T in raw units, k × k row-major: C⁻¹ = TT′. Leverages come from it without squaring the condition number. */
  readonly rootInverse: Float64Array;
  /** e, n. */
  readonly residuals: Float64Array;
  readonly residualSumOfSquares: number;
  /** Σ (y − ȳ)², or Σ y² without an intercept. */
  readonly totalSumOfSquares: number;
  /** Columns of the design, the intercept included. */
  readonly rank: number;
  readonly residualDf: number;
  /** s, or null without residual degrees of freedom. */
  readonly residualStandardError: number | null;
  /** Of the slopes, k. */
  readonly standardErrors: Float64Array;
  readonly interceptStandardError: number | null;
  readonly path: "moments" | "careful";
  /** Condition number of the columns, centred (with an intercept) and scaled to length 1; an estimate. */
  readonly condition: number;
  /** Decimal digits every slope can be trusted to, 0 to 15: see measureDigits. */
  readonly digitsToTrust: number;
}

/** From this condition number on, cross-products lose more digits than refinement on them brings back quickly. */
export const CAREFUL_CONDITION = 1e5;
/** Below this relative pivot the columns are looked at one by one before they are called independent. */
const DOUBTFUL_PIVOT = 1e-7;

/** Everything both paths hand on: how columns were moved, a root of the inverse, and where to start. */
interface Start {
  readonly centring: Centring;
  readonly responseMean: DoubleDouble;
  readonly rootInverse: Float64Array;
  readonly slopes: Float64Array;
  readonly condition: number;
}

/**
 * The least-squares fit of the response on the columns.
 * Refuses: shape (unequal lengths, no rows, nothing to fit), notFinite, tooFewRows (n ≤ p), rankDeficient with the numbers
 * of the columns that depend on earlier ones (findDependencies says how).
 * Worked value: x = 0, 1, 2 and y = 1, 3, 5.5 give slope 2.25, intercept 11/12, residual sum of squares 1/24.
 */
export function solveLeastSquares(
  given: readonly Column[],
  response: Float64Array,
  options: LeastSquaresOptions,
): LeastSquaresSolution {
  const columns = given.map(numbersOf);
  const n = checkColumns(columns, response);
  const rank = columns.length + (options.intercept ? 1 : 0);
  if (rank === 0) throw new NumericsError("shape", "there is nothing to fit: no columns and no intercept");
  if (n <= rank) throw new NumericsError("tooFewRows", `${n} rows cannot carry ${rank} coefficients and a range`);
  const quick = options.path === "careful" ? null : startFromMoments(columns, response, options);
  if (quick !== null && (quick.condition < CAREFUL_CONDITION || options.path === "moments")) {
    const refined = refineCoefficients(columns, response, quick, options.intercept, 0.01);
    if (refined !== null) return assemble(columns, response, options, quick, refined, "moments");
  }
  const careful = startFromRows(columns, response, options.intercept);
  const refined = refineCoefficients(columns, response, careful, options.intercept, null);
  return assemble(columns, response, options, careful, refined!, "careful");
}

function startFromMoments(
  columns: readonly Float64Array[],
  response: Float64Array,
  options: LeastSquaresOptions,
): Start | null {
  const k = columns.length;
  const q = k + 1;
  const moments = options.moments ?? accumulateMoments([...columns, response]);
  if (moments.rowCount !== response.length || moments.scales.length !== q) {
    throw new NumericsError(
      "shape",
      `moments of ${moments.rowCount} rows, ${moments.scales.length} columns do not fit`,
    );
  }
  const c = new Float64Array(k * k);
  const g = new Float64Array(k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) c[i * k + j] = crossProduct(moments, i, j, options.intercept);
    g[i] = crossProduct(moments, i, k, options.intercept);
  }
  const r = choleskyFactor(c, k, 1e-14);
  if (typeof r === "number") return null;
  const t = invertUpper(r, k);
  const condition = scaledCondition(c, timesOwnTranspose(t, k), k);
  const solved = solveByRoot(t, g);
  const scales = moments.scales.slice(0, k);
  const all = Array.from({ length: q }, (_, j) => ({ hi: moments.means[j]!, lo: moments.meanTails[j]! }));
  const zero = { hi: 0, lo: 0 };
  return {
    centring: { means: options.intercept ? all.slice(0, k) : all.slice(0, k).map(() => zero), spreads: scales, scales },
    responseMean: all[k]!,
    rootInverse: t.map((v, at) => v / scales[Math.floor(at / k)]!),
    slopes: solved.map((b, j) => (b * moments.scales[k]!) / scales[j]!),
    condition,
  };
}

/** Σ of z_i z_j over rows; about zero instead of the means without an intercept (n·m_i m_j added back). */
function crossProduct(moments: Moments, i: number, j: number, centred: boolean): number {
  const centredSum = moments.crossProducts[i * moments.scales.length + j]!;
  if (centred) return centredSum;
  return (
    centredSum + moments.rowCount * (moments.means[i]! / moments.scales[i]!) * (moments.means[j]! / moments.scales[j]!)
  );
}

function startFromRows(columns: readonly Float64Array[], response: Float64Array, intercept: boolean): Start {
  const centring = measureCentring(columns, intercept);
  const qr = solvePivotedQr(columns, response, { intercept, centring });
  if (qr.rank < columns.length || qr.relativePivots.some((pivot) => pivot < DOUBTFUL_PIVOT)) {
    const dependent = findDependencies(columns, { intercept }).dependent.map((d) => d.column);
    const named = dependent.length > 0 ? dependent : qr.order.slice(qr.rank);
    if (named.length > 0) throw new NumericsError("rankDeficient", "some columns depend on earlier ones", named);
  }
  const { rootInverse, coefficients: slopes, condition } = qr;
  return { centring, responseMean: mean(response), rootInverse, slopes, condition };
}

/** Products that may go into the exact inverse, by how many digits the plain one would lose. */
function exactBudget(condition: number): number {
  return condition < 30 ? 2e6 : condition < 1e3 ? 1e7 : 1e8;
}

function inverseOf(columns: readonly Float64Array[], start: Start): ExactInverse {
  const k = columns.length;
  const products = ((columns[0]?.length ?? 0) * k * (k + 1)) / 2;
  if (k > 0 && products <= exactBudget(start.condition)) {
    const exact = exactInverse(columns, start.centring);
    if (exact !== null) return exact;
  }
  const { rootInverse } = start;
  let meanForm = 0;
  for (let j = 0; j < k; j++) {
    let s = 0;
    for (let i = 0; i < k; i++) s += rootInverse[i * k + j]! * start.centring.means[i]!.hi;
    meanForm += s * s;
  }
  return { inverse: timesOwnTranspose(rootInverse, k), rootInverse, meanForm };
}

function assemble(
  columns: readonly Float64Array[],
  response: Float64Array,
  options: LeastSquaresOptions,
  start: Start,
  refined: Refined,
  path: "moments" | "careful",
): LeastSquaresSolution {
  const k = columns.length;
  const n = response.length;
  const rank = k + (options.intercept ? 1 : 0);
  const { inverse, rootInverse, meanForm } = inverseOf(columns, start);
  const slopes = Float64Array.from(refined.slopes, (b) => b.hi);
  const { residuals, residualSumOfSquares } = refined.pass;
  const residualDf = n - rank;
  const s = residualDf > 0 ? Math.sqrt(residualSumOfSquares / residualDf) : null;
  const standardErrors = Float64Array.from({ length: k }, (_, j) => (s ?? 0) * Math.sqrt(inverse[j * k + j]!));
  const digitsToTrust = measureDigits(columns, response, {
    slopes,
    standardErrors,
    inverse,
    residualSumOfSquares,
    refined,
  });
  return {
    intercept: options.intercept ? refined.intercept.hi : null,
    slopes,
    means: Float64Array.from(start.centring.means, (m) => m.hi),
    responseMean: start.responseMean.hi,
    inverse,
    rootInverse,
    residuals,
    residualSumOfSquares,
    totalSumOfSquares: sumOfSquares(response, options.intercept ? start.responseMean : fromNumber(0)),
    rank,
    residualDf,
    residualStandardError: s,
    standardErrors,
    interceptStandardError: options.intercept && s !== null ? s * Math.sqrt(1 / n + meanForm) : null,
    path,
    condition: start.condition,
    digitsToTrust,
  };
}

function sumOfSquares(values: Float64Array, centre: DoubleDouble): number {
  const moved = values.map((v) => v - centre.hi - centre.lo);
  return dot(moved, moved).hi;
}
