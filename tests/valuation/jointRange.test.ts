/** Items together, against the covariance written out by hand and against drawn prices. */
import { expect, test } from "vitest";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { seededRandom } from "../../src/numerics/seededRandom.ts";
import { estimatePrice } from "../../src/valuation/estimatePrice.ts";
import { jointRange } from "../../src/valuation/jointRange.ts";
import { plainDesign, publishedDesign } from "../fixtures/plainDesign.ts";

const plain = { weights: null, penalty: null };
const item = (...x: number[]) => ({ x: Float64Array.from(x), notKnown: [] });

test("the average and sum of items have the error of the written-out covariance", () => {
  // Straight line over 1 … 5: x̄ = 3, C = 10; y = 2x + (1, −2, 2, −2, 1)·0.5: Σe² = 3.5, s² = 3.5/3, e at right angles to x.
  const x = Float64Array.of(1, 2, 3, 4, 5);
  const y = Float64Array.of(2.5, 3, 7, 7, 10.5);
  const design = plainDesign([{ key: "size", values: x, kind: "line" }], y);
  const fit = fitColumns(design, design.groups, plain);
  const [slope, s2] = [2, 3.5 / 3];
  const found = jointRange(fit, [item(2), item(7)], [0.95])!;
  // Covariance s²(I + 1/5 + d d′/10), d = (−1, 4); the sum's variance adds up all four entries.
  const d = [-1, 4];
  let variance = 0;
  for (const a of [0, 1]) for (const b of [0, 1]) variance += s2 * ((a === b ? 1 : 0) + 1 / 5 + (d[a]! * d[b]!) / 10);
  const t = 3.182446305284263; // t with 3 at 0.975
  expect(found.sum).toBeCloseTo(slope * 9, 11);
  expect(found.average).toBeCloseTo(slope * 4.5, 11);
  expect(found.rangesOfSum[0]!.high).toBeCloseTo(18 + t * Math.sqrt(variance), 10);
  expect(found.rangesOfAverage[0]!.low).toBeCloseTo(9 - (t * Math.sqrt(variance)) / 2, 10);
});

test("one item together with none has its own range, ln price or not", () => {
  for (const ln of [true, false]) {
    const published = publishedDesign("houseprices");
    const design = ln ? published : { ...published, responseForm: "price" as const };
    const fit = fitColumns(design, design.groups, plain);
    const row = item(...design.columns.map(({ values }) => (values as Float64Array)[5]!));
    const found = jointRange(fit, [row], [0.8, 0.95])!;
    const own = estimatePrice(fit, row, [0.8, 0.95], null).rangeForOneSale;
    found.rangesOfSum.forEach((range, at) => {
      expect(range.low / own[at]!.low).toBeCloseTo(1, 12);
      expect(range.high / own[at]!.high).toBeCloseTo(1, 12);
    });
    expect(found.rangesOfAverage[0]!.low / own[0]!.low).toBeCloseTo(1, 12);
  }
});

test("the range of a sum after ln holds about as many drawn sums as asked", () => {
  const design = publishedDesign("houseprices");
  const fit = fitColumns(design, design.groups, plain);
  const items = [5, 80, 200, 310, 420].map((i) =>
    item(...design.columns.map(({ values }) => (values as Float64Array)[i]!)),
  );
  const { low, high } = jointRange(fit, items, [0.8])!.rangesOfSum[0]!;
  const draw = seededRandom(7);
  const random = () => draw(2 ** 32) / 2 ** 32;
  const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const prices = items.map((row) => estimatePrice(fit, row, [], null).fitted);
  const s = fit.solution.residualStandardError!;
  let held = 0;
  const draws = 20_000;
  for (let draw = 0; draw < draws; draw++) {
    const sum = prices.reduce((total, fitted) => total + Math.exp(fitted + s * normal()), 0);
    if (sum >= low && sum <= high) held++;
  }
  // The coefficients' own error is not drawn, so a little more than asked is held.
  expect(held / draws).toBeGreaterThan(0.79);
  expect(held / draws).toBeLessThan(0.84);
});

test("under weights there is nothing", () => {
  const sizes = Float64Array.of(1, 2, 3, 4);
  const design = plainDesign([{ key: "size", values: sizes, kind: "line" }], Float64Array.of(2, 5, 7, 20), {
    ln: true,
  });
  const weighted = fitColumns(design, design.groups, { weights: new Float64Array(4).fill(1), penalty: null });
  expect(jointRange(weighted, [item(2)], [0.8])).toBeNull();
});
