/** Least squares, ridge and partial pooling as weights and penalties of a design. */
import { describe, expect, test } from "vitest";
import { EVERYTHING, type PriceModel } from "../../../src/domain/priceModel.ts";
import { estimate } from "../../../src/hedonic/estimators/index.ts";
import { standardUnits } from "../../../src/hedonic/estimators/ridge.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { resolveDependencies } from "../../../src/hedonic/resolveDependencies.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { drawFrom } from "../../fixtures/randomClass.ts";

const houses = publishedDesign("houseprices");

describe("least squares", () => {
  test("has no weights and no penalties, and an exact range", () => {
    expect(estimate(houses, houses.groups)).toMatchObject({
      rule: { weights: null, penalty: null },
      exactRange: true,
      sentence: "Least squares. Every sale counts alike.",
    });
  });

  test("has the recency weights of the design, and no exact range with them", () => {
    const weights = new Float64Array(houses.n).fill(0.5);
    const { rule, exactRange, whichRange } = estimate({ ...houses, weights }, houses.groups);
    expect(rule.weights).toBe(weights);
    expect(exactRange).toBe(false);
    expect(whichRange).toContain("preference");
  });
});

function makes() {
  const draw = drawFrom(17);
  const n = 120;
  const make = Array.from({ length: n }, (_, i) => (i === 0 ? 6 : Math.floor(5 * draw() * draw())));
  const size = Float64Array.from({ length: n }, () => 10 * draw());
  const prices = Float64Array.from(
    { length: n },
    (_, i) => 200 + 5 * size[i]! + 20 * Math.sin(3 * make[i]!) + 9 * draw(),
  );
  return { make, size, prices };
}

describe("ridge", () => {
  const { make, size, prices } = makes();
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "make", values: make, kind: "choice" },
    ],
    prices,
  );

  test("standardises all levels of a choice by one unit, and each number by its own", () => {
    const units = standardUnits(design, null);
    expect(new Set(units.slice(1)).size).toBe(1);
    const mean = size.reduce((sum, v) => sum + v, 0) / size.length;
    expect(units[0]).toBeCloseTo(Math.sqrt(size.reduce((sum, v) => sum + (v - mean) ** 2, 0) / size.length), 12);
  });

  test("a stated penalty draws slopes in, and penalties stand on every column of the design", () => {
    const { rule, extras, sentence } = estimate(design, design.groups.slice(0, 1), { kind: "ridge", penalty: 120 });
    expect(rule.penalty).toHaveLength(design.columns.length);
    const [ridged] = fitColumns(design, design.groups.slice(0, 1), rule).solution.slopes;
    const [plain] = fitColumns(design, design.groups.slice(0, 1)).solution.slopes;
    // One column: n/(n + λ) of the least-squares slope.
    expect(ridged! / plain!).toBeCloseTo(0.5, 10);
    expect(extras.ridge).toMatchObject({ penalty: 120, isChosen: false, effectiveCount: 1.5 });
    expect(sentence).toContain("worth 120 sales, as stated");
  });

  test("the chosen penalty has a curve and is as good as its points; a bad one is refused", () => {
    const { extras } = estimate(design, design.groups, { kind: "ridge", penalty: null });
    const { curve, looError, isChosen } = extras.ridge!;
    expect(isChosen).toBe(true);
    expect(Math.min(...curve.map((point) => point.looError))).toBeGreaterThanOrEqual(looError);
    expect(() => estimate(design, design.groups, { kind: "ridge", penalty: -1 })).toThrow(
      expect.objectContaining({ code: "penalty" }),
    );
  });
});

describe("partial pooling", () => {
  const { make, size, prices } = makes();
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "make", values: make, kind: "pooled" },
    ],
    prices,
  );
  const { rule, extras, sentence } = estimate(design, design.groups);
  const [choice] = extras.pooled;

  test("least squares with its penalties has the effects told, which add up to zero", () => {
    const { solution } = fitColumns(design, design.groups, rule);
    for (const [at, { after }] of choice!.levels.entries()) expect(solution.slopes[at + 1]! / after).toBeCloseTo(1, 9);
    expect(choice!.levels.reduce((sum, { after }) => sum + after, 0)).toBeCloseTo(0, 8);
  });

  test("levels with fewer sales keep less of their difference; a lone one is told by its count", () => {
    const lone = choice!.levels.find(({ level }) => level === "level 6")!;
    expect(lone.sales).toBe(1);
    const most = choice!.levels.reduce((a, b) => (b.sales > a.sales ? b : a));
    expect(Math.abs(most.after / most.before!)).toBeGreaterThan(Math.abs(lone.after / lone.before!));
    expect(sentence).toContain("Make: 6 levels are drawn towards their mean: one with 1 sale keeps about");
  });

  test("a pooled choice that is left out keeps its penalty for the other attribute sets", () => {
    const short = estimate(design, design.groups.slice(0, 1));
    expect(short.rule.penalty!.slice(1)).toEqual(rule.penalty!.slice(1));
    expect(short.extras.pooled).toEqual([]);
  });

  test("levels that add up to one are no dependency to resolve", () => {
    const model: PriceModel = { response: "price", attributes: [], leftOut: [], market: "none", filter: EVERYTHING };
    const { referenceGroups, notices } = resolveDependencies(design, model);
    expect(referenceGroups.map(({ columns }) => columns)).toEqual(design.groups.map(({ columns }) => columns));
    expect(notices).toEqual([]);
  });

  test("goes with Huber and with ridge", () => {
    expect(estimate(design, design.groups, { kind: "huber" }).rule.penalty).toEqual(rule.penalty);
    const both = estimate(design, design.groups, { kind: "ridge", penalty: 1 }).rule.penalty!;
    expect(both.every((penalty, at) => penalty > rule.penalty![at]!)).toBe(true);
  });
});
