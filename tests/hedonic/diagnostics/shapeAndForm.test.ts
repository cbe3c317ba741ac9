/** Tails and bends against values worked out apart: tests/reference/README.md (diagnostics). */
import { expect, test } from "vitest";
import { contextOf, diagnoseFit } from "../../../src/hedonic/diagnoseFit.ts";
import { bends } from "../../../src/hedonic/diagnostics/bends.ts";
import { andersonDarling, andersonDarlingTail } from "../../../src/hedonic/diagnostics/tails.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { readReference } from "../../fixtures/publishedSales.ts";

const plain = { weights: null, penalty: null };

test.each(["houseprices", "diamonds600"] as const)("the residuals of %s have the stated tails", (name) => {
  const design = publishedDesign(name);
  const { solution } = fitColumns(design, design.groups, plain);
  const { stat } = readReference("diagnostics/expected.json")[name].andersonDarling;
  expect(Math.abs(andersonDarling(solution.residuals) / stat - 1)).toBeLessThan(1e-8);
});

test("the percentage points of D'Agostino & Stephens 1986 are met (from memory: 0.631, 0.752 and 1.035 at 10, 5 and 1 %)", () => {
  expect(andersonDarlingTail(0.631)).toBeCloseTo(0.1, 2);
  expect(andersonDarlingTail(0.752)).toBeCloseTo(0.05, 3);
  expect(andersonDarlingTail(1.035)).toBeCloseTo(0.01, 3);
});

test("p of the tails falls all the way, without a jump where one formula takes over from the next", () => {
  for (let a = 0.02; a < 200; a *= 1.01) {
    const [p, next] = [andersonDarlingTail(a), andersonDarlingTail(a * 1.01)];
    expect(next).toBeLessThanOrEqual(p + 2e-3);
    expect(p).toBeGreaterThan(0);
    expect(p).toBeLessThanOrEqual(1);
  }
});

test.each(["houseprices", "diamonds600"] as const)("the squares of the numbers of %s have the stated t", (name) => {
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, plain);
  const wanted: Record<string, number> = readReference("diagnostics/expected.json")[name].quadraticT;
  const found = bends.run(fit, contextOf(fit));
  if (typeof found === "string") throw new Error(found);
  const label = (key: string) => key.charAt(0).toUpperCase() + key.slice(1);
  expect(found.details).toHaveLength(Object.keys(wanted).length);
  for (const [key, t] of Object.entries(wanted)) {
    const { value } = found.details!.find((detail) => detail.label === label(key))!;
    expect(Math.abs(value / t - 1)).toBeLessThan(1e-7);
  }
});

test("the attribute that bends is named, and the straight ones are not", () => {
  const n = 200;
  const age = Float64Array.from({ length: n }, (_, i) => i % 40);
  const size = Float64Array.from({ length: n }, (_, i) => (i * 17) % 31);
  const prices = age.map((x, i) => 1000 - 5 * x + 0.4 * x * x + 3 * size[i]! + ((i * 13) % 11));
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "age", values: age, kind: "line" },
    ],
    prices,
  );
  const { found } = diagnoseFit(fitColumns(design, design.groups, plain));
  const bend = found.find(({ code }) => code === "bends")!;
  expect(bend.verdict).toBe("trouble");
  expect(bend.attributes).toEqual(["age"]);
  expect(bend.sentence).toContain("Age bends: prices lie higher at both ends");
});
