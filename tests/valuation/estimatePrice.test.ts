/** Prices and exact ranges of five new subjects against 45-digit values: tests/reference/README.md (houseprices, diamonds600). */
import { expect, test } from "vitest";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { estimatePrice } from "../../src/valuation/estimatePrice.ts";
import { publishedDesign } from "../fixtures/plainDesign.ts";
import { referenceChecks } from "../fixtures/referenceChecks.ts";
import { referenceSales } from "../fixtures/referenceSales.ts";

test.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("new %s have the published price, smeared mean and ranges", (name, tolerance) => {
  const { expected, names } = referenceSales(name);
  const { duanSmearing } = referenceChecks(name).retransformation;
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const near = (found: number, wanted: number) => expect(Math.abs(found / wanted - 1)).toBeLessThan(tolerance);
  for (const row of expected.newRows) {
    const x = Float64Array.from(names, (column) => row.designRow[column]);
    const found = estimatePrice(fit, { x, notKnown: [] }, [0.8, 0.9, 0.95], null);
    near(found.amount, row.priceNaive);
    near(found.meanAmount, row.priceDuan);
    near(found.meanAmount / found.amount, duanSmearing);
    near(found.leverage, row.leverage);
    for (const range of found.rangeForOneSale) {
      const wanted = row[`pi${Math.round(range.level * 100)}`].price;
      near(range.low, wanted[0]);
      near(range.high, wanted[1]);
    }
  }
});
