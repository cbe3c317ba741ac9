/** Price or its logarithm: advice by the power profile, and left-out errors in money against fits without each sale. */
import { expect, test } from "vitest";
import { compareResponses } from "../../src/hedonic/compareResponses.ts";
import { advisePower } from "../../src/hedonic/powerProfile.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { plainDesign, publishedDesign } from "../fixtures/plainDesign.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

function drawn(isLn: boolean, n = 80) {
  const draw = drawFrom(6);
  const size = Float64Array.from({ length: n }, () => 4 * draw());
  const prices = size.map((v) => {
    const noise = draw() + draw() + draw() - 1.5;
    return isLn ? Math.exp(3 + 0.8 * v + 0.2 * noise) : 300 + 100 * v + 20 * noise;
  });
  return plainDesign([{ key: "size", values: size, kind: "line" }], prices);
}

test("left-out errors are those of fits without each sale", () => {
  const design = drawn(true, 30);
  const size = design.columns[0]!.values as Float64Array;
  const { lnPrice, price } = compareResponses(design, design.groups);
  const missedBy = (isLn: boolean) =>
    design.prices.map((sold, out) => {
      const kept = [...size.keys()].filter((i) => i !== out);
      const y = Float64Array.from(kept, (i) => (isLn ? Math.log(design.prices[i]!) : design.prices[i]!));
      const { intercept, slopes } = solveLeastSquares([Float64Array.from(kept, (i) => size[i]!)], y, {
        intercept: true,
      });
      const predicted = intercept! + slopes[0]! * size[out]!;
      return Math.abs(sold - (isLn ? Math.exp(predicted) : predicted));
    });
  const median = (values: Float64Array) => {
    const sorted = values.slice().sort();
    return (sorted[14]! + sorted[15]!) / 2;
  };
  expect(lnPrice.medianAbsolute / median(missedBy(true))).toBeCloseTo(1, 10);
  expect(price.medianAbsolute / median(missedBy(false))).toBeCloseTo(1, 10);
  const square = missedBy(false).reduce((sum, e) => sum + e * e, 0) / 30;
  expect(price.rootMeanSquare / Math.sqrt(square)).toBeCloseTo(1, 10);
});

test("each form wins on sales made by it, in money and by the profile", () => {
  for (const isLn of [true, false]) {
    const design = drawn(isLn);
    const form = isLn ? "lnPrice" : "price";
    expect(compareResponses(design, design.groups).better).toBe(form);
    const { advised, sentence } = advisePower(design, design.groups);
    expect(advised).toBe(form);
    expect(sentence).toContain(isLn ? "logarithm (0) is within" : "price itself (1) is within");
  }
});

test("on the published houses the logarithm misses less, whichever form the design has", () => {
  const design = publishedDesign("houseprices");
  const comparison = compareResponses(design, design.groups);
  expect(comparison.lnPrice.medianAbsolute).toBeLessThan(comparison.price.medianAbsolute);
  expect(comparison.sentence).toContain("smearing");
  expect(compareResponses({ ...design, response: design.prices, responseForm: "price" }, design.groups)).toEqual(
    comparison,
  );
});

test("a sale alone of its kind is skipped and counted; too few sales are refused", () => {
  const design = drawn(false, 20);
  const size = design.columns[0]!.values as Float64Array;
  const make = [1, ...new Array(19).fill(0)];
  const lone = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "make", values: make, kind: "choice" },
    ],
    design.prices,
  );
  const { skipped, sentence } = compareResponses(lone, lone.groups);
  expect(skipped).toBe(1);
  expect(sentence).toContain("only one of its kind");
  const two = plainDesign([{ key: "size", values: [1, 2], kind: "line" }], Float64Array.from([5, 6]));
  expect(() => compareResponses(two, two.groups)).toThrow(expect.objectContaining({ code: "too-few-sales" }));
  expect(() => advisePower(two, two.groups)).toThrow(expect.objectContaining({ code: "too-few-sales" }));
});
