/** Ranges for one sale against 45-digit values of five subjects: tests/reference/README.md (houseprices, diamonds600). */
import { describe, expect, test } from "vitest";
import type { SaleRanges } from "../../../src/domain/saleRange.ts";
import { estimate } from "../../../src/hedonic/estimators/index.ts";
import type { Fit, SubjectRow } from "../../../src/hedonic/fit.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { RANGE_RULES } from "../../../src/valuation/ranges/index.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { referenceChecks } from "../../fixtures/referenceChecks.ts";
import { referenceSales } from "../../fixtures/referenceSales.ts";

const LEVELS = [0.8, 0.9, 0.95];
const plain = { weights: null, penalty: null };

function fitOf(name: "houseprices" | "diamonds600"): Fit {
  const design = publishedDesign(name);
  return fitColumns(design, design.groups, plain);
}

function expectRanges({ ranges }: SaleRanges, wanted: (level: number) => readonly number[], tolerance: number): void {
  expect(ranges.map(({ level }) => level)).toEqual(LEVELS);
  for (const { level, low, high } of ranges) {
    const [from, to] = wanted(level);
    expect(Math.abs(low / from! - 1)).toBeLessThan(tolerance);
    expect(Math.abs(high / to! - 1)).toBeLessThan(tolerance);
  }
}

describe.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("ranges of new %s", (name, tolerance) => {
  const { expected, names } = referenceSales(name);
  const fit = fitOf(name);
  const { intervals } = referenceChecks(name).conformal;
  const subjects: SubjectRow[] = expected.newRows.map((row: { designRow: Record<string, number> }) => ({
    x: Float64Array.from(names, (column) => row.designRow[column]!),
    notKnown: [],
  }));

  test.each([
    ["jackknife+", "jackknifePlus"],
    ["cv+", "cvPlus10"],
  ] as const)("by %s are the published ones", (kind, key) => {
    expect(subjects).toHaveLength(5);
    subjects.forEach((row, at) => {
      const found = RANGE_RULES[kind](fit, row, LEVELS);
      expectRanges(found, (level) => intervals[at][String(level * 100)][key].price, tolerance);
      expect(found.guarantee).toContain("at 90 % at least ");
    });
  });

  test("by t are the published ones", () => {
    subjects.forEach((row, at) => {
      const found = RANGE_RULES.exact(fit, row, LEVELS);
      expectRanges(found, (level) => expected.newRows[at][`pi${level * 100}`].price, tolerance);
    });
  });

  test("by CV+ come out alike when sales of one weight are fitted anew for every fold", () => {
    const held = RANGE_RULES["cv+"](fit, subjects[0]!, LEVELS);
    const weighted = { ...fit, rule: { weights: new Float64Array(fit.design.n).fill(1), penalty: null } };
    const anew = RANGE_RULES["cv+"](weighted, subjects[0]!, LEVELS, (kept) => ({ weights: kept, penalty: null }));
    expectRanges(
      anew,
      (level) => {
        const { low, high } = held.ranges.find((range) => range.level === level)!;
        return [low, high];
      },
      tolerance,
    );
  });
});

describe("weights and penalties", () => {
  const design = publishedDesign("houseprices");
  const n = design.n;
  const x = Float64Array.from(design.columns, ({ values }) => (values as Float64Array)[7]!);
  const row = { x, notKnown: [] };
  const recency = Float64Array.from({ length: n }, (_, i) => 0.5 ** ((i % 40) / 20));
  const penalty = Float64Array.from(design.columns, (_, j) => 1 + j);

  test("jackknife+ is what leaving sales out one by one gives, at the same weights and penalties", () => {
    const rule = { weights: recency, penalty };
    const fit = fitColumns(design, design.groups, rule);
    const found = RANGE_RULES["jackknife+"](fit, row, [0.8]);
    const lows: number[] = [];
    for (let i = 0; i < n; i++) {
      const { solution } = fitColumns(design, design.groups, { weights: recency.with(i, 0), penalty });
      const at = (values: ArrayLike<number>) =>
        solution.slopes.reduce((sum, b, j) => sum + b * values[j]!, solution.intercept!);
      const own = at(design.columns.map(({ values }) => (values as Float64Array)[i]!));
      lows.push(at(x) - Math.abs(design.response[i]! - own));
    }
    lows.sort((a, b) => a - b);
    expect(found.ranges[0]!.low).toBeCloseTo(Math.exp(lows[Math.floor(0.2 * (n + 1) + 1e-9) - 1]!), 6);
    expect(found.guarantee).toBeNull();
    expect(found.sentence).toContain("weights and penalties");
  });

  test("a robust fit keeps the promise by CV+ when each fold is fitted anew, and does not by held weights", () => {
    const huber = (kept: Float64Array) => estimate({ ...design, weights: kept }, design.groups, { kind: "huber" }).rule;
    const fit = fitColumns(design, design.groups, estimate(design, design.groups, { kind: "huber" }).rule);
    const anew = RANGE_RULES["cv+"](fit, row, LEVELS, huber);
    expect(anew.ranges).toHaveLength(3);
    expect(anew.guarantee).not.toBeNull();
    expect(RANGE_RULES["cv+"](fit, row, LEVELS).guarantee).toBeNull();
  });

  test("the variance range is not given for a weighted fit, and says so", () => {
    const weighted = fitColumns(design, design.groups, { weights: recency, penalty: null });
    const found = RANGE_RULES.variance(weighted, row, LEVELS);
    expect(found.ranges).toEqual([]);
    expect(found.sentence).toContain("equal weights");
  });
});

describe("a spread that grows with the price", () => {
  // e alternates with a size proportional to the price: v = price², so γ₁ = 2.
  const size = Float64Array.from({ length: 400 }, (_, i) => 10 + i);
  const grows = size.map((x, i) => 100 * x * (1 + (i % 2 === 0 ? 0.05 : -0.05)));
  const design = plainDesign([{ key: "size", values: size, kind: "line" }], grows);
  const fit = fitColumns(design, design.groups, plain);
  const width = (x: number) => {
    const { low, high } = RANGE_RULES.variance(fit, { x: Float64Array.of(x), notKnown: [] }, [0.9]).ranges[0]!;
    return high - low;
  };

  test("the variance range is twice as wide at twice the price, and the t range is not", () => {
    expect(width(300) / width(150)).toBeGreaterThan(1.95);
    expect(width(300) / width(150)).toBeLessThan(2.05);
    const found = RANGE_RULES.variance(fit, { x: Float64Array.of(150), notKnown: [] }, [0.9]);
    expect(found.sentence).toContain("so this range applies");
    const even = (x: number) => {
      const { low, high } = RANGE_RULES.exact(fit, { x: Float64Array.of(x), notKnown: [] }, [0.9]).ranges[0]!;
      return high - low;
    };
    expect(even(300) / even(150)).toBeLessThan(1.05);
  });

  test("an even spread is told as such", () => {
    const flat = size.map((x, i) => 100 * x + [300, -300, -300, 300][i % 4]!);
    const even = plainDesign([{ key: "size", values: size, kind: "line" }], flat);
    const found = RANGE_RULES.variance(
      fitColumns(even, even.groups, plain),
      { x: Float64Array.of(150), notKnown: [] },
      [0.9],
    );
    expect(found.sentence).toContain("may be chance");
  });
});

test("levels that need more sales than there are get no range, and a sale of full leverage forbids jackknife+", () => {
  const fit = fitOf("houseprices");
  const row = { x: fit.solution.means, notKnown: [] };
  expect(RANGE_RULES["jackknife+"](fit, row, [0.8, 0.9999]).ranges).toHaveLength(1);
  const lonely = RANGE_RULES["jackknife+"]({ ...fit, leverages: fit.leverages.with(3, 1) }, row, [0.8]);
  expect(lonely.ranges).toEqual([]);
  expect(lonely.sentence).toContain("only one of its kind");
});

test("where a fold leaves too little for the model, or the estimator, CV+ is not given and says so", () => {
  // Level 1 of the choice is sale 3 alone: without its fold nothing tells its effect.
  const size = Float64Array.from({ length: 40 }, (_, i) => (i * 7) % 23);
  const attributes = [
    { key: "size", values: size, kind: "line" as const },
    { key: "kind", values: [...size.keys()].map((i) => (i === 3 ? 1 : 0)), kind: "choice" as const },
  ];
  const design = plainDesign(
    attributes,
    size.map((x, i) => 100 + x + (i % 3)),
  );
  const fit = fitColumns(design, design.groups, plain);
  const row = { x: fit.solution.means, notKnown: [] };
  const refits = (kept: Float64Array) => estimate({ ...design, weights: kept }, design.groups, { kind: "huber" }).rule;
  const huber = fitColumns(design, design.groups, refits(new Float64Array(40).fill(1)));
  for (const found of [RANGE_RULES["cv+"](fit, row, LEVELS), RANGE_RULES["cv+"](huber, row, LEVELS, refits)]) {
    expect(found.ranges).toEqual([]);
    expect(found.sentence).toContain("cannot be fitted");
    expect(found.guarantee).toBeNull();
  }
});
