/** The two searches on a line: a zero crossing and a valley. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { findRoot } from "../../src/numerics/findRoot.ts";
import { goldenSection } from "../../src/numerics/goldenSection.ts";

test("a root is found from either side, also where the function is nearly flat", () => {
  fc.assert(
    fc.property(fc.double({ min: -3, max: 3, noNaN: true }), fc.constantFrom(1, 3, 5), (root, power) => {
      const f = (x: number) => (x - root) ** power + 0.01 * (x - root);
      expect(findRoot(f, -4, 4, 1e-12)).toBeCloseTo(root, 8);
      expect(findRoot(f, 4, -4, 1e-12)).toBeCloseTo(root, 8);
    }),
    { seed: 1, numRuns: 200 },
  );
});

test("an end that is the root already comes back", () => {
  expect(findRoot((x) => x - 1, 1, 5, 1e-12)).toBe(1);
  expect(findRoot((x) => x - 5, 1, 5, 1e-12)).toBe(5);
});

test("a valley is found to the root of the rounding", () => {
  expect(goldenSection((x) => (x - 0.3) ** 2 + 7, -2, 2, 1e-9)).toBeCloseTo(0.3, 7);
  expect(goldenSection((x) => x, 1, 2, 1e-6)).toBeCloseTo(1, 5);
});
