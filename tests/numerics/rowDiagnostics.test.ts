/**
 * What each row says about a fit: against 45-digit values for every row of the reference sales, and against fits that
 * truly leave the row out. Reference values: tests/reference/README.md (houseprices, diamonds600).
 */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Column, indicator, numbersOf } from "../../src/numerics/column.ts";
import { kernelModule } from "../../src/numerics/kernels/currentKernel.ts";
import { COLUMN_BYTES } from "../../src/numerics/kernels/designBlocks.ts";
import type { Kernel } from "../../src/numerics/kernels/kernel.ts";
import { BLOCK_ROWS, COLUMN_STRIDE } from "../../src/numerics/kernels/layout.ts";
import { plainKernel } from "../../src/numerics/kernels/plainKernel.ts";
import { wasmKernel } from "../../src/numerics/kernels/wasmKernel.ts";
import { coefficientMoves, covarianceRatios, rowDiagnostics } from "../../src/numerics/rowDiagnostics.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { drawFrom } from "../fixtures/randomClass.ts";
import { referenceSales, rowOf } from "../fixtures/referenceSales.ts";

function near(found: number, expected: number, tolerance: number, floor = 1e-12): void {
  expect(Math.abs(found - expected)).toBeLessThan(tolerance * Math.max(floor, Math.abs(expected)));
}

describe("every row of the reference sales", () => {
  // Residuals are differences of logarithms of some 10: 1e-10 of a residual of 1e-4 is the last digit of its response.
  test.each([
    ["houseprices", 1e-10, 1e-3],
    ["diamonds600", 1e-7, 1e-3],
  ] as const)("of the %s has the published diagnostics", (name, tolerance, floor) => {
    const { columns, response, influence } = referenceSales(name);
    const fit = solveLeastSquares(columns, response, { intercept: true });
    const found = rowDiagnostics(columns, response, fit);
    expect(influence).toHaveLength(response.length);
    influence.forEach((row, i) => {
      near(fit.residuals[i]!, row.residual!, tolerance, floor);
      near(found.fitted[i]!, row.fitted!, tolerance);
      near(found.leverages[i]!, row.hat!, tolerance);
      near(found.externallyStudentised[i]!, row.rstudent!, tolerance, floor);
      near(found.cooksDistances[i]!, row.cooksD!, tolerance, floor * floor);
      near(found.dffits[i]!, row.dffits!, tolerance, floor);
      near(found.fittedWithout[i]!, row.looFitted!, tolerance);
    });
  });
});

/** Rows with a choice of four levels, of which the last occurs once when asked for. */
function drawn(seed: number, n: number, isLonely = false) {
  const draw = drawFrom(seed);
  const codes = Uint16Array.from({ length: n }, (_, i) => (isLonely && i === 2 ? 3 : Math.floor(draw() * 3)));
  const columns: Column[] = [
    Float64Array.from({ length: n }, () => 1000 + draw()),
    Float64Array.from({ length: n }, () => draw() * draw() * 1e-3),
    indicator(codes, 1),
    indicator(codes, 2),
    ...(isLonely ? [indicator(codes, 3)] : []),
  ];
  const response = Float64Array.from(
    { length: n },
    (_, i) => 7 + 3 * draw() + codes[i]! + 2000 * numbersOf(columns[1]!)[i]!,
  );
  return { columns, response, weights: Float64Array.from({ length: n }, () => (draw() < 0.15 ? 0 : 0.2 + draw())) };
}

describe.each([false, true])("leaving a row out truly; weights: %s", (isWeighted) => {
  const { columns, response, ...rest } = drawn(3, 40);
  const weights = isWeighted ? rest.weights : null;
  const counts = weights ?? new Float64Array(40).fill(1);
  const fit = solveLeastSquares(columns, response, { intercept: true, weights: counts });
  const found = rowDiagnostics(columns, response, fit, weights);
  const ratios = covarianceRatios(found, fit);

  test("gives the price, spread and coefficients that the closed forms say", () => {
    for (let i = 0; i < 40; i++) {
      const without = solveLeastSquares(columns, response, {
        intercept: true,
        weights: counts.map((w, at) => (at === i ? 0 : w)),
      });
      const x = rowOf(columns, i);
      const price = without.slopes.reduce((sum, b, j) => sum + b * x[j]!, without.intercept!);
      near(found.fittedWithout[i]!, price, 1e-10);
      if (counts[i] === 0) {
        expect([found.leverages[i], found.cooksDistances[i], found.externallyStudentised[i]]).toEqual([0, 0, 0]);
        continue;
      }
      const s = without.residualStandardError!;
      const h = found.leverages[i]!;
      near(found.externallyStudentised[i]!, (Math.sqrt(counts[i]!) * fit.residuals[i]!) / (s * Math.sqrt(1 - h)), 1e-9);
      near(found.dffits[i]!, (Math.sqrt(counts[i]!) * (found.fitted[i]! - price)) / (s * Math.sqrt(h)), 1e-8, 1e-2);
      const moves = coefficientMoves(columns, fit, found, i, counts[i]);
      for (let j = 0; j < 4; j++) {
        const moved = (fit.slopes[j]! - without.slopes[j]!) / (s * Math.sqrt(fit.inverse[j * 5]!));
        near(moves[j]!, moved, 1e-7, 1e-2);
      }
      const sd = fit.interceptStandardError! / fit.residualStandardError!;
      near(moves[4]!, (fit.intercept! - without.intercept!) / (s * sd), 1e-6, 1e-2);
      near(ratios[i]!, (s / fit.residualStandardError!) ** 10 / (1 - h), 1e-9);
    }
  });

  test("leverages and Cook's distances add up as they must", () => {
    expect(found.leverages.reduce((sum, h) => sum + h, 0)).toBeCloseTo(5, 10);
    for (let i = 0; i < 40; i++) {
      const h = found.leverages[i]!;
      near(found.cooksDistances[i]!, (found.internallyStudentised[i]! ** 2 * h) / (5 * (1 - h)), 1e-12);
    }
  });
});

test("a sale that is the only one of its kind has leverage 1 and nothing is said about the fit without it", () => {
  const { columns, response } = drawn(4, 30, true);
  const fit = solveLeastSquares(columns, response, { intercept: true });
  const found = rowDiagnostics(columns, response, fit);
  expect(found.leverages[2]).toBeCloseTo(1, 11);
  const all = [found.internallyStudentised, found.externallyStudentised, found.cooksDistances, found.fittedWithout];
  expect(all.map((values) => values[2])).toEqual([Number.NaN, Number.NaN, Number.NaN, Number.NaN]);
  expect(coefficientMoves(columns, fit, found, 2).every((move) => Number.isNaN(move))).toBe(true);
  expect(found.cooksDistances.filter((value) => Number.isNaN(value))).toHaveLength(1);
});

test("fits without freedom and lengths that disagree are refused", () => {
  const { columns, response } = drawn(5, 30);
  const fit = solveLeastSquares(columns, response, { intercept: true });
  expect(() => rowDiagnostics(columns.slice(1), response, fit)).toThrowError(
    expect.objectContaining({ code: "shape" }),
  );
  expect(() => rowDiagnostics(columns, response, { ...fit, residualStandardError: null })).toThrowError(
    expect.objectContaining({ code: "tooFewRows" }),
  );
});

/** Both operations on drawn numbers; what was written, bit for bit. */
function runOn(kernel: Kernel, rows: number, columns: number, isUpper: boolean): Float64Array {
  const draw = drawFrom(rows * 31 + columns);
  const first = kernel.reserve(0);
  const at = (column: number) => first + (columns + column) * COLUMN_BYTES;
  const t = at(11);
  kernel.reserve(t + columns * columns * 8 - first);
  const { f64, operations } = kernel;
  for (let i = first / 8; i < t / 8; i++) f64[i] = draw() - 0.4;
  for (let i = 0; i < columns * columns; i++) {
    f64[t / 8 + i] = isUpper && i % columns < Math.floor(i / columns) ? 0 : draw() - 0.5;
  }
  operations.addSquaredLengths(first, columns, rows, t, isUpper ? 1 : 0, at(0));
  operations.diagnoseRows(at(1), at(2), at(3), at(0), rows, 0.7, rows % 2 === 0 ? 11 : Number.NaN, 5, at(4));
  return Float64Array.from({ length: 8 * rows }, (_, i) => {
    const column = Math.floor(i / rows);
    return f64[at(column === 0 ? 0 : 3 + column) / 8 + (i % rows)]!;
  });
}

describe("both kernels give the same bits for rows", () => {
  const wasm = wasmKernel(kernelModule()!);
  const plain = plainKernel();

  test.each([1, 2, 7, 8, 9, 255, BLOCK_ROWS])("on %i rows", (rows) => {
    expect(rows).toBeLessThan(COLUMN_STRIDE);
    for (const isUpper of [false, true]) expect(runOn(wasm, rows, 6, isUpper)).toEqual(runOn(plain, rows, 6, isUpper));
  });

  test("on drawn numbers of rows and columns", () => {
    const size = fc.record({
      rows: fc.integer({ min: 1, max: 70 }),
      threes: fc.integer({ min: 1, max: 9 }),
      isUpper: fc.boolean(),
    });
    fc.assert(
      fc.property(size, ({ rows, threes, isUpper }) => {
        expect(runOn(wasm, rows, 3 * threes, isUpper)).toEqual(runOn(plain, rows, 3 * threes, isUpper));
      }),
      { seed: 20264, numRuns: 40 },
    );
  });
});
