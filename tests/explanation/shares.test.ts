/** Shares of attributes: of R² as published for the houses, of the subject's distance by their definition. */
import { describe, expect, test } from "vitest";
import { attributeShares } from "../../src/explanation/shares.ts";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { numbersOf } from "../../src/numerics/column.ts";
import { plainDesign } from "../fixtures/plainDesign.ts";
import { referenceSales, rowOf } from "../fixtures/referenceSales.ts";

const houses = referenceSales("houseprices");
const design = plainDesign(
  houses.columns.map((column, j) => ({ key: houses.terms[j]!, values: numbersOf(column), kind: "line" })),
  houses.response.map(Math.exp),
  { ln: true },
);
const fit = fitColumns(design, design.groups);
const subject = { x: rowOf(houses.columns, 17), notKnown: [] };
const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describe("shares of the houses", () => {
  const found = attributeShares({ fit, row: subject });

  test("of R² are the published ones, and add up to it", () => {
    for (const { key, r2, r2Alone, r2Last } of found.shares) {
      expect(r2 / houses.expected.relativeImportance.lmg[key]).toBeCloseTo(1, 9);
      expect(r2Alone / houses.expected.relativeImportance.first[key]).toBeCloseTo(1, 9);
      expect(r2Last / houses.expected.relativeImportance.last[key]).toBeCloseTo(1, 8);
    }
    expect(sum(found.shares.map(({ r2 }) => r2))).toBeCloseTo(found.r2, 13);
  });

  test("of the subject's distance add up to it, by either rule", () => {
    const price = sum([...fit.solution.slopes].map((b, j) => b * subject.x[j]!)) + fit.solution.intercept!;
    expect(found.distance).toBeCloseTo(price - fit.solution.responseMean, 11);
    expect(sum(found.shares.map(({ distance }) => distance!))).toBeCloseTo(found.distance!, 11);
    expect(sum(found.shares.map(({ additive }) => additive!))).toBeCloseTo(found.distance!, 11);
  });

  test("are said in words that claim no cause", () => {
    expect(found.sentences[0]).toMatch(/Log\(lotsize\) 24\u00a0%, Bathrooms 15\u00a0% and Aircon 13\u00a0%\.$/);
    expect(found.sentences[1]).toContain("not of what causes a price");
  });
});

test("have the standard errors of a jackknife over twentieths of the sales, each fitted by itself", () => {
  const chosen = [0, 1, 2];
  const designOf = (rows: readonly number[]) =>
    plainDesign(
      chosen.map((j) => ({
        key: houses.terms[j]!,
        values: Float64Array.from(rows, (i) => numbersOf(houses.columns[j]!)[i]!),
        kind: "line" as const,
      })),
      Float64Array.from(rows, (i) => Math.exp(houses.response[i]!)),
      { ln: true },
    );
  const sharesOf = (rows: readonly number[]) => {
    const some = designOf(rows);
    return attributeShares({ fit: fitColumns(some, some.groups), row: null }).shares;
  };
  const all = [...houses.response.keys()];
  const without = Array.from({ length: 20 }, (_, part) => sharesOf(all.filter((i) => i % 20 !== part)));
  sharesOf(all).forEach(({ r2Error }, g) => {
    const values = without.map((shares) => shares[g]!.r2);
    const mean = sum(values) / 20;
    expect(r2Error! / Math.sqrt((19 / 20) * sum(values.map((value) => (value - mean) ** 2)))).toBeCloseTo(1, 8);
  });
  expect(sharesOf(all.slice(0, 39))[0]!.r2Error).toBeNull();
});

test("of two attributes the distance is shared by the mean of both orders", () => {
  const two = [design.groups[7]!, design.groups[8]!];
  const both = fitColumns(design, two);
  const found = attributeShares({ fit: both, row: subject });
  const moveOf = (groups: typeof two) => {
    const { solution, columns } = fitColumns(design, groups);
    return sum(columns.map((j, at) => solution.slopes[at]! * (subject.x[j]! - solution.means[at]!)));
  };
  const alone = two.map((group) => moveOf([group]));
  const whole = moveOf(two);
  expect(found.shares[0]!.distance).toBeCloseTo((alone[0]! + whole - alone[1]!) / 2, 12);
  expect(found.shares[1]!.distance).toBeCloseTo((alone[1]! + whole - alone[0]!) / 2, 12);
});

test("market movement comes first, and without a subject there is no distance", () => {
  const groups = design.groups.map((group, g) => ({ ...group, isMarket: g === 10 }));
  const found = attributeShares({ fit: fitColumns({ ...design, groups }, groups), row: null });
  expect(found.shares).toHaveLength(10);
  expect(found.alwaysIn.r2).toBeCloseTo(houses.expected.relativeImportance.first.stories, 11);
  expect(sum(found.shares.map(({ r2 }) => r2)) + found.alwaysIn.r2).toBeCloseTo(found.r2, 13);
  expect([found.distance, found.alwaysIn.distance, found.shares[0]!.distance]).toEqual([null, null, null]);
});
