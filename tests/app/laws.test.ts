/** Laws that hold for any evidence: what must add up adds up, and what must not matter does not. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import { EVERYTHING, type PriceModel } from "../../src/domain/priceModel.ts";
import type { SaleColumns } from "../../src/domain/sale.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { fromEvidenceTable, toEvidenceTable } from "../../src/evidence/evidenceTable.ts";
import { selectEvidence } from "../../src/evidence/selectEvidence.ts";
import { pullWeights } from "../../src/explanation/pull.ts";
import { buildDesign } from "../../src/hedonic/buildDesign.ts";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { describeSubject } from "../../src/valuation/describeSubject.ts";
import { estimatePrice } from "../../src/valuation/estimatePrice.ts";
import { CLASS, model, reordered, SUBJECT, sales } from "../fixtures/randomClass.ts";

const LEVELS = [0.5, 0.9];

function appraise(
  columns: SaleColumns,
  change: Partial<PriceModel> = {},
  subject: Subject | null = SUBJECT,
): Appraisal {
  const input = { assetClass: CLASS, sales: columns, model: model(change), subject, levels: LEVELS };
  return computeAppraisal(input).appraisal;
}

const draws = fc.record({
  seed: fc.integer({ min: 1, max: 1_000_000 }),
  count: fc.integer({ min: 20, max: 120 }),
  together: fc.constantFrom(0, 0.5, 0.9, 0.999),
});
const someOut = fc.subarray(["hours", "pull", "built", "make", "remote"], { maxLength: 4 });
const response = fc.constantFrom("lnPrice" as const, "price" as const);
const RUNS = { numRuns: 40, seed: 20_261_201 };

describe("what must add up", () => {
  test("own and carried parts give each coefficient, in coefficients and in money", () => {
    fc.assert(
      fc.property(draws, someOut, response, (draw, leftOut, form) => {
        const { ledger, report } = appraise(sales(draw), { leftOut, response: form });
        expect(ledger.identityError).toBeLessThan(1e-10);
        for (const row of ledger.rows) {
          const { own, carried, coefficient } = row.money;
          const size = Math.max(Math.abs(coefficient), Math.abs(own), 1e-9);
          const sum = carried.reduce((total, part) => total + part.amount, own);
          expect(Math.abs(sum - coefficient) / size).toBeLessThan(1e-8);
          const stated = report.coefficients.find((one) => one.attribute === row.attribute && one.level === row.level)!;
          expect(row.coefficient).toBe(stated.estimate);
        }
      }),
      RUNS,
    );
  });

  test("the built-up steps end in the price, to the last bit", () => {
    fc.assert(
      fc.property(draws, response, (draw, form) => {
        const { priced } = appraise(sales(draw), { response: form });
        const { steps, start, end } = priced!.builtUp;
        expect(end).toBe(priced!.price.amount);
        expect(steps[steps.length - 1]!.standsAt).toBe(priced!.price.amount);
        const sum = steps.reduce((total, step) => total + step.step, start);
        const largest = Math.max(...steps.map((step) => Math.abs(step.standsAt)), start);
        expect(Math.abs(sum - end)).toBeLessThan(1e-12 * largest);
      }),
      RUNS,
    );
  });

  test("pull weights sum to one, give the fitted value, and their squares give the leverage", () => {
    fc.assert(
      fc.property(draws, (draw) => {
        const columns = sales(draw);
        const used = Int32Array.from({ length: draw.count }, (_, i) => i);
        const design = buildDesign(columns, used, CLASS, model());
        const fit = fitColumns(design, design.groups);
        const row = describeSubject(design, CLASS, SUBJECT);
        const weights = pullWeights(fit, row);
        const spread = weights.reduce((sum, w) => sum + Math.abs(w), 0);
        expect(Math.abs(weights.reduce((sum, w) => sum + w, 0) - 1)).toBeLessThan(1e-10 * spread);
        const squares = weights.reduce((sum, w) => sum + w * w, 0);
        const fitted = weights.reduce((sum, w, i) => sum + w * design.response[i]!, 0);
        const direct = fit.columns.reduce(
          (sum, index, at) => sum + fit.solution.slopes[at]! * row.x[index]!,
          fit.solution.intercept!,
        );
        const size = weights.reduce((sum, w, i) => sum + Math.abs(w * design.response[i]!), 0);
        expect(Math.abs(fitted - direct)).toBeLessThan(1e-9 * size);
        const { leverage } = estimatePrice(fit, row, [], null);
        expect(Math.abs(squares / leverage - 1)).toBeLessThan(1e-9);
      }),
      RUNS,
    );
  });

  test("the price without a sale is the price of a fit without it", () => {
    const columns = sales({ seed: 77, count: 40, together: 0.9 });
    const { priced } = appraise(columns, { market: "none" });
    for (const pull of priced!.pull.top.slice(0, 6)) {
      const rest = Array.from({ length: 40 }, (_, i) => i).filter((i) => columns.ids[i] !== pull.sale);
      const without = appraise({ ...reordered(columns, rest), count: 39 }, { market: "none" });
      expect(without.evidence.used).toBe(39);
      expect(Math.abs(without.priced!.price.amount / pull.priceWithout! - 1)).toBeLessThan(1e-9);
    }
  });

  test("counts of evidence reconcile to nothing left over", () => {
    fc.assert(
      fc.property(draws, fc.constantFrom(null, "2023-01-01", "2024-01-01"), fc.boolean(), (draw, day, verifiedOnly) => {
        const filter = { ...EVERYTHING, channels: ["auction", "dealer"] as const, verifiedOnly };
        const { account, used } = selectEvidence(sales(draw), CLASS, model({ filter }), day);
        const out = account.out.flatMap((one) => one.saleIds);
        expect(account.used + out.length).toBe(account.read);
        expect(new Set([...out, ...Array.from(used, (at) => at + 1)]).size).toBe(account.read);
      }),
      RUNS,
    );
  });
});

describe("what must not matter", () => {
  test("the order in which sales stand in the store does not change a bit", () => {
    fc.assert(
      fc.property(draws, fc.integer(), (draw, shift) => {
        const columns = sales(draw);
        const order = Array.from({ length: draw.count }, (_, i) => (i * 7 + Math.abs(shift % 97)) % draw.count);
        fc.pre(new Set(order).size === draw.count);
        const plain = { ...appraise(columns), evidence: null, caveats: null };
        const turned = { ...appraise(reordered(columns, order)), evidence: null, caveats: null };
        expect(turned).toEqual(plain);
      }),
      RUNS,
    );
  });

  test("the same evidence through a sheet's table gives the same bits", () => {
    fc.assert(
      fc.property(draws, someOut, (draw, leftOut) => {
        const columns = sales(draw);
        const input = {
          assetClass: CLASS,
          sales: columns,
          model: model({ leftOut }),
          subject: SUBJECT,
          levels: LEVELS,
        };
        const first = computeAppraisal(input);
        const table = JSON.parse(JSON.stringify(toEvidenceTable(columns, first.used, CLASS, input.model)));
        const again = computeAppraisal({ ...input, sales: fromEvidenceTable(table, CLASS) });
        expect(again.appraisal.priced).toEqual(first.appraisal.priced);
        expect(again.appraisal.report).toEqual(first.appraisal.report);
        expect(again.appraisal.ledger).toEqual(first.appraisal.ledger);
      }),
      RUNS,
    );
  });

  test("another unit rescales the coefficient and leaves price and ranges as they are", () => {
    fc.assert(
      fc.property(draws, fc.constantFrom(1e-3, 0.3048, 1.609344, 1000), (draw, factor) => {
        const columns = sales(draw);
        const other = {
          ...columns,
          values: { ...columns.values, hours: columns.values.hours!.map((h) => h * factor) },
        };
        const [here, there] = [
          appraise(columns),
          appraise(other, {}, { ...SUBJECT, values: { ...SUBJECT.values, hours: 4200 * factor } }),
        ];
        const slope = (a: Appraisal) => a.report.coefficients.find((one) => one.attribute === "hours")!.estimate;
        expect(Math.abs((slope(there) * factor) / slope(here) - 1)).toBeLessThan(1e-9);
        expect(Math.abs(there.priced!.price.amount / here.priced!.price.amount - 1)).toBeLessThan(1e-9);
        here.priced!.price.rangeForOneSale.forEach((range, at) => {
          const twin = there.priced!.price.rangeForOneSale[at]!;
          expect(Math.abs(twin.low / range.low - 1)).toBeLessThan(1e-9);
          expect(Math.abs(twin.high / range.high - 1)).toBeLessThan(1e-9);
        });
      }),
      RUNS,
    );
  });
});
