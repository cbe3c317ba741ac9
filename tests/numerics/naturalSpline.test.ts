/** The natural cubic spline: its coefficients read as gains between knots, and it is what it says it is. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { naturalSpline, splineKnots } from "../../src/numerics/naturalSpline.ts";

const RUNS = { numRuns: 50, seed: 20_261_201 };
const knots = fc
  .uniqueArray(fc.double({ min: -50, max: 50, noNaN: true }), { minLength: 3, maxLength: 7 })
  .map((values) => [...values].sort((a, b) => a - b))
  .filter((values) => values.every((value, i) => i === 0 || value - values[i - 1]! > 0.5));

describe("naturalSpline", () => {
  test("is zero at the first knot, and each column gains 1 over its own stretch and nothing over the others", () => {
    fc.assert(
      fc.property(knots, (given) => {
        const at = naturalSpline(given);
        expect(at(given[0]!).every((value) => Math.abs(value) < 1e-9)).toBe(true);
        for (let m = 0; m + 1 < given.length; m++) {
          const [from, to] = [at(given[m]!), at(given[m + 1]!)];
          to.forEach((value, j) => {
            expect(value - from[j]!).toBeCloseTo(j === m ? 1 : 0, 7);
          });
        }
      }),
      RUNS,
    );
  });

  test("is straight beyond the outer knots, and smooth at each knot", () => {
    const given = [1, 2.5, 4, 7];
    const at = naturalSpline(given);
    for (let j = 0; j < 3; j++) {
      const f = (x: number) => at(x)[j]!;
      for (const [a, step] of [
        [-5, 1],
        [9, 1],
      ] as const) {
        expect(f(a) - 2 * f(a + step) + f(a + 2 * step)).toBeCloseTo(0, 10);
      }
      for (const t of given) {
        const h = 1e-4;
        const second = (x: number) => (f(x - h) - 2 * f(x) + f(x + h)) / h ** 2;
        expect(second(t - 3 * h)).toBeCloseTo(second(t + 3 * h), 1);
      }
    }
  });

  test("holds the straight line: gains in proportion to the stretches give x − t₁", () => {
    const given = [2, 3, 5, 9, 14];
    const at = naturalSpline(given);
    const gains = given.slice(1).map((to, j) => to - given[j]!);
    for (const x of [-3, 2, 4.4, 10, 30]) {
      expect(at(x).reduce((sum, value, j) => sum + value * gains[j]!, 0)).toBeCloseTo(x - 2, 9);
    }
  });
});

describe("splineKnots", () => {
  test("stand at the stated quantiles", () => {
    const values = Float64Array.from({ length: 101 }, (_, i) => i);
    expect(splineKnots(values, 3)).toEqual([10, 50, 90]);
    expect(splineKnots(values, 4)).toEqual([5, 35, 65, 95]);
    splineKnots(values, 5).forEach((knot, j) => {
      expect(knot).toBeCloseTo([5, 27.5, 50, 72.5, 95][j]!, 12);
    });
  });

  test("are refused when too few values differ", () => {
    expect(() => splineKnots(Float64Array.of(1, 1, 1, 1, 2), 4)).toThrow(/knots differ/);
    expect(() => splineKnots(Float64Array.of(1, 2, 3), 8)).toThrow(/3 to 7/);
  });
});
