/** Checks in the order sold against values worked out apart: tests/reference/README.md (diagnostics). */
import { describe, expect, test } from "vitest";
import { contextOf } from "../../../src/hedonic/diagnoseFit.ts";
import type { Diagnostic, Finding } from "../../../src/hedonic/diagnostics/diagnostic.ts";
import { drift, driftTail } from "../../../src/hedonic/diagnostics/drift.ts";
import { forecast } from "../../../src/hedonic/diagnostics/forecast.ts";
import { expectedOrder, order } from "../../../src/hedonic/diagnostics/order.ts";
import { recursiveResiduals } from "../../../src/hedonic/diagnostics/recursiveResiduals.ts";
import type { Fit } from "../../../src/hedonic/fit.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { readReference } from "../../fixtures/publishedSales.ts";

const plain = { weights: null, penalty: null };

function findingOf(diagnostic: Diagnostic, fit: Fit): Finding {
  const found = diagnostic.run(fit, contextOf(fit));
  if (typeof found === "string") throw new Error(found);
  return found;
}

function near(found: number, wanted: number, tolerance = 1e-8): void {
  expect(Math.abs(found / wanted - 1)).toBeLessThan(tolerance);
}

describe.each(["houseprices", "diamonds600"] as const)("the %s in the order of their file", (name) => {
  const wanted = readReference("diagnostics/expected.json")[name];
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, plain);

  test("have the Durbin–Watson statistic with its exact mean and variance, and a p near the exact one", () => {
    const { d, mean, variance, pExact } = wanted.durbinWatson;
    const found = findingOf(order, fit);
    near(found.statistic, d);
    near(expectedOrder(fit).mean, mean);
    near(expectedOrder(fit).variance, variance);
    near(found.p!, pExact, 1e-3);
  });

  test("have the forecast statistic of their last sixth", () => {
    const found = findingOf(forecast, fit);
    near(found.statistic, wanted.chowForecast.F);
    expect(found.df).toEqual(wanted.chowForecast.df);
    near(found.p!, wanted.chowForecast.p);
  });

  test("have the recursive residuals that refits give, with the squares of the ordinary ones in sum", () => {
    const w = recursiveResiduals(fit);
    expect(w).toHaveLength(design.n - fit.solution.rank);
    wanted.cusum.first.forEach((one: number, at: number) => {
      expect(w[at]).toBeCloseTo(one, 8);
    });
    near(
      w.reduce((sum, one) => sum + one * one, 0),
      fit.solution.residualSumOfSquares,
    );
    const found = findingOf(drift, fit);
    near(found.statistic, wanted.cusum.stat);
    near(found.p!, wanted.cusum.p);
  });
});

test("the lines of Brown, Durbin & Evans 1975 are met: 10, 5 and 1 % at 0.850, 0.948 and 1.143", () => {
  expect(driftTail(0.85)).toBeCloseTo(0.1, 3);
  expect(driftTail(0.948)).toBeCloseTo(0.05, 3);
  expect(driftTail(1.143)).toBeCloseTo(0.01, 3);
  expect(driftTail(0)).toBe(1);
});

/** Prices 100 + 2·size ± 1 over 60 days, and what `late` adds from day 40 on; the choice has a level that comes late. */
function sales(late: (day: number) => number): Fit {
  const n = 60;
  const size = Float64Array.from({ length: n }, (_, i) => (i * 37) % 50);
  const kinds = Array.from({ length: n }, (_, i) => (i > 52 && i % 2 === 0 ? 2 : i % 2));
  const prices = size.map((x, i) => 100 + 2 * x + (((i * 29) % 7) - 3) / 3 + (i >= 40 ? late(i) : 0));
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "kind", values: kinds, kind: "choice" },
    ],
    prices,
  );
  return fitColumns(design, design.groups, plain);
}

test("a level that only the latest sales have does not stop the checks in time", () => {
  const fit = sales(() => 0);
  expect(recursiveResiduals(fit)).toHaveLength(60 - 4);
  // Ten late sales, of which the late level takes one for its own effect.
  expect(findingOf(forecast, fit).df).toEqual([10 - 1, 50 - 3]);
  expect(findingOf(forecast, fit).verdict).toBe("fine");
  expect(findingOf(drift, fit).verdict).toBe("fine");
});

test("prices that leave the model late are found by all three, and the way they leave is said", () => {
  const fit = sales((day) => (day - 39) * 1.5);
  expect(findingOf(forecast, fit).verdict).toBe("trouble");
  expect(findingOf(drift, fit).verdict).toBe("trouble");
  expect(findingOf(drift, fit).sentence).toContain("come out higher");
  expect(findingOf(order, fit).verdict).toBe("trouble");
});

test("sales of one day have no latest ones, and that is said", () => {
  const fit = sales(() => 0);
  const design = { ...fit.design, soldOn: new Float64Array(60).fill(9) };
  expect(forecast.run({ ...fit, design }, contextOf(fit))).toContain("one day");
});
