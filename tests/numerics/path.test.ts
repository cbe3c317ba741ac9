/**
 * Which path a fit takes, and that it deserves it: whole-number columns that move together more and more closely, with a
 * response that is an exact combination of them, so that the right coefficients are known without any reference.
 */
import { describe, expect, test } from "vitest";
import { logRelativeError } from "../../src/app/reachedDigits.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

/** x1 = K·a + b, x2 = K·a + c, x3 free; y = 3 + 2·x1 − 5·x2 + x3 + noise that is orthogonal to none of it but whole. */
function together(closeness: number, count = 400): { columns: Float64Array[]; response: Float64Array } {
  const next = drawFrom(closeness);
  const whole = (size: number) => Math.floor(next() * size) - Math.floor(size / 2);
  const a = Float64Array.from({ length: count }, () => whole(100));
  const x1 = a.map((value) => closeness * value + whole(100));
  const x2 = a.map((value) => closeness * value + whole(100));
  const x3 = Float64Array.from({ length: count }, () => whole(1000));
  return { columns: [x1, x2, x3], response: x1.map((value, i) => 3 + 2 * value - 5 * x2[i]! + x3[i]!) };
}

const RIGHT = [2, -5, 1];

function digitsOf(slopes: Float64Array): number {
  return Math.min(...slopes.map((slope, at) => logRelativeError(slope, RIGHT[at]!)));
}

describe("the path of a fit", () => {
  test.each([1, 10, 100, 1e3, 1e4])("columns %i times as close still go by moments, with at least nine digits", (k) => {
    const { columns, response } = together(k);
    const found = solveLeastSquares(columns, response, { intercept: true });
    expect(found.path).toBe("moments");
    expect(found.condition).toBeLessThan(1e5);
    expect(digitsOf(found.slopes)).toBeGreaterThanOrEqual(9);
  });

  test.each([1e6, 1e7, 1e8])("columns %i times as close go the careful way, with at least nine digits", (k) => {
    const { columns, response } = together(k);
    const found = solveLeastSquares(columns, response, { intercept: true });
    expect(found.path).toBe("careful");
    expect(digitsOf(found.slopes)).toBeGreaterThanOrEqual(9);
  });

  test("both paths agree where both can be used", () => {
    const { columns, response } = together(50);
    const noisy = response.map((value, i) => value + Math.sin(i));
    const [quick, careful] = (["moments", "careful"] as const).map((path) =>
      solveLeastSquares(columns, noisy, { intercept: true, path }),
    );
    expect(quick!.path).toBe("moments");
    expect(careful!.path).toBe("careful");
    quick!.slopes.forEach((slope, at) => {
      expect(logRelativeError(slope, careful!.slopes[at]!)).toBeGreaterThan(13);
      expect(logRelativeError(quick!.standardErrors[at]!, careful!.standardErrors[at]!)).toBeGreaterThan(11);
    });
  });

  test("residuals stand at right angles to every column, whatever the path", () => {
    for (const closeness of [1, 1e7]) {
      const { columns, response } = together(closeness);
      const noisy = response.map((value, i) => value + 1000 * Math.sin(i));
      const { residuals } = solveLeastSquares(columns, noisy, { intercept: true });
      const length = Math.sqrt(residuals.reduce((sum, e) => sum + e * e, 0));
      for (const column of columns) {
        const size = Math.sqrt(column.reduce((sum, x) => sum + x * x, 0)) * length;
        expect(Math.abs(column.reduce((sum, x, i) => sum + x * residuals[i]!, 0)) / size).toBeLessThan(1e-12);
      }
    }
  });
});
