/** Items together, against the covariance written out by hand. */
import { expect, test } from "vitest";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { jointRange } from "../../src/valuation/jointRange.ts";
import { plainDesign } from "../fixtures/plainDesign.ts";

test("the average and sum of items have the error of the written-out covariance", () => {
  // Straight line over 1 … 5: x̄ = 3, C = 10; y = 2x + (1, −2, 2, −2, 1)·0.5: Σe² = 3.5, s² = 3.5/3, e at right angles to x.
  const x = Float64Array.of(1, 2, 3, 4, 5);
  const y = Float64Array.of(2.5, 3, 7, 7, 10.5);
  const design = plainDesign([{ key: "size", values: x, kind: "line" }], y);
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const [slope, s2] = [2, 3.5 / 3];
  const found = jointRange(fit, [Float64Array.of(2), Float64Array.of(7)], [0.95])!;
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

test("of a model of ln price there is no sum, and under weights nothing", () => {
  const design = plainDesign(
    [{ key: "size", values: Float64Array.of(1, 2, 3, 4), kind: "line" }],
    Float64Array.of(2, 5, 7, 20),
    { ln: true },
  );
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const items = [Float64Array.of(2)];
  expect(jointRange(fit, items, [0.8])!.sum).toBeNull();
  expect(
    jointRange({ ...fit, rule: { weights: new Float64Array(4).fill(1), penalty: null } }, items, [0.8]),
  ).toBeNull();
});
