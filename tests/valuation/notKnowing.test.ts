/** The range without an attribute, split; and assumed values against pricing with them. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import type { AttributeValue } from "../../src/domain/attribute.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const RUNS = { numRuns: 30, seed: 20_261_201 };

function appraise(seed: number, unknown: readonly string[], change: Subject["values"] = {}) {
  const values: Record<string, AttributeValue> = { ...SUBJECT.values, ...change };
  for (const key of unknown) values[key] = null;
  const input = {
    assetClass: CLASS,
    sales: sales({ seed, count: 80, together: 0.6 }),
    model: model(),
    subject: { ...SUBJECT, values },
    levels: [0.9],
  };
  return computeAppraisal(input);
}

describe("notKnowing", () => {
  test("the three shares add up to one, and the noise share is that of the fit that knows", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1e6 }),
        fc.subarray(["hours", "pull", "make", "remote"], { minLength: 1 }),
        (seed, unknown) => {
          const { appraisal, fit } = appraise(seed, unknown);
          const found = appraisal.priced!.notKnowing!;
          const { noise, notKnowing, estimation } = found.shares;
          expect(noise + notKnowing + estimation).toBeCloseTo(1, 12);
          expect(Math.min(noise, notKnowing, estimation)).toBeGreaterThanOrEqual(0);
          const s = fit.solution.residualStandardError!;
          const { leverage } = appraisal.priced!.price;
          expect(estimation).toBeCloseTo(leverage / (1 + leverage), 12);
          const known = appraise(seed, []).fit.solution.residualStandardError!;
          expect(noise * s * s * (1 + leverage)).toBeCloseTo(Math.min(s, known) ** 2, 12);
        },
      ),
      RUNS,
    );
  });

  test("assumed prices rise from low to high, and typical is what pricing with that value gives", () => {
    const { appraisal } = appraise(41, ["remote"]);
    const [low, typical, high] = appraisal.priced!.notKnowing!.assumed;
    expect(low!.amount).toBeLessThanOrEqual(typical!.amount);
    expect(typical!.amount).toBeLessThanOrEqual(high!.amount);
    const reads = ["yes", "no"].map(
      (value) => appraise(41, [], { remote: value === "yes" }).appraisal.priced!.price.amount,
    );
    expect(reads.some((amount) => Math.abs(amount / typical!.amount - 1) < 1e-12)).toBe(true);
  });

  test("nothing is said when everything is known", () => {
    expect(appraise(3, []).appraisal.priced!.notKnowing).toBeNull();
  });
});
