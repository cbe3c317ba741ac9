/** Condition indices against values worked out with 45 and 60 digits: tests/reference/README.md (longley, houseprices, diamonds600). */
import { expect, test } from "vitest";
import { type ConditionIndices, conditionIndices } from "../../src/numerics/conditionIndices.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { publishedSales, readReference } from "../fixtures/publishedSales.ts";

function indicesOf(columns: readonly Float64Array[], response: Float64Array): ConditionIndices {
  const solution = solveLeastSquares([...columns], response, { intercept: true });
  const squared = Float64Array.from(columns, (column, j) =>
    column.reduce((sum, x) => sum + (x - solution.means[j]!) ** 2, 0),
  );
  return conditionIndices(solution, squared);
}

interface Wanted {
  readonly singularValues: readonly (number | string)[];
  readonly conditionIndices: readonly (number | string)[];
  readonly varianceProportions: Readonly<Record<string, readonly (number | string)[]>>;
}

function expectIndices(found: ConditionIndices, wanted: Wanted, names: readonly string[], tolerance: number): void {
  const q = names.length;
  expect(found.indices).toHaveLength(q);
  for (let c = 0; c < q; c++) {
    expect(Math.abs(found.singularValues[c]! / Number(wanted.singularValues[c]) - 1)).toBeLessThan(tolerance);
    expect(Math.abs(found.indices[c]! / Number(wanted.conditionIndices[c]) - 1)).toBeLessThan(tolerance);
  }
  names.forEach((name, j) => {
    for (let c = 0; c < q; c++) {
      const share = Number(wanted.varianceProportions[name]![c]);
      expect(Math.abs(found.proportions[j * q + c]! - share)).toBeLessThan(tolerance);
    }
  });
}

test("of the Longley set they are the published ones", () => {
  const set = readReference("nist/strd-linear.json");
  const longley = set.Longley;
  const { names, scaledUncentred } = readReference("longley/collinearity.json");
  const rows: string[][] = longley.data;
  const columns = [1, 2, 3, 4, 5, 6].map((j) => Float64Array.from(rows, (row) => Number(row[j])));
  const response = Float64Array.from(rows, (row) => Number(row[0]));
  expectIndices(indicesOf(columns, response), scaledUncentred, names, 1e-9);
});

test.each([
  ["houseprices", 1e-10],
  ["diamonds600", 1e-7],
] as const)("of the %s they are the published ones", (name, tolerance) => {
  const { columns, lnPrice, names, expected } = publishedSales(name);
  expectIndices(indicesOf(columns, lnPrice), expected.collinearity.scaledUncentred, names, tolerance);
});

test("columns at right angles to each other and to the ones have indices 1", () => {
  const found = indicesOf([Float64Array.of(1, -1, 1, -1), Float64Array.of(5, 5, -5, -5)], Float64Array.of(1, 2, 4, 3));
  for (const index of found.indices) expect(index).toBeCloseTo(1, 14);
});

test("other units change nothing", () => {
  const { columns, lnPrice } = publishedSales("houseprices");
  const plain = indicesOf(columns, lnPrice);
  const scaled = indicesOf(
    columns.map((column, j) => column.map((x) => x * 1000 ** (j % 3))),
    lnPrice,
  );
  plain.proportions.forEach((share, at) => {
    expect(scaled.proportions[at]).toBeCloseTo(share, 11);
  });
});
