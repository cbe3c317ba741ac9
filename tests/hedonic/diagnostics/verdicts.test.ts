/** What is made of a p: chance, and whether the finding is large enough to matter. */
import { expect, test } from "vitest";
import { diagnoseFit } from "../../../src/hedonic/diagnoseFit.ts";
import { verdictOf } from "../../../src/hedonic/diagnostics/diagnostic.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { seededRandom } from "../../../src/numerics/seededRandom.ts";
import { plainDesign } from "../../fixtures/plainDesign.ts";

test("what chance explains is fine, what it hardly explains trouble, and what is real but small a look", () => {
  expect(verdictOf(0.05)).toBe("fine");
  expect(verdictOf(0.049)).toBe("look");
  expect(verdictOf(0.009)).toBe("trouble");
  expect(verdictOf(0.009, true)).toBe("look");
  expect(verdictOf(0.2, true)).toBe("fine");
});

test("in fifty thousand sales a slight bend is found for certain and yet no trouble", () => {
  const n = 50_000;
  const draw = seededRandom(5);
  const random = () => draw(2 ** 32) / 2 ** 32;
  const size = Float64Array.from({ length: n }, random);
  const prices = size.map((x) => 10 + x + 0.3 * x * x + random() - 0.5 + random() - 0.5);
  const design = plainDesign([{ key: "size", values: size, kind: "line" }], prices);
  const { found } = diagnoseFit(fitColumns(design, design.groups, { weights: null, penalty: null }));
  const bend = found.find(({ code }) => code === "bends")!;
  expect(bend.p).toBeLessThan(0.001);
  expect(bend.verdict).toBe("look");
});
