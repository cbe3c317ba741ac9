/** Huber and MM as weights: least squares at them gives the published coefficients (tests/reference/README.md). */
import { describe, expect, test } from "vitest";
import { estimate } from "../../../src/hedonic/estimators/index.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { readReference, worstDifference } from "../../fixtures/publishedSales.ts";
import { drawFrom } from "../../fixtures/randomClass.ts";

const houses = publishedDesign("houseprices");
const stones = publishedDesign("diamonds600");

test.each([
  { design: houses, kind: "huber" as const, wanted: readReference("houseprices/robust.json").robust.huberM },
  { design: houses, kind: "mm" as const, wanted: readReference("houseprices/robust.json").robust.mm },
  { design: stones, kind: "huber" as const, wanted: readReference("diamonds600/expected.json").robust.huberM },
])("$kind: least squares at its weights gives the reference's coefficients", ({ design, kind, wanted }) => {
  const { rule, exactRange } = estimate(design, design.groups, { kind });
  const { solution } = fitColumns(design, design.groups, rule);
  expect(worstDifference(solution, design.names, wanted.coefficients)).toBeLessThan(1e-10);
  expect(exactRange).toBe(false);
});

test("the sentences say who counts less, and by what distance", () => {
  const huber = estimate(houses, houses.groups, { kind: "huber" });
  expect(huber.sentence).toContain("120 of 546 sales count less than in full");
  expect(huber.sentence).toContain("20.1\u00a0%");
  expect(huber.whichRange).toContain("jackknife+");
});

describe("guards", () => {
  const draw = drawFrom(8);
  const x = Float64Array.from({ length: 24 }, () => draw());
  const exact = plainDesign(
    [{ key: "size", values: x, kind: "line" }],
    x.map((v) => 100 + 10 * v),
  );

  test("prices that lie on the model exactly: scale zero, said in a sentence", () => {
    const huber = estimate(exact, exact.groups, { kind: "huber" });
    expect(huber.scale).toBe(0);
    expect(huber.sentence).toContain("least squares stands");
    expect(estimate(exact, exact.groups, { kind: "mm" }).sentence).toContain("lie on the model exactly");
  });

  test("one sale and too few sales are refused in a sentence", () => {
    const one = plainDesign([{ key: "size", values: [1], kind: "line" }], Float64Array.from([100]));
    expect(() => estimate(one, one.groups, { kind: "mm" })).toThrow(expect.objectContaining({ code: "not-settled" }));
    expect(() => estimate(one, one.groups, { kind: "huber" })).toThrow(expect.objectContaining({ family: "fit" }));
  });

  test("dependent columns are refused by name", () => {
    const twice = plainDesign(
      [
        { key: "size", values: x, kind: "line" },
        { key: "weight", values: x.map((v) => 2 * v), kind: "line" },
      ],
      x.map((v, i) => v + (i % 3)),
    );
    expect(() => estimate(twice, twice.groups, { kind: "huber" })).toThrow(/Weight/);
  });

  test("a level whose sales are all out of line is named", () => {
    const level = Array.from({ length: 24 }, (_, i) => (i < 2 ? 1 : 0));
    const prices = x.map((v, i) => 100 + 10 * v + (i === 0 ? 4000 : i === 1 ? -4000 : draw()));
    const odd = plainDesign(
      [
        { key: "size", values: x, kind: "line" },
        { key: "make", values: level, kind: "choice" },
      ],
      prices,
    );
    expect(estimate(odd, odd.groups, { kind: "huber" }).sentence).toContain("Make level 1");
  });

  test("MM refuses pooled levels", () => {
    const pooled = plainDesign([{ key: "make", values: [...x.keys()].map((i) => i % 4), kind: "pooled" }], x);
    expect(() => estimate(pooled, pooled.groups, { kind: "mm" })).toThrow(
      expect.objectContaining({ code: "robust-and-pooled" }),
    );
  });
});
