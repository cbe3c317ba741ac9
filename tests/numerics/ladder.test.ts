/**
 * A ladder of nearly dependent columns: whole numbers, two columns that differ by small whole numbers beside a size of
 * 10², 10³ … 10¹⁰, solved exactly in rational arithmetic. LRE = −log₁₀ of the relative error (McCullough 1998), at most 15.
 */
import { expect, test } from "vitest";
import { exactLeastSquares } from "../../src/app/digits/exactLeastSquares.ts";
import { logRelativeError } from "../../src/app/reachedDigits.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";

const ROWS = 40;

function rung(size: number): { x: Float64Array[]; y: Float64Array } {
  const along = Float64Array.from({ length: ROWS }, (_, i) => size * ((i * 17) % ROWS) + ((i * i) % 11));
  const beside = along.map((value, i) => value + ((i * 7) % 5) - 2);
  const other = Float64Array.from({ length: ROWS }, (_, i) => (i * 13) % 23);
  const y = along.map((value, i) => 3 * value - 2 * beside[i]! + 5 * other[i]! + ((i * 29) % 17) - 8);
  return { x: [along, beside, other], y };
}

function reached(size: number) {
  const { x, y } = rung(size);
  const exact = exactLeastSquares([new Float64Array(ROWS).fill(1), ...x], y);
  const found = solveLeastSquares(x, y, { intercept: true });
  const least = (values: readonly number[], wanted: readonly string[]) =>
    Math.min(...values.map((value, at) => logRelativeError(value, Number(wanted[at]))));
  return {
    coefficients: least([found.intercept!, ...found.slopes], exact.estimates),
    standardErrors: least([found.interceptStandardError!, ...found.standardErrors], exact.standardDeviations),
    condition: found.condition,
    path: found.path,
    claimed: found.digitsToTrust,
    scatter: logRelativeError(found.residualStandardError!, Number(exact.residualStandardDeviation)),
  };
}

const SIZES = [1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10];

test.each(SIZES)("at size %d coefficients and scatter have 13 right digits, no fewer than are claimed", (size) => {
  const digits = reached(size);
  expect(digits.coefficients).toBeGreaterThanOrEqual(Math.max(13, digits.claimed));
  expect(digits.scatter).toBeGreaterThanOrEqual(13);
});

test.each(SIZES.slice(0, 7))("at size %d standard errors have 13 right digits", (size) => {
  expect(reached(size).standardErrors).toBeGreaterThanOrEqual(13);
});

// A known shortfall: from size 10⁸ (condition 1.6·10⁹) on, standard errors lose digits as the condition grows.
test.each([
  [1e9, 11],
  [1e10, 9],
])("at size %d standard errors fall short of 13 digits, and keep %d", (size, floor) => {
  expect(reached(size).standardErrors).toBeGreaterThanOrEqual(floor);
});
