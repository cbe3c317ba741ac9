/**
 * How many digits this program reaches on certified least-squares problems, given as data: log relative errors of
 * coefficients, their standard errors and the residual standard deviation. LRE = −log₁₀|found − exact|/|exact|
 * (McCullough 1998), absolute where the exact value is zero, 15 at most: a double holds no more.
 */
import { AppError } from "../domain/errors.ts";
import { solveLeastSquares } from "../numerics/solveLeastSquares.ts";

/** One problem as tests/reference/nist/strd-linear.json has them; numbers as decimal text. */
export interface CertifiedSet {
  readonly intercept: boolean;
  readonly terms: readonly string[];
  readonly columns: readonly string[];
  readonly data: readonly (readonly string[])[];
  readonly highPrecision: {
    readonly estimates: readonly string[];
    readonly standardDeviations: readonly string[];
    readonly residualStandardDeviation: string;
  };
}

export interface ReachedDigits {
  readonly name: string;
  readonly n: number;
  readonly p: number;
  readonly coefficients: number;
  readonly standardErrors: number;
  readonly residualDeviation: number;
  readonly path: "moments" | "careful";
  readonly digitsToTrust: number;
}

export function logRelativeError(found: number, exact: number): number {
  const error = exact === 0 ? Math.abs(found) : Math.abs(found - exact) / Math.abs(exact);
  return error === 0 ? 15 : Math.max(0, Math.min(15, -Math.log10(error)));
}

/** Refuses (AppError) a set whose shape is not that of CertifiedSet. */
export function reachedDigits(name: string, set: CertifiedSet): ReachedDigits {
  if (!Array.isArray(set?.data) || set.highPrecision?.estimates === undefined) {
    throw new AppError({
      family: "request",
      code: "bad-set",
      what: `"${name}" is no certified least-squares set.`,
      where: name,
      whatToDo: "Give the file tests/reference/nist/strd-linear.json, or one of the same shape.",
    });
  }
  const response = Float64Array.from(set.data, (row) => Number(row[0]));
  const found = solveLeastSquares(columnsOf(set), response, { intercept: set.intercept });
  const exact = set.highPrecision;
  const least = (values: readonly number[], wanted: readonly string[]) =>
    Math.min(...values.map((value, at) => logRelativeError(value, Number(wanted[at]))));
  const first = (value: number | null) => (value === null ? [] : [value]);
  return {
    name,
    n: response.length,
    p: found.rank,
    coefficients: least([...first(found.intercept), ...found.slopes], exact.estimates),
    standardErrors: least([...first(found.interceptStandardError), ...found.standardErrors], exact.standardDeviations),
    residualDeviation: logRelativeError(found.residualStandardError ?? 0, Number(exact.residualStandardDeviation)),
    path: found.path,
    digitsToTrust: found.digitsToTrust,
  };
}

/** Columns as given, or powers of the one that is given. */
function columnsOf(set: CertifiedSet): Float64Array[] {
  const x = set.columns.slice(1).map((_, at) => Float64Array.from(set.data, (row) => Number(row[at + 1])));
  const terms = set.intercept ? set.terms.slice(1) : set.terms;
  if (x.length === terms.length) return x;
  return terms.map((_, at) => x[0]!.map((value) => value ** (at + 1)));
}
