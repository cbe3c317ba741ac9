import { beforeAll, describe, expect, test } from "vitest";
import { formatMoney, roundOutward, roundTo } from "../../../src/domain/format.ts";
import { priceStep } from "../../../src/screens/charts/figures.ts";
import { holds, rulerAround } from "../../../src/screens/charts/ruler.ts";
import { PriceStrip } from "../../../src/screens/strip/PriceStrip.tsx";
import { keepRuler } from "../../../src/screens/strip/StripGauge.tsx";
import type { Workbench } from "../../../src/screens/workbench/workbench.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

let bench: Workbench;
beforeAll(async () => {
  bench = await demoBench();
});

describe("the price strip", () => {
  test("says the item, its price rounded to the step of its range, and how many sales count", () => {
    const words = wordsOf(draw(bench, <PriceStrip />));
    const { price } = bench.appraisal!.priced!;
    expect(words).toContain(bench.subject!.title);
    expect(words).toContain(formatMoney(roundTo(price.amount, priceStep(price)), "EUR"));
    expect(words).toContain(`${bench.appraisal!.evidence.used} of ${bench.appraisal!.evidence.read} sales`);
    expect(words).toContain("No edition yet");
    expect(words).toMatch(/built \d{4} · 4,200\u00a0h · at /);
  });

  test("names the range for one sale, rounded outward, to a screen reader", () => {
    const { price } = bench.appraisal!.priced!;
    const wide = price.rangeForOneSale.find((range) => range.level === 0.9)!;
    const { low, high } = roundOutward(wide, priceStep(price));
    expect(low).toBeLessThanOrEqual(wide.low);
    expect(high).toBeGreaterThanOrEqual(wide.high);
    expect(draw(bench, <PriceStrip />)).toContain(
      `9 in 10 from ${formatMoney(low, "EUR")} to ${formatMoney(high, "EUR")}`,
    );
  });

  test("shows a move as an arrow and as words, from the former price", () => {
    const { price } = bench.appraisal!.priced!;
    const from = price.amount - 4 * priceStep(price);
    const moved = {
      ...bench,
      move: { from, to: price.amount, fromRanges: price.rangeForOneSale, fromTypicalError: 0.1 },
    };
    const words = wordsOf(draw(moved, <PriceStrip />));
    expect(words).toContain("▲");
    expect(words).toContain("up by");
    expect(words).toContain(`from ${formatMoney(roundTo(from, priceStep(price)), "EUR")}`);
  });

  test("shows a glanced price as being refined, never as saved, and the refined one without a word of it", () => {
    const { price } = bench.appraisal!.priced!;
    const amount = 2 * price.amount;
    const glanced = {
      price: { amount, rangeForOneSale: price.rangeForOneSale.map((one) => ({ ...one, high: 3 * one.high })) },
      coefficients: [],
      isFinal: false,
    } as const;
    const step = priceStep({ ...price, ...glanced.price });
    const words = wordsOf(draw({ ...bench, glanced, status: "refitting" }, <PriceStrip />));
    expect(words).toContain(formatMoney(roundTo(amount, step), "EUR"));
    expect(words).not.toContain(formatMoney(roundTo(price.amount, priceStep(price)), "EUR"));
    expect(words).toContain("being refined");
    expect(words).toContain("Being refined");
    expect(words).not.toMatch(/saved|Edition/);
    expect(wordsOf(draw(bench, <PriceStrip />))).not.toMatch(/refined|≈/);
  });

  test("says why there is no price in place of the price", () => {
    const error = {
      family: "fit",
      code: "too-few-sales",
      what: "Too few sales.",
      where: null,
      whatToDo: "Bring in more.",
    } as const;
    const words = wordsOf(draw({ ...bench, appraisal: null, error, status: "notPriced" }, <PriceStrip />));
    expect(words).toContain("Too few sales. Bring in more.");
    expect(words).toContain("Not priced");
    expect(words).not.toContain("€");
  });
});

describe("the strip's ruler", () => {
  const now = { level: 0.9, low: 30_000, high: 44_000 };
  test("stays as it is while a move is shown on it", () => {
    const kept = rulerAround([now], 0.3);
    expect(keepRuler(kept, [now, { ...now, low: 31_000, high: 46_000 }], true)).toBe(kept);
  });
  test("makes room when a move would leave it", () => {
    const kept = rulerAround([now], 0.3);
    const far = { ...now, low: 60_000, high: 90_000 };
    expect(holds(keepRuler(kept, [now, far], true), [now, far])).toBe(true);
  });
  test("is redrawn when an unmoved range would be a speck on it", () => {
    const kept = { low: 0, high: 1_000_000 };
    expect(keepRuler(kept, [now], false)).not.toBe(kept);
  });
});
