/**
 * Coefficients corrected by C⁻¹X′We with residuals in double-double until nothing is left to correct: the correctly rounded
 * least-squares solution of the stored data (Björck 1967; Demmel, Hida, Riedy & Li 2009).
 * Symbols: b slopes, b₀ intercept, w weights, λ penalties, e = y − b₀ − Xb, g = X′We − Λb (centred columns with an intercept).
 */
import { solveByRoot } from "./choleskyFactor.ts";
import { add, type DoubleDouble, divide, fromNumber, multiply, subtract } from "./doubleDouble.ts";
import { NumericsError } from "./numericsError.ts";
import { moveResiduals, passOverRows, type RowPass, type RowProblem } from "./passOverRows.ts";

export interface RefineProblem extends RowProblem {
  readonly hasIntercept: boolean;
  /** Σ w. */
  readonly weightSum: number;
  /** λ, k, or null. */
  readonly penalty: Float64Array | null;
}

/** Where refinement begins: how columns were moved, a root of the inverse, and slopes. */
export interface RefineStart {
  readonly centring: { readonly means: readonly DoubleDouble[]; readonly scales: Float64Array };
  readonly responseMean: DoubleDouble;
  readonly rootInverse: Float64Array;
  readonly slopes: Float64Array;
}

export interface Refined {
  readonly slopes: DoubleDouble[];
  readonly intercept: DoubleDouble;
  readonly residuals: Float64Array;
  readonly residualSumOfSquares: number;
  /** Size of each correction, largest over the slopes and relative to the slope; the last may be foreseen rather than seen. */
  readonly corrections: number[];
}

/** A correction below a quarter of a unit in the last place changes no printed digit. */
const NEGLIGIBLE = 2 ** -54;
/**
 * The first correction is about as large as the rate by which the next ones shrink (both are κ²·2^-53 of the factor), so below
 * this size one correction leaves less than NEGLIGIBLE and need not be seen to be so.
 */
const ONE_IS_ENOUGH = 2e-9;
const MOST_PASSES = 15;

/**
 * Slopes corrected until a correction is negligible. With `demanded`, null as soon as a correction is not below that share
 * of the one before; without it, the best that was reached.
 */
export function refineCoefficients(
  problem: RefineProblem,
  start: RefineStart,
  demanded: number | null,
): Refined | null {
  const { means, scales } = start.centring;
  const corrections: number[] = [];
  let slopes: DoubleDouble[] = Array.from(start.slopes, fromNumber);
  let shift: DoubleDouble = fromNumber(0);
  for (;;) {
    const intercept = interceptOf(problem, start.responseMean, means, slopes, shift);
    const pass = passOverRows(problem, slopes, intercept, means);
    const gradient = withPenalty(pass.gradient, problem.penalty, slopes);
    const step = solveByRoot(start.rootInverse, gradient);
    const size = correctionSize(step, slopes, pass, start.rootInverse, scales);
    const previous = corrections.at(-1) ?? 1;
    corrections.push(size);
    if (!Number.isFinite(size)) throw new NumericsError("notFinite", "the values are too large or too small to fit");
    const lacks = problem.hasIntercept ? divide(pass.sumOfResiduals, fromNumber(problem.weightSum)) : fromNumber(0);
    if (size <= NEGLIGIBLE || corrections.length === MOST_PASSES) {
      return asItStands(slopes, add(intercept, lacks), pass, corrections);
    }
    if (corrections.length === 1 && size < ONE_IS_ENOUGH) {
      return withLastStep(problem, { slopes, intercept, lacks, pass, step, gradient, corrections, means });
    }
    const isSlow = !(size < (demanded ?? 0.5) * previous) && size > 1e-15;
    if (isSlow && demanded !== null) return null;
    if (isSlow && corrections.length > 1) return asItStands(slopes, intercept, pass, corrections);
    slopes = slopes.map((b, j) => add(b, fromNumber(step[j]!)));
    shift = add(shift, lacks);
  }
}

/** b₀ = ȳ − Σ m_j b_j, and what earlier passes found it to lack; 0 without an intercept. */
function interceptOf(
  { hasIntercept }: RefineProblem,
  responseMean: DoubleDouble,
  means: readonly DoubleDouble[],
  slopes: readonly DoubleDouble[],
  shift: DoubleDouble,
): DoubleDouble {
  if (!hasIntercept) return fromNumber(0);
  return slopes.reduce((rest, b, j) => subtract(rest, multiply(b, means[j]!)), add(responseMean, shift));
}

function withPenalty(
  gradient: Float64Array,
  penalty: Float64Array | null,
  slopes: readonly DoubleDouble[],
): Float64Array {
  if (penalty === null) return gradient;
  return gradient.map((g, j) => subtract(fromNumber(g), multiply(fromNumber(penalty[j]!), slopes[j]!)).hi);
}

function asItStands(
  slopes: DoubleDouble[],
  intercept: DoubleDouble,
  { residuals, residualSumOfSquares }: RowPass,
  corrections: number[],
): Refined {
  return { slopes, intercept, residuals, residualSumOfSquares, corrections };
}

interface LastStep {
  readonly slopes: readonly DoubleDouble[];
  readonly intercept: DoubleDouble;
  readonly lacks: DoubleDouble;
  readonly pass: RowPass;
  readonly step: Float64Array;
  readonly gradient: Float64Array;
  readonly corrections: readonly number[];
  readonly means: readonly DoubleDouble[];
}

/** The correction made without another pass: residuals follow it, and Σwe² falls by δ′(2X′We − Cδ) with Cδ = g − Λδ. */
function withLastStep(problem: RefineProblem, last: LastStep): Refined {
  const { pass, step, gradient } = last;
  const size = last.corrections[0]!;
  const down = step.reduce((sum, d, j) => sum - d * last.means[j]!.hi, 0);
  const interceptStep = problem.hasIntercept ? add(fromNumber(down), last.lacks) : fromNumber(0);
  let fall = 0;
  for (let j = 0; j < step.length; j++) {
    const penalised = problem.penalty === null ? 0 : problem.penalty[j]! * step[j]!;
    fall += step[j]! * (2 * pass.gradient[j]! - (gradient[j]! - penalised));
  }
  return {
    slopes: last.slopes.map((b, j) => add(b, fromNumber(step[j]!))),
    intercept: add(last.intercept, interceptStep),
    residuals: moveResiduals(problem.columns, pass.residuals, step, interceptStep.hi),
    residualSumOfSquares: Math.max(0, pass.residualSumOfSquares - fall),
    corrections: [...last.corrections, size * size],
  };
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
