/**
 * Least squares in exact rational arithmetic: the truth that digits are counted against. Doubles are whole numbers times
 * powers of two, so columns become BigInt, and the normal equations (XᵀX)b = Xᵀy are solved by fraction-free elimination
 * (Bareiss 1968), in which every division is exact. n rows, p columns, RSS the residual sum of squares.
 */
import { AppError } from "../../domain/errors.ts";

/** Decimal text of 30 digits, such as "123…e-28"; columns as given, the intercept among them as a column of ones. */
export interface ExactSolution {
  readonly estimates: readonly string[];
  readonly standardDeviations: readonly string[];
  readonly residualStandardDeviation: string;
}

interface Scaled {
  readonly values: bigint[];
  /** values = numbers · 2^shift. */
  readonly shift: number;
}

/** b, √(s² (XᵀX)⁻¹ⱼⱼ) and s, s² = RSS/(n − p). Refuses (AppError) dependent columns and n ≤ p. */
export function exactLeastSquares(columns: readonly Float64Array[], response: Float64Array): ExactSolution {
  const x = columns.map(scaled);
  const y = scaled(response);
  const spare = BigInt(response.length - x.length);
  if (spare <= 0n) throw refusal("There are no more rows than columns.");
  const moments = x.map((column) => dot(column.values, y.values));
  const { det, solution, diagonal } = eliminate(x, moments);
  const explained = solution.reduce((sum, b, at) => sum + b * moments[at]!, 0n);
  const residual = dot(y.values, y.values) * det - explained;
  const unit = power(2 * y.shift);
  const spread: [bigint, bigint] = [residual * unit.below, det * spare * unit.above];
  return {
    estimates: solution.map((b, at) => {
      const scale = power(x[at]!.shift - y.shift);
      return quotientText(b * scale.above, det * scale.below);
    }),
    standardDeviations: diagonal.map((cofactor, at) => {
      const scale = power(2 * x[at]!.shift);
      return rootText(spread[0] * cofactor * scale.above, spread[1] * det * scale.below);
    }),
    residualStandardDeviation: rootText(...spread),
  };
}

/** Gauss–Jordan on [XᵀX | Xᵀy | I]: determinant, determinant · b, determinant · diagonal of the inverse. */
function eliminate(x: readonly Scaled[], moments: readonly bigint[]) {
  const rows = x.map((left, i) => [
    ...x.map((right) => dot(left.values, right.values)),
    moments[i]!,
    ...x.map((_, j) => (i === j ? 1n : 0n)),
  ]);
  let det = 1n;
  for (const [k, pivotRow] of rows.entries()) {
    const pivot = pivotRow[k]!;
    if (pivot === 0n) throw refusal("A column depends on those before it.");
    for (const [i, row] of rows.entries()) {
      if (i === k) continue;
      const factor = row[k]!;
      for (let j = 0; j < row.length; j++) row[j] = (pivot * row[j]! - factor * pivotRow[j]!) / det;
    }
    det = pivot;
  }
  const p = x.length;
  return { det, solution: rows.map((row) => row[p]!), diagonal: rows.map((row, i) => row[p + 1 + i]!) };
}

function scaled(numbers: Float64Array): Scaled {
  if (!numbers.every(Number.isFinite)) throw refusal("A number is not finite.");
  let shift = 0;
  for (const number of numbers) while (!Number.isInteger(number * 2 ** shift)) shift++;
  return { values: Array.from(numbers, (number) => BigInt(number * 2 ** shift)), shift };
}

function dot(left: readonly bigint[], right: readonly bigint[]): bigint {
  return left.reduce((sum, value, at) => sum + value * right[at]!, 0n);
}

/** 2^exponent as above/below. */
function power(exponent: number): { above: bigint; below: bigint } {
  return exponent >= 0 ? { above: 1n << BigInt(exponent), below: 1n } : { above: 1n, below: 1n << BigInt(-exponent) };
}

function digitsOf(value: bigint): number {
  return (value < 0n ? -value : value).toString().length;
}

function shifted(above: bigint, below: bigint, places: number): bigint {
  return places >= 0 ? (above * 10n ** BigInt(places)) / below : above / (below * 10n ** BigInt(-places));
}

function quotientText(above: bigint, below: bigint): string {
  const places = 30 - digitsOf(above) + digitsOf(below);
  return `${shifted(above, below, places)}e${-places}`;
}

/** √(above/below) by Newton's whole-number root. */
function rootText(above: bigint, below: bigint): string {
  const half = 30 - Math.floor((digitsOf(above) - digitsOf(below)) / 2);
  return `${wholeRoot(shifted(above, below, 2 * half))}e${-half}`;
}

function wholeRoot(value: bigint): bigint {
  if (value === 0n) return 0n;
  let root = 10n ** BigInt(Math.ceil(digitsOf(value) / 2));
  for (let next = (root + value / root) / 2n; next < root; next = (root + value / root) / 2n) root = next;
  return root;
}

function refusal(what: string): AppError {
  return new AppError({
    family: "request",
    code: "no-exact-solution",
    what,
    where: "the exact solution",
    whatToDo: "Give more rows than columns, all of finite numbers, and leave out columns that depend on others.",
  });
}
