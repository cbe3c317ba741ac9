/** Which columns depend on earlier ones in any order is read off equations found in one order. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Design } from "../../src/hedonic/fit.ts";
import { dependentIn, rememberDependencies } from "../../src/hedonic/knownDependencies.ts";
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { findDependencies } from "../../src/numerics/findDependencies.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

/** Six columns of which three depend: 1.25 × the first, the sum of the first and second, and a constant. */
function drawn(seed: number) {
  const next = drawFrom(seed);
  const rows = { length: 40 };
  const a = Float64Array.from(rows, () => Math.round(1e4 * next()));
  const b = Float64Array.from(rows, () => Math.round(100 * next()) / 4);
  const c = Float64Array.from(rows, () => Math.round(8 * next()));
  const columns = [a, b, c, a.map((value) => 1.25 * value), a.map((value, i) => value + b[i]!), a.map(() => 7)];
  return { columns, design: { moments: accumulateMoments(columns) } as unknown as Design };
}

const ORDER = fc.shuffledSubarray([0, 1, 2, 3, 4, 5], { minLength: 6 });

describe("known dependencies", () => {
  test("name in every order the columns that a search in that order finds", () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1000 }), ORDER, ORDER, (seed, first, then) => {
        const { columns, design } = drawn(seed);
        const search = (order: readonly number[]) =>
          findDependencies(
            order.map((at) => columns[at]!),
            { intercept: true },
          ).dependent;
        rememberDependencies(design, first, search(first));
        const found = [...dependentIn(design, then)!].sort();
        expect(found).toEqual(
          search(then)
            .map((one) => then[one.column]!)
            .sort(),
        );
        expect(found).toHaveLength(3);
      }),
      { seed: 31, numRuns: 150 },
    );
  });

  test("are null until somebody has looked, and none where none were found", () => {
    const { design } = drawn(1);
    expect(dependentIn(design, [0, 1, 2])).toBeNull();
    rememberDependencies(design, [0, 1, 2], []);
    expect(dependentIn(design, [2, 1, 0])).toEqual(new Set());
  });
});
