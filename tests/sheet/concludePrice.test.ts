import fc from "fast-check";
import { expect, test } from "vitest";
import { concludePrice } from "../../src/sheet/concludePrice.ts";
import { sheetEvidence } from "../fixtures/sheetEvidence.ts";

const { price } = sheetEvidence().appraisal.priced!;

test("the price is rounded to a tenth of half its 90 % range, and range ends go outward", () => {
  const conclusion = concludePrice({ price }, []);
  expect(conclusion.roundingStep).toBe(500);
  expect(conclusion.amount).toBe(38500);
  expect(conclusion.modelAmount).toBe(price.amount);
  expect(conclusion.rangeForOneSale.find(({ level }) => level === 0.9)).toEqual({
    level: 0.9,
    low: 33000,
    high: 45500,
  });
  expect(conclusion.rangeForAverage.find(({ level }) => level === 0.9)).toEqual({
    level: 0.9,
    low: 37300,
    high: 40000,
  });
});

test("the valuer's own adjustments move price and ranges by the same money", () => {
  const conclusion = concludePrice({ price }, [
    { label: "Forks", amount: 1500, reason: "new" },
    { label: "Tyres", amount: -500, reason: "worn" },
  ]);
  expect(conclusion.adjusted).toBe(price.amount + 1000);
  expect(conclusion.amount).toBe(39500);
  expect(conclusion.rangeForOneSale.find(({ level }) => level === 0.9)).toEqual({
    level: 0.9,
    low: 34000,
    high: 46500,
  });
});

test("without a range the price is rounded to whole money", () => {
  const bare = concludePrice({ price: { ...price, amount: 123.6, rangeForOneSale: [], rangeForAverage: [] } }, []);
  expect(bare).toMatchObject({ amount: 124, roundingStep: 1, rangeForOneSale: [], rangeForAverage: [] });
});

test("rounding never narrows a range and never moves the price by more than half a step", () => {
  const money = fc.double({ min: 1, max: 1e8, noNaN: true });
  fc.assert(
    fc.property(money, money, money, (amount, below, above) => {
      const range = { level: 0.9, low: amount - below, high: amount + above };
      const { rangeForOneSale, roundingStep, ...rest } = concludePrice(
        { price: { ...price, amount, rangeForOneSale: [range], rangeForAverage: [range] } },
        [],
      );
      expect(rangeForOneSale[0]!.low).toBeLessThanOrEqual(range.low);
      expect(rangeForOneSale[0]!.high).toBeGreaterThanOrEqual(range.high);
      expect(Math.abs(rest.amount - amount)).toBeLessThanOrEqual(roundingStep / 2 + 1e-6);
      expect(roundingStep).toBeLessThanOrEqual(Math.max(1, (below + above) / 20 + 1e-6));
    }),
  );
});
