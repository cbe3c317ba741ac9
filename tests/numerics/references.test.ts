/** Exact dependencies, variance inflation and Student's t against values worked out elsewhere (tests/reference/README.md). */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { inflation } from "../../src/numerics/collinearity.ts";
import { findDependencies } from "../../src/numerics/findDependencies.ts";
import { leverages } from "../../src/numerics/leverages.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { tUpperQuantile, tUpperTail } from "../../src/numerics/studentT.ts";

function readJson(path: string) {
  return JSON.parse(readFileSync(new URL(`../reference/${path}`, import.meta.url), "utf8"));
}

/** The machinery file as the 0/1 and number columns that its expected values name. */
function machinery(): { names: string[]; columns: Float64Array[]; response: Float64Array; hpPlate: Float64Array } {
  const [heading, ...lines] = readFileSync(new URL("../reference/aliasing/machinery.csv", import.meta.url), "utf8")
    .trim()
    .split(/\r?\n/);
  const keys = heading!.split(",");
  const rows = lines.map((line) => Object.fromEntries(line.split(",").map((cell, at) => [keys[at]!, cell])));
  const names: string[] = readJson("aliasing/expected.json").columnsInOrder.slice(1);
  const columns = names.map((name) => {
    const [key, level] = name.split("=");
    if (name === "currency_is_EUR") return Float64Array.from(rows, (row) => (row.currency === "EUR" ? 1 : 0));
    return Float64Array.from(rows, (row) => (level === undefined ? Number(row[key!]) : row[key!] === level ? 1 : 0));
  });
  return {
    names,
    columns,
    response: Float64Array.from(rows, (row) => Math.log(Number(row.price))),
    hpPlate: Float64Array.from(rows, (row) => Number(row.hp_plate)),
  };
}

describe("exact dependencies of the machinery file", () => {
  const { names, columns, response, hpPlate } = machinery();
  const expected = readJson("aliasing/expected.json");
  const found = findDependencies(columns, { intercept: true });

  test("all seven are found, with their exact coefficients, in column order", () => {
    const asWritten = found.dependent.map(({ column, constant, terms }) => ({
      dependent: names[column],
      equals: Object.fromEntries([
        ...(constant === 0 ? [] : [["(Intercept)", constant] as const]),
        ...terms.map(({ column: at, coefficient }) => [names[at]!, coefficient] as const),
      ]),
    }));
    const wanted = expected.dependencies.map(
      ({ dependent, equals }: { dependent: string; equals: Record<string, string> }) => ({
        dependent,
        equals: Object.fromEntries(
          Object.entries(equals).map(([name, ratio]) => {
            const [above, below = "1"] = ratio.split("/");
            return [name, Number(above) / Number(below)];
          }),
        ),
      }),
    );
    expect(asWritten).toEqual(wanted);
  });

  test("the kept columns are the earlier ones, and their fit is the expected one", () => {
    expect(["(Intercept)", ...found.kept.map((at) => names[at])]).toEqual(expected.keptWhenLaterColumnsAreDropped);
    const kept = found.kept.map((at) => columns[at]!);
    const fit = solveLeastSquares(kept, response, { intercept: true });
    found.kept.forEach((at, k) => {
      expect(Math.abs(fit.slopes[k]! / expected.fit.coefficientsOfKeptColumns[names[at]!] - 1)).toBeLessThan(1e-9);
      expect(Math.abs(fit.standardErrors[k]! / expected.fit.se[names[at]!] - 1)).toBeLessThan(1e-9);
    });
    expect(fit.residualDf).toBe(expected.fit.dfResidual);
  });

  test("a rounded plate value in hp is near, but not called exact", () => {
    const kw = columns[names.indexOf("kw")]!;
    expect(findDependencies([kw, hpPlate], { intercept: true }).dependent).toEqual([]);
    const fit = solveLeastSquares([kw, hpPlate], response, { intercept: true });
    expect(inflation(accumulateMoments([kw, hpPlate]), [0, 1], fit.inverse, [1]) / expected.nearAlias.vif).toBeCloseTo(
      1,
      9,
    );
  });

  test("a fit called with dependent columns names them", () => {
    expect(() => solveLeastSquares(columns, response, { intercept: true })).toThrowError(
      expect.objectContaining({ code: "rankDeficient", columns: found.dependent.map((one) => one.column) }),
    );
  });

  test("no columns at all are no dependencies, not an error", () => {
    expect(findDependencies([], { intercept: true })).toEqual({ kept: [], dependent: [] });
  });

  test("a conversion factor of many decimals stays the decimal it is, and a match to ten digits is not exact", () => {
    const kw = columns[names.indexOf("kw")]!;
    const [found] = findDependencies([kw, kw.map((value) => value * 1.34102209)], { intercept: true }).dependent;
    expect(found!.terms[0]!.coefficient).toBeCloseTo(1.34102209, 12);
    expect(found!.terms[0]!.ratio).toBeNull();
    const near = kw.map((value) => value * (1 + 1e-10 * Math.sin(value)));
    expect(findDependencies([kw, near], { intercept: true }).dependent).toEqual([]);
  });

  test("large offsets neither hide a dependency nor make one up", () => {
    const base = Float64Array.from({ length: 40 }, (_, i) => Math.sin(i * 1.7) + (i % 7));
    const far = base.map((value) => 2 ** 27 + value);
    const other = base.map((value, i) => 2 ** 27 + value + (i % 3) * 1e-3);
    expect(findDependencies([base, far], { intercept: true }).dependent.map((one) => one.column)).toEqual([1]);
    expect(findDependencies([base, other], { intercept: true }).dependent).toEqual([]);
  });
});

test("variance inflation of the Longley data agrees with 60-digit values", () => {
  const nist = readJson("nist/strd-linear.json").Longley;
  const { vif } = readJson("longley/collinearity.json");
  const x = [1, 2, 3, 4, 5, 6].map((at) => Float64Array.from(nist.data as string[][], (row) => Number(row[at])));
  const y = Float64Array.from(nist.data as string[][], (row) => Number(row[0]));
  const fit = solveLeastSquares(x, y, { intercept: true });
  Object.values(vif as Record<string, string>).forEach((expected, at) => {
    expect(
      Math.abs(inflation(accumulateMoments(x), [0, 1, 2, 3, 4, 5], fit.inverse, [at]) / Number(expected) - 1),
    ).toBeLessThan(1e-9);
  });
  expect(leverages(x, fit).reduce((sum, h) => sum + h, 0)).toBeCloseTo(7, 9);
});

describe("Student's t over the reference grid", () => {
  const { t } = readJson("distributions/distributions.json");

  test("quantiles have at least 12 digits", () => {
    let worst = 0;
    for (const [df, p, q] of t.quantile as [string, string, string][]) {
      const tail = Number((1 - Number(p)).toFixed(12)); // the grid's p are short decimals, so this is their exact tail
      worst = Math.max(worst, Math.abs(tUpperQuantile(tail, Number(df)) / Number(q) - 1));
    }
    expect(t.quantile.length).toBe(204);
    expect(worst).toBeLessThan(1e-12);
  });

  test("upper tails have at least 12 digits", () => {
    let worst = 0;
    for (const [df, at, sf] of t.tail as [string, string, string][]) {
      if (Number(sf) < 1e-307) continue; // below the smallest double that keeps its digits
      worst = Math.max(worst, Math.abs(tUpperTail(Number(at), Number(df)) / Number(sf) - 1));
    }
    expect(worst).toBeLessThan(1e-12);
  });
});
