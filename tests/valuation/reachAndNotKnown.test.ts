/** Reach, not-known values and refusals, on drawn sales. */
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { SaleColumns } from "../../src/domain/sale.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const SALES = sales({ seed: 11, count: 200, together: 0.9 });

function price(values: Subject["values"], change: Partial<PriceModel> = {}, columns: SaleColumns = SALES) {
  const subject = { ...SUBJECT, values: { ...SUBJECT.values, ...values } };
  return computeAppraisal({ assetClass: CLASS, sales: columns, model: model(change), subject, levels: [0.9] })
    .appraisal;
}

describe("reach", () => {
  test("a value past the highest of the evidence is beyond, and the sentence names it", () => {
    const { reach } = price({ pull: 30 }).priced!;
    expect(reach.verdict).toBe("beyond");
    expect(reach.attributes.find((one) => one.key === "pull")!.verdict).toBe("beyond");
    expect(reach.sentence).toContain("pull");
  });

  test("values inside each range can still lie beyond jointly", () => {
    const { reach } = price({ built: "2024-06-01", hours: 9000 }).priced!;
    expect(reach.attributes.find((one) => one.key === "hours")!.verdict).not.toBe("beyond");
    expect(reach.joint.verdict).toBe("beyond");
    expect(reach.joint.leverage).toBeGreaterThan(reach.joint.highestInEvidence);
    expect(reach.sentence).toContain("not the combination");
  });

  test("a middling item lies inside", () => {
    expect(price({ built: "2017-06-01", hours: 5200 }).priced!.reach.verdict).toBe("inside");
  });
});

describe("a value that is not known", () => {
  test("is priced by the model without it, and the range is wider for it", () => {
    const known = price({});
    const unknown = price({ pull: null });
    expect(unknown.report.leftOut).toMatchObject([{ key: "pull", why: "not-known" }]);
    expect(unknown.priced!.price).toEqual(price({}, { leftOut: ["pull"] }).priced!.price);
    const [effect] = unknown.priced!.notKnown;
    expect(effect!.widthNow).toBeGreaterThan(effect!.widthIfKnown);
    expect(effect!.wouldRead).toHaveLength(3);
    expect(known.priced!.notKnown).toEqual([]);
  });

  test("everything not known is priced at the average sale", () => {
    const values = { hours: null, pull: null, built: null, make: null, remote: null };
    const { priced, report } = price(values, { market: "none" });
    expect(report.p).toBe(1);
    expect(priced!.price.amount).toBe(priced!.builtUp.start);
  });

  test("of two attributes that say the same, the known one stays in", () => {
    const doubled = {
      ...SALES,
      values: { ...SALES.values, pull_lb: SALES.values.pull!.map((tonnes) => tonnes * 2204.6) },
    };
    const pull = CLASS.attributes.find((one) => one.key === "pull")!;
    const assetClass = { ...CLASS, attributes: [...CLASS.attributes, { ...pull, key: "pull_lb", label: "Pull (lb)" }] };
    const attributes = [...model().attributes, { key: "pull_lb", form: "line" as const, reference: null }];
    const subject = { ...SUBJECT, values: { ...SUBJECT.values, pull: null, pull_lb: 5 * 2204.6 } };
    const input = { assetClass, sales: doubled, model: model({ attributes }), subject, levels: [0.9] };
    const { report, priced } = computeAppraisal(input).appraisal;
    expect(report.attributes).toContain("pull_lb");
    expect(Math.abs(priced!.price.amount / price({}).priced!.price.amount - 1)).toBeLessThan(1e-9);
  });
});

describe("market movement", () => {
  test("is held at the last sale for a later effective date, and said", () => {
    const { price: found } = price({}).priced!;
    expect(found.marketHeldAt).toBe(price({}).evidence.lastSoldOn);
  });
});

describe("what cannot be priced is refused in a sentence", () => {
  test.each([
    ["an unseen level", { make: "Brannock" }, /No sale of the evidence has Make "Brannock"/],
    ["a built day after the effective date", { built: "2026-01-01" }, /built after the effective date/],
    ["a word for a number", { hours: "many" }, /"many" is no number/],
    ["a word for yes or no", { remote: "perhaps" }, /neither yes nor no/],
  ])("%s", (_, values, sentence) => {
    expect(() => price(values as Subject["values"])).toThrowError(sentence);
  });

  test("no sales, one sale, and as many coefficients as sales", () => {
    const few = (count: number) => sales({ seed: 5, count, together: 0.5 });
    expect(() => price({}, {}, few(0))).toThrowError(/No sale is left as evidence/);
    expect(() => price({}, {}, few(1))).toThrowError(/1 sale cannot carry/);
    expect(() => price({}, {}, few(8))).toThrowError(/8 sales cannot carry 8 coefficients/);
  });

  test("a logarithm of nothing counts as a reason, not as a crash", () => {
    const zero = { ...SALES, values: { ...SALES.values, hours: SALES.values.hours!.map((h, i) => (i === 4 ? 0 : h)) } };
    const attributes = model().attributes.map((one) => (one.key === "hours" ? { ...one, form: "ln" as const } : one));
    const { evidence } = price({}, { attributes }, zero);
    expect(evidence.out.find((one) => one.reason === "no-logarithm")!.saleIds).toEqual([5]);
  });

  test("a constant column is named and left out, and the price is the same without it", () => {
    const same = { ...SALES, values: { ...SALES.values, pull: SALES.values.pull!.map(() => 4) } };
    const { report, priced } = price({ pull: 4 }, {}, same);
    expect(report.dependencies[0]).toMatchObject({ equation: "Pull = 4" });
    expect(report.leftOut).toMatchObject([{ key: "pull", why: "exact" }]);
    expect(priced!.price.amount).toBe(price({}, { leftOut: ["pull"] }, same).priced!.price.amount);
  });
});
