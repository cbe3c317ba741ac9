/** Errors of sales priced without themselves, against 45-digit values: tests/reference/README.md (houseprices, diamonds600). */
import { expect, test } from "vitest";
import { contextOf } from "../../../src/hedonic/diagnoseFit.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { publishedDesign } from "../../fixtures/plainDesign.ts";
import { referenceSales } from "../../fixtures/referenceSales.ts";

test.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("the %s have the published leave-one-out errors and R²", (name, tolerance) => {
  const { expected, response } = referenceSales(name);
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const { fittedWithout } = contextOf(fit).rows();
  const n = design.n;
  const sum = (value: (i: number) => number) => response.reduce((total, _, i) => total + value(i), 0);
  const error = (i: number) => response[i]! - fittedWithout[i]!;
  const mean = sum((i) => response[i]!) / n;
  const press = sum((i) => error(i) ** 2);
  const spread = sum((i) => (response[i]! - mean) ** 2);
  const near = (found: number, wanted: number) => expect(Math.abs(found / wanted - 1)).toBeLessThan(tolerance);
  const { PRESS, looRMSE, looMAE, looR2_sstFullMean, looR2_sstLooMean } = expected.crossValidation;
  near(press, PRESS);
  near(Math.sqrt(press / n), looRMSE);
  near(sum((i) => Math.abs(error(i))) / n, looMAE);
  near(1 - press / spread, looR2_sstFullMean);
  // About the mean of the others a sale lies n/(n − 1) times as far as about the mean of all.
  near(1 - press / (spread * (n / (n - 1)) ** 2), looR2_sstLooMean);
});
