/** The ledger under every way of fitting: its identity and its words. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import { attributeSets } from "../../src/explanation/attributeSets.ts";
import { attribute, CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const draws = fc.record({
  seed: fc.integer({ min: 1, max: 1_000_000 }),
  count: fc.integer({ min: 30, max: 120 }),
  together: fc.constantFrom(0, 0.5, 0.9, 0.999),
});
const someOut = fc.subarray(["hours", "pull", "built", "make", "remote"], { minLength: 1, maxLength: 4 });
const ways = fc.constantFrom<Partial<PriceModel>>(
  {},
  { halfLifeMonths: 12 },
  { estimator: { kind: "ridge", penalty: 5 } },
  { halfLifeMonths: 24, estimator: { kind: "ridge", penalty: 0.5 } },
);

function compute(draw: Parameters<typeof sales>[0], change: Partial<PriceModel>) {
  return computeAppraisal({
    assetClass: CLASS,
    sales: sales(draw),
    model: model(change),
    subject: SUBJECT,
    levels: [0.9],
  });
}

/** Claims of cause, which no sales data bears. */
const CLAIMS = [
  /\bcaus(?:e[sd]?|ing)\b/i,
  /\bdue to\b/i,
  /\bbecause of\b/i,
  /\bleads? to\b/i,
  /\bresults? in\b/i,
  /\bmakes? the price\b/i,
  /\bdrives?\b/i,
  /\beffects? of\b/i,
  /\binfluences?\b/i,
  /\braises? the price\b/i,
];

function sentencesOf({ ledger, caveats, report }: Appraisal): string[] {
  const told = caveats.map((caveat) => JSON.stringify(caveat));
  return [
    ledger.headline,
    ...ledger.rows.map(({ sentence }) => sentence),
    ...told,
    ...report.leftOut.map((one) => one.sentence),
  ];
}

describe("the ledger", () => {
  test("adds up to 1e-10 with weights, with a penalty, with choices and with attributes that all but agree", () => {
    fc.assert(
      fc.property(draws, someOut, ways, (draw, leftOut, way) => {
        const { ledger } = compute(draw, { leftOut, ...way }).appraisal;
        expect(ledger.identityError).toBeLessThan(1e-10);
        for (const row of ledger.rows) {
          const sum = row.carriedParts.reduce((total, part) => total + part.amount, row.ownPart);
          const size = Math.max(
            Math.abs(row.coefficient),
            Math.abs(row.ownPart),
            ...row.carriedParts.map((part) => Math.abs(part.amount)),
          );
          expect(Math.abs(sum - row.coefficient)).toBeLessThanOrEqual(1e-10 * size);
        }
      }),
      { seed: 41, numRuns: 60 },
    );
  });

  test("adds up where an attribute is an exact copy of another, and says which is not kept", () => {
    fc.assert(
      fc.property(draws, fc.subarray(["hours", "pull", "make"]), (draw, leftOut) => {
        const drawn = sales(draw);
        const copied = { ...drawn, values: { ...drawn.values, copy: drawn.values.hours!.map((value) => 2 * value) } };
        const assetClass = { ...CLASS, attributes: [...CLASS.attributes, attribute("copy")] };
        const plain = model({ leftOut });
        const asked = {
          ...plain,
          attributes: [...plain.attributes, { key: "copy", form: "line" as const, reference: null }],
        };
        const subject = { ...SUBJECT, values: { ...SUBJECT.values, copy: 8400 } };
        const { appraisal } = computeAppraisal({ assetClass, sales: copied, model: asked, subject, levels: [0.9] });
        expect(appraisal.ledger.identityError).toBeLessThan(1e-10);
        expect(appraisal.report.dependencies).toHaveLength(1);
        expect(appraisal.report.dependencies[0]!.attributes.toSorted()).toEqual(["copy", "hours"]);
      }),
      { seed: 42, numRuns: 30 },
    );
  });

  test("never claims a cause, over 200 drawn classes", () => {
    fc.assert(
      fc.property(draws, someOut, (draw, leftOut) => {
        const { appraisal, fit, row, reference } = compute(draw, { leftOut });
        const sets = attributeSets({ reference, fit, row, currencyCode: "EUR" });
        for (const sentence of [...sentencesOf(appraisal), ...sets.sentences]) {
          for (const claim of CLAIMS) expect(sentence).not.toMatch(claim);
        }
      }),
      { seed: 43, numRuns: 200 },
    );
  });
});
