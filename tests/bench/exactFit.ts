/**
 * Collinear designs of whole numbers whose least-squares fit is known exactly, and how many digits of it a fit gets right.
 * Columns c·u + v_j with u, v_j drawn whole and c about the condition number: the larger c, the more they are one column.
 * The normal equations are whole numbers too and are solved by fraction-free elimination (Bareiss 1968).
 * Digits: −log₁₀ of the relative error of the worst coefficient (log relative error, as of the NIST StRD), at most 15.95.
 */
import { uniforms } from "./drawData.ts";

export interface Ratio {
  readonly top: bigint;
  /** Above 0. */
  readonly bottom: bigint;
}

export interface ExactDesign {
  readonly columns: readonly Float64Array[];
  readonly response: Float64Array;
  /** Intercept first. */
  readonly coefficients: readonly Ratio[];
}

/** Half a unit in the last place of a double, in digits: more cannot be asked of one. */
const MOST_DIGITS = -Math.log10(2 ** -53);

export function collinearDesign(condition: number, rows: number, width: number, seed: number): ExactDesign {
  const draw = uniforms(seed);
  const whole = (most: number): number => Math.floor(draw() * (2 * most + 1)) - most;
  const c = Math.max(1, Math.round(condition / Math.sqrt(width)));
  const shared = Float64Array.from({ length: rows }, () => whole(1000));
  const columns = Array.from({ length: width }, () => shared.map((u) => c * u + whole(1000)));
  const spread = 300 * width * c;
  const response = Float64Array.from({ length: rows }, (_, i) =>
    columns.reduce((sum, column, j) => sum + ((j % 3) + 1) * column[i]!, 1000 + whole(spread)),
  );
  return { columns, response, coefficients: exactCoefficients(columns, response) };
}

/** The least-squares coefficients of whole numbers, intercept first. Throws when the columns depend on each other. */
export function exactCoefficients(columns: readonly Float64Array[], response: Float64Array): Ratio[] {
  const ones = new Float64Array(response.length).fill(1);
  const design = [ones, ...columns].map(wholeNumbers);
  const y = wholeNumbers(response);
  const matrix = design.map((row) => [...design, y].map((column) => dot(row, column)));
  return solveWhole(matrix);
}

function wholeNumbers(column: Float64Array): bigint[] {
  return Array.from(column, (value) => BigInt(value));
}

function dot(a: readonly bigint[], b: readonly bigint[]): bigint {
  let sum = 0n;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/** Solves [A | g] for a positive definite A: elimination in which every division comes out even. */
export function solveWhole(augmented: readonly (readonly bigint[])[]): Ratio[] {
  const a = augmented.map((row) => [...row]);
  const size = a.length;
  let before = 1n;
  for (let k = 0; k < size; k++) {
    const pivot = a[k]![k]!;
    if (pivot <= 0n) throw new Error("the columns depend on each other");
    for (let i = 0; i < size; i++) {
      if (i === k) continue;
      const factor = a[i]![k]!;
      for (let j = 0; j <= size; j++) {
        if (j !== k) a[i]![j] = (a[i]![j]! * pivot - factor * a[k]![j]!) / before;
      }
      a[i]![k] = 0n;
    }
    before = pivot;
  }
  return a.map((row, i) => ({ top: row[size]!, bottom: row[i]! }));
}

/** m·2^e = the double, exactly. */
function ratioOf(value: number): Ratio {
  let shift = 0;
  let scaled = value;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    shift++;
  }
  return { top: BigInt(scaled), bottom: 1n << BigInt(shift) };
}

function quotient(top: bigint, bottom: bigint): number {
  const digits = 40n;
  return Number((top * 10n ** digits) / bottom) / 10 ** Number(digits);
}

/** Correct digits of the worst coefficient, 0 to 15.95; 0 where one is not a number. */
export function correctDigits(coefficients: ArrayLike<number>, exact: readonly Ratio[]): number {
  let worst = MOST_DIGITS;
  for (const [j, { top, bottom }] of exact.entries()) {
    const value = coefficients[j];
    if (value === undefined || !Number.isFinite(value)) return 0;
    const got = ratioOf(value);
    const wrong = got.top * bottom - top * got.bottom;
    const error = quotient(wrong < 0n ? -wrong : wrong, got.bottom * (top < 0n ? -top : top));
    worst = Math.min(worst, error === 0 ? MOST_DIGITS : -Math.log10(error));
  }
  return Math.max(0, worst);
}
