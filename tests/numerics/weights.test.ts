/** Weights, penalties and low parts in the solver: laws that need no other program. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Column, indicator, numbersOf } from "../../src/numerics/column.ts";
import { hcCovariance } from "../../src/numerics/hcCovariance.ts";
import { leverages } from "../../src/numerics/leverages.ts";
import { type LeastSquaresOptions, solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

const RUNS = { numRuns: 40, seed: 20_261_201 };
const PATHS = ["moments", "careful"] as const;

interface Data {
  readonly columns: Column[];
  readonly response: Float64Array;
  readonly whole: Float64Array;
}

/** Numbers, a choice of four levels as codes, and whole-number weights from 0 to 3. */
function dataOf(seed: number, n: number): Data {
  const next = drawFrom(seed);
  const a = Float64Array.from({ length: n }, () => 100 + next() * 40);
  const b = a.map((value) => value / 7 + next() * 3);
  const codes = Uint16Array.from({ length: n }, (_, i) => (i < 4 ? i : Math.floor(next() * 4)));
  const columns = [a, b, indicator(codes, 1), indicator(codes, 2), indicator(codes, 3)];
  const response = a.map((value, i) => 5 + value * 0.3 - b[i]! + codes[i]! + next());
  const whole = Float64Array.from({ length: n }, (_, i) => (i < 12 ? 1 : Math.floor(next() * 4)));
  return { columns, response, whole };
}

/** Every row as often as its weight says. */
function repeated({ columns, response, whole }: Data): { columns: Float64Array[]; response: Float64Array } {
  const rows = Array.from(whole).flatMap((w, i) => new Array<number>(w).fill(i));
  const pick = (values: Float64Array) => Float64Array.from(rows, (i) => values[i]!);
  return { columns: columns.map((column) => pick(numbersOf(column))), response: pick(response) };
}

function close(found: ArrayLike<number>, expected: ArrayLike<number>, tolerance: number): void {
  expect(found.length).toBe(expected.length);
  for (let j = 0; j < found.length; j++) {
    expect(Math.abs(found[j]! - expected[j]!)).toBeLessThanOrEqual(tolerance * Math.max(1, Math.abs(expected[j]!)));
  }
}

const draws = fc.record({ seed: fc.integer({ min: 1, max: 1e6 }), n: fc.integer({ min: 30, max: 300 }) });

describe("weights", () => {
  test("of two and three are the row twice and thrice, of zero the row not at all", () => {
    fc.assert(
      fc.property(draws, fc.constantFrom(...PATHS), ({ seed, n }, path) => {
        const data = dataOf(seed, n);
        const weighted = solveLeastSquares(data.columns, data.response, { intercept: true, weights: data.whole, path });
        const { columns, response } = repeated(data);
        const plain = solveLeastSquares(columns, response, { intercept: true, path });
        close(weighted.slopes, plain.slopes, 1e-14);
        close([weighted.intercept!], [plain.intercept!], 1e-14);
        close(weighted.inverse, plain.inverse, 1e-12);
        close([weighted.residualSumOfSquares], [plain.residualSumOfSquares], 1e-13);
        close([weighted.totalSumOfSquares], [plain.totalSumOfSquares], 1e-13);
        expect(weighted.weightSum).toBe(plain.weightSum);
        expect(weighted.residualDf).toBe(data.whole.filter((w) => w > 0).length - weighted.rank);
      }),
      RUNS,
    );
  });

  test("of one change no bit of the slopes", () => {
    const { columns, response } = dataOf(3, 200);
    const plain = solveLeastSquares(columns, response, { intercept: true });
    const ones = solveLeastSquares(columns, response, { intercept: true, weights: new Float64Array(200).fill(1) });
    expect(ones.slopes).toEqual(plain.slopes);
    expect(ones.standardErrors).toEqual(plain.standardErrors);
  });

  test("leverages sum to the rank, and residuals at their weights are orthogonal to the columns", () => {
    const { columns, response, whole } = dataOf(11, 250);
    const fit = solveLeastSquares(columns, response, { intercept: true, weights: whole });
    const h = leverages(columns, fit, whole);
    expect(h.reduce((sum, one) => sum + one, 0)).toBeCloseTo(6, 10);
    for (const column of columns) {
      const values = numbersOf(column);
      const sum = fit.residuals.reduce((total, e, i) => total + whole[i]! * e * values[i]!, 0);
      expect(Math.abs(sum)).toBeLessThan(1e-10);
    }
  });

  test("a sandwich at weights is the sum over rows, written out", () => {
    const { columns, response, whole } = dataOf(21, 90);
    const fit = solveLeastSquares(columns, response, { intercept: true, weights: whole });
    const h = leverages(columns, fit, whole);
    const k = columns.length;
    const values = columns.map(numbersOf);
    const sums = new Float64Array(k);
    let onIntercept = 0;
    for (let i = 0; i < 90; i++) {
      const d = values.map((column, a) => column[i]! - fit.means[a]!);
      const g = Array.from({ length: k }, (_, a) => d.reduce((sum, one, b) => sum + fit.inverse[a * k + b]! * one, 0));
      const score = (whole[i]! * fit.residuals[i]!) / (1 - h[i]!);
      g.forEach((one, a) => {
        sums[a]! += (score * one) ** 2;
      });
      onIntercept += (score * (1 / fit.weightSum - g.reduce((sum, one, a) => sum + one * fit.means[a]!, 0))) ** 2;
    }
    const found = hcCovariance(columns, fit, "HC3", whole);
    close(found.standardErrors, sums.map(Math.sqrt), 1e-11);
    expect(found.interceptStandardError! / Math.sqrt(onIntercept)).toBeCloseTo(1, 9);
  });
});

describe("penalties", () => {
  const penalty = Float64Array.of(30, 0, 2, 5, 0.5);

  test("are rows added to centred data (augmented least squares; Hoerl & Kennard 1970)", () => {
    for (const path of PATHS) {
      const { columns, response } = dataOf(5, 120);
      const fit = solveLeastSquares(columns, response, { intercept: true, penalty, path });
      const values = columns.map(numbersOf);
      const mean = (x: Float64Array) => x.reduce((sum, v) => sum + v, 0) / x.length;
      const centred = values.map((x) => x.map((v) => v - mean(x)));
      const y = response.map((v) => v - mean(response));
      const rows = Array.from(penalty, Math.sqrt);
      const augmented = centred.map((x, j) => Float64Array.from([...x, ...rows.map((r, l) => (l === j ? r : 0))]));
      const target = Float64Array.from([...y, ...rows.map(() => 0)]);
      const plain = solveLeastSquares(augmented, target, { intercept: false });
      close(fit.slopes, plain.slopes, 1e-12);
      close(fit.inverse, plain.inverse, 1e-11);
    }
  });

  test("keep the ledger's identity: short less long is what the left-out column is carried with", () => {
    fc.assert(
      fc.property(draws, ({ seed, n }) => {
        const { columns, response, whole } = dataOf(seed, n);
        const options = { intercept: true, weights: whole };
        const long = solveLeastSquares(columns, response, { ...options, penalty });
        const kept = [0, 2, 3, 4];
        const shortPenalty = Float64Array.from(kept, (j) => penalty[j]!);
        const shortColumns = kept.map((j) => columns[j]!);
        const short = solveLeastSquares(shortColumns, response, { ...options, penalty: shortPenalty });
        const left = columns[1] as Float64Array;
        const association = solveLeastSquares(shortColumns, left, { ...options, penalty: shortPenalty });
        kept.forEach((j, at) => {
          const carried = association.slopes[at]! * long.slopes[1]!;
          const size = Math.max(Math.abs(short.slopes[at]!), Math.abs(long.slopes[j]!), Math.abs(carried));
          expect(Math.abs(short.slopes[at]! - long.slopes[j]! - carried)).toBeLessThan(1e-10 * size);
        });
      }),
      RUNS,
    );
  });

  test("lower the effective rank, which is the sum of leverages", () => {
    const { columns, response } = dataOf(8, 100);
    const fit = solveLeastSquares(columns, response, { intercept: true, penalty });
    const sum = leverages(columns, fit).reduce((total, h) => total + h, 0);
    expect(fit.effectiveRank).toBeCloseTo(sum, 9);
    expect(fit.effectiveRank).toBeLessThan(fit.rank);
  });
});

describe("what is refused", () => {
  const { columns, response } = dataOf(2, 40);
  const solve = (change: Partial<LeastSquaresOptions>) => () =>
    solveLeastSquares(columns, response, { intercept: true, ...change });

  test("weights that are all zero, negative or no numbers", () => {
    expect(solve({ weights: new Float64Array(40) })).toThrow(/weight/);
    expect(solve({ weights: new Float64Array(40).fill(-1) })).toThrow(/weight/);
    expect(solve({ weights: new Float64Array(40).fill(Number.NaN) })).toThrow(/weight/);
    expect(solve({ weights: new Float64Array(39).fill(1) })).toThrow(/39 weights for 40 rows/);
  });

  test("penalties that are negative or of another count", () => {
    expect(solve({ penalty: new Float64Array(5).fill(-1) })).toThrow(/penalties are not numbers from 0 up/);
    expect(solve({ penalty: new Float64Array(4) })).toThrow(/4 penalties for 5 columns/);
  });

  test("fewer rows that count than coefficients", () => {
    expect(solve({ weights: Float64Array.from({ length: 40 }, (_, i) => (i < 6 ? 1 : 0)) })).toThrow(
      /6 rows cannot carry 6/,
    );
  });
});
