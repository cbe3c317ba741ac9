/** Distribution-free ranges of five subjects against 45-digit values: tests/reference/README.md (houseprices, diamonds600). */
import { expect, test } from "vitest";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { jackknifePlus } from "../../../src/valuation/ranges/jackknifePlus.ts";
import { publishedDesign } from "../../fixtures/plainDesign.ts";
import { referenceChecks } from "../../fixtures/referenceChecks.ts";
import { referenceSales } from "../../fixtures/referenceSales.ts";

test.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("the jackknife+ ranges of new %s are the published ones", (name, tolerance) => {
  const { expected, names } = referenceSales(name);
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  expect(expected.newRows).toHaveLength(5);
  expected.newRows.forEach((row: { designRow: Record<string, number> }, at: number) => {
    const x = Float64Array.from(names, (column) => row.designRow[column]!);
    const { ranges } = jackknifePlus(fit, x, [0.8, 0.9, 0.95, 0.9999]);
    expect(ranges.map(({ level }) => level)).toEqual([0.8, 0.9, 0.95]);
    for (const { level, low, high } of ranges) {
      const wanted = referenceChecks(name).conformal.intervals[at][String(level * 100)].jackknifePlus.price;
      expect(Math.abs(low / wanted[0] - 1)).toBeLessThan(tolerance);
      expect(Math.abs(high / wanted[1] - 1)).toBeLessThan(tolerance);
    }
  });
});

test("without equal weights, or with a sale of full leverage, no range is given and the reason is", () => {
  const design = publishedDesign("houseprices");
  const fit = fitColumns(design, design.groups, { weights: null, penalty: null });
  const x = new Float64Array(fit.columns.length);
  const weights = new Float64Array(design.n).fill(1);
  const weighted = jackknifePlus({ ...fit, rule: { weights, penalty: null } }, x, [0.8]);
  expect(weighted.ranges).toEqual([]);
  expect(weighted.sentence).toContain("equal weights");
  const lonely = jackknifePlus({ ...fit, leverages: fit.leverages.with(3, 1) }, x, [0.8]);
  expect(lonely.ranges).toEqual([]);
  expect(lonely.sentence).toContain("only one of its kind");
});
