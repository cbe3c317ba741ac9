/** What two models' coefficients and prices differ by, split so that the parts add up. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import { compareCoefficients } from "../../src/explanation/compareCoefficients.ts";
import { shareOut } from "../../src/explanation/shareOut.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const RUNS = { numRuns: 30, seed: 20_261_201 };

describe("compareCoefficients", () => {
  test("splits every difference over what only one side includes, exactly", () => {
    const sets = fc.subarray(["hours", "pull", "make", "remote"], { maxLength: 3 });
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), sets, sets, (seed, first, second) => {
        const columns = sales({ seed, count: 70, together: 0.8 });
        const side = (leftOut: string[]) =>
          computeAppraisal({
            assetClass: CLASS,
            sales: columns,
            model: model({ leftOut }),
            subject: SUBJECT,
            levels: [0.9],
          }).appraisal;
        const compared = compareCoefficients(side(first), side(second), true);
        for (const one of compared) {
          if (one.difference === null || one.parts.length === 0) continue;
          const size = Math.max(
            Math.abs(one.first!),
            Math.abs(one.second!),
            ...one.parts.map((p) => Math.abs(p.amount)),
          );
          const total = one.parts.reduce((sum, part) => sum + part.amount, 0);
          expect(Math.abs(total - one.difference)).toBeLessThan(1e-8 * size);
        }
        const onlyFirst = compared.filter(({ second: value }) => value === null).map(({ attribute }) => attribute);
        expect([...new Set(onlyFirst)].sort()).toEqual(second.filter((key) => !first.includes(key)).sort());
      }),
      RUNS,
    );
  });
});

describe("shareOut", () => {
  test("gives shares that add up to the whole move", () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -100, max: 100, noNaN: true }), { minLength: 8, maxLength: 8 }),
        (values) => {
          const shares = shareOut(3, (mask) => values[mask]!);
          expect(shares.reduce((sum, one) => sum + one, 0)).toBeCloseTo(values[7]! - values[0]!, 9);
        },
      ),
      RUNS,
    );
  });

  test("is the mean over both orders for two changes", () => {
    expect(shareOut(2, (mask) => [0, 10, 4, 20][mask]!)).toEqual([13, 7]);
  });

  test("gives nothing for nothing, all to a single change, and refuses more than twelve", () => {
    expect(shareOut(0, () => 5)).toEqual([]);
    expect(shareOut(1, (mask) => mask * 7)).toEqual([7]);
    expect(() => shareOut(13, () => 0)).toThrow(/at most 12/);
  });
});
