/** Weights on the simplex: no other mixture errs less, known corners and edges, and members that repeat others. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { simplexWeights } from "../../src/numerics/simplexWeights.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

function gramOf(lists: readonly Float64Array[]): Float64Array {
  const m = lists.length;
  return Float64Array.from({ length: m * m }, (_, at) => {
    const [a, b] = [lists[Math.floor(at / m)]!, lists[at % m]!];
    return a.reduce((sum, value, i) => sum + value * b[i]!, 0);
  });
}

function squareOf(gram: Float64Array, w: ArrayLike<number>): number {
  const m = w.length;
  return gram.reduce((sum, value, at) => sum + value * w[Math.floor(at / m)]! * w[at % m]!, 0);
}

/** Lists that share most of their errors, as fits of much the same attributes do. */
function errorLists(seed: number, m: number, n: number, own: number): Float64Array[] {
  const draw = drawFrom(seed);
  const shared = Float64Array.from({ length: n }, () => draw() - 0.5);
  return Array.from({ length: m }, () => shared.map((value) => value + own * (draw() - 0.45)));
}

describe("weights on the simplex", () => {
  test("are not negative, sum to 1, and meet the conditions of the least (Kuhn & Tucker 1951)", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1e6 }),
        fc.integer({ min: 1, max: 25 }),
        fc.integer({ min: 5, max: 60 }),
        fc.constantFrom(1, 0.1, 0.01),
        (seed, m, n, own) => {
          const gram = gramOf(errorLists(seed, m, n, own));
          const w = simplexWeights(gram, m);
          expect(w.every((weight) => weight >= 0)).toBe(true);
          expect(w.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 13);
          const least = squareOf(gram, w);
          const largest = Math.max(...w.map((_, j) => gram[j * (m + 1)]!));
          for (let j = 0; j < m; j++) {
            const slope = w.reduce((sum, weight, l) => sum + gram[j * m + l]! * weight, 0);
            expect(slope).toBeGreaterThan(least - 1e-10 * largest);
            if (w[j]! > 1e-6) expect(Math.abs(slope - least)).toBeLessThan(1e-10 * largest);
          }
        },
      ),
      { seed: 4711, numRuns: 150 },
    );
  });

  test("are those of the closed form for two lists", () => {
    const [a, b] = errorLists(5, 2, 40, 1) as [Float64Array, Float64Array];
    const difference = a.map((value, i) => value - b[i]!);
    const first = -difference.reduce((sum, d, i) => sum + d * b[i]!, 0) / difference.reduce((sum, d) => sum + d * d, 0);
    expect(first).toBeGreaterThan(0);
    expect(first).toBeLessThan(1);
    expect(simplexWeights(gramOf([a, b]), 2)[0]).toBeCloseTo(first, 10);
  });

  test("fall as one over the variance where errors have nothing in common", () => {
    const w = simplexWeights(Float64Array.of(1, 0, 0, 0, 2, 0, 0, 0, 4), 3);
    [4 / 7, 2 / 7, 1 / 7].forEach((expected, j) => {
      expect(w[j]).toBeCloseTo(expected, 13);
    });
  });

  test("leave everything to one that errs in the same way as another, only less", () => {
    expect([...simplexWeights(Float64Array.of(4, 2, 2, 1), 2)]).toEqual([0, 1]);
  });

  test("give nothing more by a member that repeats another", () => {
    const lists = errorLists(9, 4, 30, 0.5);
    const plain = squareOf(gramOf(lists), simplexWeights(gramOf(lists), 4));
    const more = [...lists, lists[2]!, lists[0]!];
    expect(squareOf(gramOf(more), simplexWeights(gramOf(more), 6)) / plain).toBeCloseTo(1, 11);
  });

  test("are settled without error, and refused for nothing", () => {
    expect([...simplexWeights(new Float64Array(4), 2)]).toEqual([1, 0]);
    expect(() => simplexWeights(new Float64Array(0), 0)).toThrow(/cross-products/);
    expect(() => simplexWeights(Float64Array.of(Number.NaN), 1)).toThrow(/finite/);
  });
});
