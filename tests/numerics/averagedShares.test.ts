/** Order-averaged shares: of R² against brute force over all subsets in 45 digits, and by what defines them. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { allSubsets } from "../../src/numerics/allSubsets.ts";
import { averagedShares } from "../../src/numerics/averagedShares.ts";
import { referenceSales } from "../fixtures/referenceSales.ts";

test.each(["houseprices", "diamonds600"] as const)("shares of R² of the %s agree to 1e-9", (name) => {
  const { columns, response, groups, terms, expected } = referenceSales(name);
  const { r2 } = allSubsets(accumulateMoments([...columns, response]), groups);
  const found = averagedShares(r2, groups.length);
  const { lmg, first, last, sumsTo } = expected.relativeImportance;
  terms.forEach((term, g) => {
    expect(Math.abs(found.shares[g]! / lmg[term] - 1)).toBeLessThan(1e-9);
    expect(Math.abs(found.first[g]! / first[term] - 1)).toBeLessThan(1e-9);
    expect(Math.abs(found.last[g]! - last[term])).toBeLessThan(1e-12);
  });
  expect(found.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(sumsTo, 12);
});

describe("shares by averaging over orders", () => {
  const values = fc
    .integer({ min: 1, max: 5 })
    .chain((players) =>
      fc.tuple(
        fc.constant(players),
        fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 2 ** players, maxLength: 2 ** players }),
      ),
    );

  test("are the mean over all orders of what a player adds, and add up to the whole", () => {
    fc.assert(
      fc.property(values, ([players, list]) => {
        const v = Float64Array.from(list);
        const byOrders = new Float64Array(players);
        const orders = ordersOf(players);
        for (const order of orders) {
          let set = 0;
          for (const g of order) {
            byOrders[g]! += (v[set + (1 << g)]! - v[set]!) / orders.length;
            set += 1 << g;
          }
        }
        const { shares } = averagedShares(v, players);
        for (const [g, share] of shares.entries()) expect(share).toBeCloseTo(byOrders[g]!, 11);
        expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(v.at(-1)! - v[0]!, 11);
      }),
      { seed: 20262, numRuns: 60 },
    );
  });

  test("a player that adds nothing has nothing, and players that do the same share alike", () => {
    const v = Float64Array.from({ length: 16 }, (_, set) => Math.min(1, set & 3));
    const { shares } = averagedShares(v, 4);
    expect([shares[2], shares[3]]).toEqual([0, 0]);
    expect(shares[0]).toBe(shares[1]);
    expect(shares[0]).toBeCloseTo(0.5, 14);
  });

  test("refuses a table of the wrong size or with holes", () => {
    expect(() => averagedShares(new Float64Array(5), 2)).toThrowError(expect.objectContaining({ code: "shape" }));
    expect(() => averagedShares(Float64Array.of(0, Number.NaN), 1)).toThrowError(
      expect.objectContaining({ code: "notFinite" }),
    );
  });
});

function ordersOf(players: number): number[][] {
  if (players === 0) return [[]];
  return ordersOf(players - 1).flatMap((order) =>
    Array.from({ length: players }, (_, at) => [...order.slice(0, at), players - 1, ...order.slice(at)]),
  );
}
