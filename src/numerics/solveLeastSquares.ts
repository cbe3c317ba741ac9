/**
 * Least squares with a stated path and an honest count of digits: the one entry point for a fit that is reported.
 * Moments first; from the rows by pivoted Householder QR when the moments would lose too much (condition 1e5 and up, a
 * pivot that is not positive, or corrections that do not shrink a hundredfold per pass). Either way the coefficients are
 * then corrected with residuals in double-double until nothing is left to correct.
 * Symbols: X n × k, y n, b k, w weights, λ penalties, e = y − b₀ − Xb, C = X′WX + Λ (centred with an intercept), T with
 * C⁻¹ = TT′, s² = e′We/(n − p).
 */
import { accumulateMoments, type Moments } from "./accumulateMoments.ts";
import { type Centring, centringOf } from "./centring.ts";
import { choleskyFactor, invertUpper, scaledCondition, solveByRoot, timesOwnTranspose } from "./choleskyFactor.ts";
import { type Column, numbersOf } from "./column.ts";
import type { DoubleDouble } from "./doubleDouble.ts";
import { type ExactInverse, exactInverse } from "./exactInverse.ts";
import { findDependencies } from "./findDependencies.ts";
import { measureDigits } from "./measureDigits.ts";
import { NumericsError } from "./numericsError.ts";
import { type Refined, refineCoefficients } from "./refineCoefficients.ts";
import { type PivotedQr, solvePivotedQr } from "./solvePivotedQr.ts";

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
  /** Low parts of columns known to more than a double, null for the others: the refinement reads them. */
  readonly tails?: readonly (Float64Array | null)[];
}

export interface LeastSquaresSolution {
  /** b₀, or null for a fit without an intercept. */
  readonly intercept: number | null;
  /** b in raw units, column order, k. */
  readonly slopes: Float64Array;
  /** Means of the columns, k; zeros without an intercept. */
  readonly means: Float64Array;
  readonly responseMean: number;
  /** Σ w; n without weights. */
  readonly weightSum: number;
  /** C⁻¹ in raw units, k × k row-major. */
  readonly inverse: Float64Array;
  /** T in raw units, k × k row-major: C⁻¹ = TT′. Leverages come from it without squaring the condition number. */
  readonly rootInverse: Float64Array;
  /** e, n, unweighted. */
  readonly residuals: Float64Array;
  /** Σ w e². */
  readonly residualSumOfSquares: number;
  /** Σ w (y − ȳ)², or Σ w y² without an intercept. */
  readonly totalSumOfSquares: number;
  /** Columns of the design, the intercept included. */
  readonly rank: number;
  /** Rows with a weight above 0, less the rank; a penalty does not change it. */
  readonly residualDf: number;
  /** Trace of the hat matrix: the rank without penalties, less with them. */
  readonly effectiveRank: number;
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
/** From this condition number on, an inverse of cross-products is worth less than one of the rows' own triangle. */
const FACTOR_CONDITION = 300;
/** Below this relative pivot the columns are looked at one by one before they are called independent. */
const DOUBTFUL_PIVOT = 1e-7;

interface Problem {
  readonly columns: readonly Column[];
  readonly response: Float64Array;
  readonly hasIntercept: boolean;
  readonly weights: Float64Array | null;
  readonly penalty: Float64Array | null;
  readonly tails: readonly (Float64Array | null)[] | null;
  /** Of the columns and, last, the response. */
  readonly moments: Moments;
  readonly centring: Centring;
  readonly weightSum: number;
}

/** What both paths hand on: a root of the inverse in raw units, and where to start. */
interface Start {
  readonly rootInverse: Float64Array;
  readonly slopes: Float64Array;
  readonly condition: number;
}

/**
 * The least-squares fit of the response on the columns.
 * Refuses: shape (unequal lengths, no rows, nothing to fit), notFinite (values, weights or penalties that are not finite, or
 * below 0), tooFewRows (n ≤ p among rows that count), rankDeficient with the numbers of the columns that depend on earlier
 * ones (findDependencies says how).
 * Worked value: x = 0, 1, 2 and y = 1, 3, 5.5 give slope 2.25, intercept 11/12, residual sum of squares 1/24.
 */
export function solveLeastSquares(
  columns: readonly Column[],
  response: Float64Array,
  options: LeastSquaresOptions,
): LeastSquaresSolution {
  const rank = columns.length + (options.intercept ? 1 : 0);
  if (rank === 0) throw new NumericsError("shape", "there is nothing to fit: no columns and no intercept");
  const problem = problemOf(columns, response, options);
  const n = problem.moments.rowCount;
  if (n <= rank) throw new NumericsError("tooFewRows", `${n} rows cannot carry ${rank} coefficients and a range`);
  const quick = options.path === "careful" ? null : startFromMoments(problem);
  if (quick !== null && (quick.condition < CAREFUL_CONDITION || options.path === "moments")) {
    const refined = refineCoefficients(problem, refineStart(problem, quick), 0.01);
    if (refined !== null) return assemble(problem, quick, refined, "moments");
  }
  const careful = startFromRows(problem);
  const refined = refineCoefficients(problem, refineStart(problem, careful), null);
  return assemble(problem, careful, refined!, "careful");
}

function problemOf(columns: readonly Column[], response: Float64Array, options: LeastSquaresOptions): Problem {
  const { intercept, weights, penalty, tails } = options;
  if (penalty !== undefined) checkPenalty(penalty, columns.length);
  const moments = options.moments ?? momentsOf(columns, response, weights);
  const isFitting = moments.scales.length === columns.length + 1 && response.length >= moments.rowCount;
  if (!isFitting || columns.some(({ length }) => length !== response.length)) {
    throw new NumericsError(
      "shape",
      `moments of ${moments.rowCount} rows, ${moments.scales.length} columns do not fit`,
    );
  }
  return {
    columns,
    response,
    hasIntercept: intercept,
    weights: weights ?? null,
    penalty: penalty ?? null,
    tails: tails ?? null,
    moments,
    centring: centringOf(moments, intercept),
    weightSum: moments.weightSum,
  };
}

/** The response is column −1 in what is refused. */
function momentsOf(columns: readonly Column[], response: Float64Array, weights: Float64Array | undefined): Moments {
  try {
    return accumulateMoments([...columns, response], { weights });
  } catch (cause) {
    if (!(cause instanceof NumericsError)) throw cause;
    const named = cause.columns.map((j) => (j === columns.length ? -1 : j));
    throw new NumericsError(cause.code, cause.message, named);
  }
}

function checkPenalty(penalty: Float64Array, k: number): void {
  if (penalty.length !== k) throw new NumericsError("shape", `${penalty.length} penalties for ${k} columns`);
  const bad = [...penalty.keys()].filter((j) => !(penalty[j]! >= 0 && penalty[j]! < Number.POSITIVE_INFINITY));
  if (bad.length > 0) throw new NumericsError("notFinite", "some penalties are not numbers from 0 up", bad);
}

function refineStart({ centring, moments }: Problem, { rootInverse, slopes }: Start) {
  const at = slopes.length;
  const responseMean = { hi: moments.means[at]!, lo: moments.meanTails[at]! };
  return { centring, responseMean, rootInverse, slopes };
}

function startFromMoments({ moments, centring, hasIntercept, penalty }: Problem): Start | null {
  const k = moments.scales.length - 1;
  const { scales } = centring;
  const c = new Float64Array(k * k);
  const g = new Float64Array(k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) c[i * k + j] = crossProduct(moments, scales, i, j, hasIntercept);
    if (penalty !== null) c[i * k + i]! += penalty[i]! / scales[i]! / scales[i]!;
    g[i] = crossProduct(moments, scales, i, k, hasIntercept);
  }
  const r = choleskyFactor(c, k, 1e-14);
  if (typeof r === "number") return null;
  const t = invertUpper(r, k);
  const condition = scaledCondition(c, timesOwnTranspose(t, k), k);
  const solved = solveByRoot(t, g);
  return {
    rootInverse: t.map((v, at) => v / scales[Math.floor(at / k)]!),
    slopes: solved.map((b, j) => (b * scales[k]!) / scales[j]!),
    condition,
  };
}

/** Σ of w z_i z_j over rows in the given scales; about zero instead of the means without an intercept (W·m_i m_j added back). */
function crossProduct(moments: Moments, scales: Float64Array, i: number, j: number, centred: boolean): number {
  const ratio = (moments.scales[i]! / scales[i]!) * (moments.scales[j]! / scales[j]!);
  const centredSum = moments.crossProducts[i * moments.scales.length + j]! * ratio;
  if (centred) return centredSum;
  return centredSum + moments.weightSum * (moments.means[i]! / scales[i]!) * (moments.means[j]! / scales[j]!);
}

function startFromRows(problem: Problem): Start {
  const qr = factorRows(problem);
  const { columns, hasIntercept } = problem;
  if (qr.rank < columns.length || qr.relativePivots.some((pivot) => pivot < DOUBTFUL_PIVOT)) {
    const kept = problem.penalty === null ? columns : [];
    const dependent = findDependencies(kept, { intercept: hasIntercept }).dependent.map((d) => d.column);
    const named = dependent.length > 0 ? dependent : qr.order.slice(qr.rank);
    if (named.length > 0) throw new NumericsError("rankDeficient", "some columns depend on earlier ones", named);
  }
  return { rootInverse: qr.rootInverse, slopes: qr.coefficients, condition: qr.condition };
}

function factorRows({ columns, response, hasIntercept, centring, weights, penalty }: Problem): PivotedQr {
  return solvePivotedQr(columns, response, { intercept: hasIntercept, centring, weights, penalty });
}

/** Products that may go into the exact inverse, by how many digits the plain one would lose. */
function exactBudget(condition: number): number {
  return condition < 30 ? 2e6 : condition < 1e3 ? 1e7 : 1e8;
}

/** C⁻¹ exactly where that is quick; else from the rows' triangle where cross-products would lose digits; else as it is. */
function inverseOf(problem: Problem, start: Start, path: "moments" | "careful"): ExactInverse {
  const { columns, centring, weights, penalty } = problem;
  const k = columns.length;
  const products = (problem.response.length * k * (k + 1)) / 2;
  if (k > 0 && products <= exactBudget(start.condition)) {
    const exact = exactInverse(columns.map(numbersOf), centring, weights, penalty);
    if (exact !== null) return exact;
  }
  const isWorthFactoring = path === "moments" && k > 0 && start.condition >= FACTOR_CONDITION;
  const { rootInverse } = isWorthFactoring ? factorRows(problem) : start;
  let meanForm = 0;
  for (let j = 0; j < k; j++) {
    let s = 0;
    for (let i = 0; i < k; i++) s += rootInverse[i * k + j]! * centring.means[i]!.hi;
    meanForm += s * s;
  }
  return { inverse: timesOwnTranspose(rootInverse, k), rootInverse, meanForm };
}

function assemble(problem: Problem, start: Start, refined: Refined, path: "moments" | "careful"): LeastSquaresSolution {
  const { columns, response, hasIntercept, moments, centring, weightSum, penalty } = problem;
  const k = columns.length;
  const rank = k + (hasIntercept ? 1 : 0);
  const { inverse, rootInverse, meanForm } = inverseOf(problem, start, path);
  const slopes = Float64Array.from(refined.slopes, (b: DoubleDouble) => b.hi);
  const { residuals, residualSumOfSquares } = refined;
  const residualDf = moments.rowCount - rank;
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
    intercept: hasIntercept ? refined.intercept.hi : null,
    slopes,
    means: Float64Array.from(centring.means.slice(0, k), (m) => m.hi),
    responseMean: hasIntercept ? moments.means[k]! : 0,
    weightSum,
    inverse,
    rootInverse,
    residuals,
    residualSumOfSquares,
    totalSumOfSquares: crossProduct(moments, centring.scales, k, k, hasIntercept) * centring.scales[k]! ** 2,
    rank,
    residualDf,
    effectiveRank: penalty === null ? rank : penalty.reduce((sum, one, j) => sum - one * inverse[j * k + j]!, rank),
    residualStandardError: s,
    standardErrors,
    interceptStandardError: hasIntercept && s !== null ? s * Math.sqrt(1 / weightSum + meanForm) : null,
    path,
    condition: start.condition,
    digitsToTrust,
  };
}
