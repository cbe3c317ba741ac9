/** The exact solver against a case worked by hand, and against NIST StRD (US government) certified values. */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { exactLeastSquares } from "../../src/app/digits/exactLeastSquares.ts";

const path = new URL("../reference/nist/strd-linear.json", import.meta.url);
const sets = JSON.parse(readFileSync(path, "utf8")).sets ?? JSON.parse(readFileSync(path, "utf8"));

// x = 1, 2, 3, y = 1, 2, 4: slope 3/2, intercept −2/3, RSS 1/6, s² 1/6, errors √(1/12) and √(7/18).
test("three points worked by hand come out to the last digit", () => {
  const found = exactLeastSquares([Float64Array.of(1, 1, 1), Float64Array.of(1, 2, 3)], Float64Array.of(1, 2, 4));
  expect(found.estimates.map(Number)).toEqual([-2 / 3, 1.5]);
  expect(found.standardDeviations.map(Number)).toEqual([Math.sqrt(7 / 18), Math.sqrt(1 / 12)]);
  expect(Number(found.residualStandardDeviation)).toBe(Math.sqrt(1 / 6));
});

test("halves and quarters scale out: dividing a column by four multiplies its coefficient by four", () => {
  const y = Float64Array.of(1, 2, 4);
  const found = exactLeastSquares([Float64Array.of(1, 1, 1), Float64Array.of(0.25, 0.5, 0.75)], y);
  expect(Number(found.estimates[1])).toBe(6);
  expect(Number(found.standardDeviations[1])).toBe(4 * Math.sqrt(1 / 12));
});

test.each(["Longley", "Wampler5"])(
  "%s, all of whole numbers up to a dyadic scale, agrees with its certified values",
  (name) => {
    const set = sets[name];
    const data = set.data as string[][];
    const ten = (at: number) => Float64Array.from(data, (row) => Math.round(Number(row[at]) * 10));
    const isLongley = name === "Longley";
    const x = isLongley
      ? set.columns.slice(1).map((_: string, at: number) => ten(at + 1))
      : [1, 2, 3, 4, 5].map((k) => Float64Array.from(data, (row) => Number(row[1]) ** k));
    const y = isLongley ? ten(0) : Float64Array.from(data, (row) => Number(row[0]));
    const found = exactLeastSquares([new Float64Array(y.length).fill(1), ...x], y);
    const scale = (at: number) => (isLongley && at === 0 ? 10 : 1);
    const close = (text: string, wanted: string, by: number) =>
      expect(Math.abs(Number(text) / by / Number(wanted) - 1)).toBeLessThan(1e-15);
    for (const [at, text] of found.estimates.entries()) close(text, set.highPrecision.estimates[at], scale(at));
    for (const [at, text] of found.standardDeviations.entries())
      close(text, set.highPrecision.standardDeviations[at], scale(at));
    close(found.residualStandardDeviation, set.highPrecision.residualStandardDeviation, isLongley ? 10 : 1);
  },
);

test("dependent columns, too few rows and numbers that are not finite are refused in a sentence", () => {
  const one = Float64Array.of(1, 1, 1);
  const y = Float64Array.of(1, 2, 4);
  expect(() => exactLeastSquares([one, one], y)).toThrow("depends on those before it");
  expect(() => exactLeastSquares([one, y, Float64Array.of(1, 4, 9)], y)).toThrow("no more rows than columns");
  expect(() => exactLeastSquares([Float64Array.of(1, Number.NaN, 2)], y)).toThrow("not finite");
});
