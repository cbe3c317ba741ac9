/** The MM estimate against values on which five independent searches agree to 12 digits (tests/reference/README.md). */
import { describe, expect, test } from "vitest";
import { BREAKDOWN_C, bisquareLoss, mScale } from "../../src/numerics/bisquare.ts";
import { mmEstimate } from "../../src/numerics/mmEstimate.ts";
import { sEstimate } from "../../src/numerics/sEstimate.ts";
import { frameOf, rawCoefficients, residualsAt } from "../../src/numerics/weightedSteps.ts";
import { publishedSales, readReference, worstDifference } from "../fixtures/publishedSales.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

describe("on houseprices", () => {
  const { columns, lnPrice, names } = publishedSales("houseprices");
  const { mm } = readReference("houseprices/robust.json").robust;
  const found = mmEstimate(columns, lnPrice);
  const frame = frameOf(columns, lnPrice.length, null);

  test("S scale, S coefficients and MM coefficients are the reference's", () => {
    expect(Math.abs(found.scale / mm.sScale - 1)).toBeLessThan(1e-12);
    expect(worstDifference(rawCoefficients(frame, found.sCoefficients), names, mm.sCoefficients)).toBeLessThan(1e-9);
    expect(worstDifference(rawCoefficients(frame, found.coefficients), names, mm.coefficients)).toBeLessThan(1e-10);
    expect(found.isReproduced && found.hasSettled).toBe(true);
  });

  test("the S scale solves its equation", () => {
    const residuals = residualsAt(frame, lnPrice, found.sCoefficients);
    const loss = residuals.reduce((sum, e) => sum + bisquareLoss(e / found.scale, BREAKDOWN_C), 0);
    expect(loss / residuals.length).toBeCloseTo(mm.meanRhoAtSolution, 11);
  });

  test("the same sales give the same bits", () => {
    expect(mmEstimate(columns, lnPrice).weights).toEqual(found.weights);
  });
});

test("on diamonds600, whose rare levels make plain subsets singular, other seeds end at the same scale", () => {
  const { columns, lnPrice } = publishedSales("diamonds600");
  const frame = frameOf(columns, lnPrice.length, null);
  const scales = [1, 2].map((seed) => sEstimate(frame, lnPrice, null, seed)!.scale);
  expect(Math.abs(scales[0]! / scales[1]! - 1)).toBeLessThan(1e-10);
});

test("four sales in ten that are wrong together do not move the line", () => {
  const draw = drawFrom(11);
  const x = Float64Array.from({ length: 100 }, () => 10 * draw());
  const y = x.map((v, i) => (i < 40 ? 100 - 3 * v : 5 + 2 * v) + draw() - 0.5);
  const found = mmEstimate([x], y);
  const { slopes } = rawCoefficients(frameOf([x], 100, null), found.coefficients);
  expect(slopes[0]).toBeGreaterThan(1.9);
  expect(slopes[0]).toBeLessThan(2.1);
  expect(found.robustness.slice(0, 40).every((w) => w === 0)).toBe(true);
});

test("above the search size the best of a part is carried on over all rows", () => {
  const draw = drawFrom(5);
  const n = 5000;
  const x = Float64Array.from({ length: n }, () => draw());
  const rare = Float64Array.from({ length: n }, (_, i) => (i < 3 ? 1 : 0));
  const y = x.map((v, i) => 1 + v + 2 * rare[i]! + (i % 5 === 4 ? 30 : 0) + draw() - 0.5);
  const found = mmEstimate([x, rare], y);
  expect(found.isReproduced).toBe(true);
  const { slopes } = rawCoefficients(frameOf([x, rare], n, null), found.coefficients);
  expect(Math.abs(slopes[0]! - 1)).toBeLessThan(0.1);
});

test("exact fits have scale zero; too few rows and dependent columns are refused", () => {
  const x = Float64Array.from([1, 2, 3, 4, 5, 6, 7, 8]);
  expect(
    mmEstimate(
      [x],
      x.map((v) => 3 - v),
    ),
  ).toMatchObject({ scale: 0, hasSettled: true });
  const mostly = mmEstimate([x], Float64Array.from([5, 7, 9, 11, 13, 15, 40, -8]));
  expect([...mostly.weights]).toEqual([1, 1, 1, 1, 1, 1, 0, 0]);
  expect(() => mmEstimate([x.slice(0, 4)], x.slice(0, 4))).toThrow(expect.objectContaining({ code: "tooFewRows" }));
  const y = x.map((v) => v * v);
  expect(() => mmEstimate([x, x.map((v) => 2 * v)], y)).toThrow(expect.objectContaining({ code: "rankDeficient" }));
});

test("the M scale is found from any start, and is zero when half of the residuals are", () => {
  const e = Float64Array.from([0.1, -0.4, 0.3, 1.2, -2, 0.7, -0.05, 8]);
  const scales = [1e-6, 0.5, 1, 1e6].map((start) => mScale(e, null, 2, start));
  for (const scale of scales) expect(scale).toBeCloseTo(scales[1]!, 13);
  expect(mScale(Float64Array.from([0, 0, 0, 0, 0, 1]), null, 2, 1)).toBe(0);
});
