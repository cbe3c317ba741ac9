/** What the distribution-free ranges promise, kept on drawn sales whose distances are far from normal. */
import { expect, test } from "vitest";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { seededRandom } from "../../../src/numerics/seededRandom.ts";
import { RANGE_RULES } from "../../../src/valuation/ranges/index.ts";
import { plainDesign } from "../../fixtures/plainDesign.ts";

test.each(["jackknife+", "cv+"] as const)("%s asked for 8 in 10 holds the next sale about so often", (kind) => {
  const draw = seededRandom(31);
  const random = () => draw(2 ** 32) / 2 ** 32;
  const draws = 400;
  let held = 0;
  for (let turn = 0; turn < draws; turn++) {
    // Distances skewed and with a long tail: −ln of a uniform number, to the power 1.5.
    const sale = () => {
      const x = 10 * random();
      return { x, y: 50 + 3 * x + 4 * (-Math.log(1 - random())) ** 1.5 };
    };
    const sales = Array.from({ length: 40 }, sale);
    const size = Float64Array.from(sales, ({ x }) => x);
    const design = plainDesign(
      [{ key: "size", values: size, kind: "line" }],
      Float64Array.from(sales, ({ y }) => y),
    );
    const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
    const next = sale();
    const { low, high } = RANGE_RULES[kind](fit, { x: Float64Array.of(next.x), notKnown: [] }, [0.8]).ranges[0]!;
    if (next.y >= low && next.y <= high) held++;
  }
  expect(held / draws).toBeGreaterThan(0.75);
  expect(held / draws).toBeLessThan(0.88);
});
