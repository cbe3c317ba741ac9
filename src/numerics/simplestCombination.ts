/**
 * One column as a combination of kept columns and a constant: are the two sides equal within tolerance, and which are the
 * simplest coefficients for which they are? Coefficients come from pivoted QR, are corrected with double-double residuals,
 * then zeros are removed, the rest solved again, rounded, and the rounded equation is checked on every row.
 */
import type { Centring } from "./centreColumns.ts";
import { type DoubleDouble, divide, fromNumber } from "./doubleDouble.ts";
import { interceptOf, passOverRows, refineCoefficients } from "./refineCoefficients.ts";
import { type Ratio, simplestNumber } from "./simplestNumber.ts";
import { solvePivotedQr } from "./solvePivotedQr.ts";

export interface Question {
  readonly columns: readonly Float64Array[];
  readonly centring: Centring;
  /** Storing error of each column. */
  readonly stored: readonly number[];
  /** Independent columns to combine. */
  readonly kept: readonly number[];
  readonly column: number;
  readonly tolerance: number;
  readonly intercept: boolean;
}

export interface Combination {
  readonly constant: number;
  readonly terms: { column: number; coefficient: number; ratio: Ratio | null }[];
  readonly largestResidual: number;
}

/** A rounded equation may miss by this many times what the unrounded one misses at most. */
const ROUNDING_ROOM = 2;

/** The combination, or null when the column is not one. */
export function describeCombination(question: Question): Combination | null {
  const whole = solve(question, question.kept);
  if (!(whole.largestResidual <= allowed(question, question.kept, whole.slopes))) return null;
  const support = question.kept.filter((_, at) => Math.abs(whole.slopes[at]!) > whole.uncertainties[at]!);
  const reduced = solve(question, support);
  const isEnough = reduced.largestResidual <= ROUNDING_ROOM * allowed(question, support, reduced.slopes);
  return isEnough ? rounded(question, support, reduced) : rounded(question, question.kept, whole);
}

interface Solved {
  readonly slopes: Float64Array;
  /** How far each slope can move within the tolerance. */
  readonly uncertainties: Float64Array;
  readonly largestResidual: number;
}

function solve(question: Question, members: readonly number[]): Solved {
  const { columns, centring, column, intercept } = question;
  const x = members.map((j) => columns[j]!);
  const y = columns[column]!;
  const means = members.map((j) => centring.means[j]!);
  const responseMean = centring.means[column]!;
  if (members.length === 0) {
    const pass = passOverRows([], y, [], responseMean, []);
    return {
      slopes: new Float64Array(0),
      uncertainties: new Float64Array(0),
      largestResidual: largest(pass.residuals),
    };
  }
  const scales = Float64Array.from(members, (j) => centring.scales[j]!);
  const spreads = Float64Array.from(members, (j) => centring.spreads[j]!);
  const qr = solvePivotedQr(x, y, { intercept, relativeTolerance: 0, centring: { means, scales, spreads } });
  const start = { centring: { means, scales }, responseMean, rootInverse: qr.rootInverse, slopes: qr.coefficients };
  const refined = refineCoefficients(x, y, start, intercept, null)!;
  const slopes = Float64Array.from(refined.slopes, (b) => b.hi);
  const missed = Math.max(largest(refined.pass.residuals), 0.25 * allowed(question, members, slopes));
  return {
    slopes,
    uncertainties: uncertaintiesOf(qr.rootInverse, slopes, missed, y.length),
    largestResidual: largest(refined.pass.residuals),
  };
}

/** Slope j can move by about missed·√(n·(C⁻¹)_jj) before any row notices more than `missed` in the mean square. */
function uncertaintiesOf(rootInverse: Float64Array, slopes: Float64Array, missed: number, n: number): Float64Array {
  const k = slopes.length;
  return slopes.map((slope, j) => {
    let variance = 0;
    for (let l = 0; l < k; l++) variance += rootInverse[j * k + l]! ** 2;
    return missed * Math.sqrt(n * variance) + 2 ** -50 * Math.abs(slope);
  });
}

/** T for a combination: a share of the spread, and four times what storing may cost on either side. */
function allowed(question: Question, members: readonly number[], slopes: Float64Array): number {
  const { centring, stored, column, tolerance } = question;
  const cost = members.reduce((sum, j, at) => sum + Math.abs(slopes[at]!) * stored[j]!, stored[column]!);
  const spread = centring.spreads[column]!;
  const isFlat = members.length === 0;
  return (isFlat ? 0 : tolerance * spread) + 4 * cost;
}

/** The equation in the simplest numbers that still holds on every row; number by number the unrounded one where not. */
function rounded(question: Question, members: readonly number[], solved: Solved): Combination {
  const limit = ROUNDING_ROOM * allowed(question, members, solved.slopes);
  for (const room of [1, 1 / 16, 1 / 256]) {
    const simple = Array.from(solved.slopes, (slope, at) => simplestNumber(slope, room * solved.uncertainties[at]!));
    const slopes = Float64Array.from(simple, (s) => s.value);
    const checked = withConstant(
      question,
      members,
      slopes,
      simple.map((s) => s.ratio),
    );
    if (checked.largestResidual <= limit) return checked;
  }
  return withConstant(
    question,
    members,
    solved.slopes,
    members.map(() => null),
  );
}

function withConstant(
  question: Question,
  members: readonly number[],
  slopes: Float64Array,
  ratios: readonly (Ratio | null)[],
): Combination {
  const { columns, centring, column, intercept } = question;
  const means = members.map((j) => centring.means[j]!);
  const exact = Array.from(slopes, (slope, at) => ratioAsDoubleDouble(slope, ratios[at] ?? null));
  const responseMean = centring.means[column]!;
  const best = intercept ? interceptOf(responseMean, means, exact) : fromNumber(0);
  const limit = Math.max(allowed(question, members, slopes), 2 ** -50 * Math.abs(best.hi));
  const constant = intercept ? simplestNumber(best.hi, limit) : { value: 0, ratio: null };
  const x = members.map((j) => columns[j]!);
  const pass = passOverRows(x, columns[column]!, exact, ratioAsDoubleDouble(constant.value, constant.ratio), means);
  const terms = members.flatMap((j, at) =>
    slopes[at] === 0 ? [] : [{ column: j, coefficient: slopes[at]!, ratio: ratios[at] ?? null }],
  );
  return { constant: constant.value, terms, largestResidual: largest(pass.residuals) };
}

/** 1/12 to 32 digits, so that checking an equation does not add the rounding of its coefficient. */
function ratioAsDoubleDouble(value: number, ratio: Ratio | null): DoubleDouble {
  return ratio === null || ratio.denominator === 1
    ? fromNumber(value)
    : divide(fromNumber(ratio.numerator), fromNumber(ratio.denominator));
}

function largest(values: Float64Array): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, Math.abs(values[i]!));
  return most;
}
