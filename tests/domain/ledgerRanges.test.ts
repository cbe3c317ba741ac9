/** Ranges of ledger parts: no finer than their error bears, and the same in words as in numbers. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { LedgerRow } from "../../src/domain/appraisal.ts";
import { amountWords, errorStep, partRanges, rowRangeWords } from "../../src/domain/ledgerRanges.ts";

const ROW: LedgerRow = {
  attribute: "hours",
  label: "Hours",
  level: null,
  stepWords: "1,000 h",
  coefficient: -2140,
  ownPart: -712,
  carriedParts: [{ from: "age", fromLabel: "Age", amount: -1428 }],
  money: { coefficient: -2140, own: -712, carried: [{ from: "age", amount: -1428 }] },
  moneyRange95: null,
  errors: {
    own: 80,
    carried: [{ from: "age", amount: 105 }],
    moneyOwn: 80,
    moneyCarried: [{ from: "age", amount: 105 }],
    t95: 2,
  },
  signTurned: false,
  sentence: "",
};

const money = fc.double({ min: -100_000, max: 100_000, noNaN: true });
const half = fc.double({ min: 0.5, max: 50_000, noNaN: true });

/** "−1,430" → −1430 */
function read(text: string): number {
  return Number(text.replace("−", "-").replaceAll(",", ""));
}

describe("ranges of ledger parts", () => {
  test("are part ± t·error, own part first", () => {
    expect(partRanges(ROW).map(({ from, halfRange }) => [from, halfRange])).toEqual([
      [null, 160],
      ["age", 210],
    ]);
    expect(rowRangeWords(ROW)).toBe("own part −710\u00a0±\u00a0160; carried for age −1,430\u00a0±\u00a0210");
  });

  test("are not told where the errors are not known", () => {
    expect(rowRangeWords({ ...ROW, errors: null })).toBeNull();
    expect(amountWords(-712, null)).toBe("−712");
  });

  test("are printed no finer than a hundredth of half the range and never narrower than they are", () => {
    fc.assert(
      fc.property(money, half, (amount, halfRange) => {
        const [shown, range] = amountWords(amount, halfRange).split("\u00a0±\u00a0").map(read) as [number, number];
        const step = Math.max(1, errorStep(halfRange));
        expect(Math.abs(shown / step - Math.round(shown / step))).toBeLessThan(1e-6);
        expect(Math.abs(shown - amount)).toBeLessThanOrEqual(step / 2 + 1e-6);
        expect(range).toBeGreaterThanOrEqual(halfRange - 1e-4);
        expect(range - halfRange).toBeLessThanOrEqual(step + 1e-6);
        expect(errorStep(halfRange)).toBeGreaterThanOrEqual(halfRange / 100 - 1e-9);
      }),
      { seed: 29, numRuns: 500 },
    );
  });
});
