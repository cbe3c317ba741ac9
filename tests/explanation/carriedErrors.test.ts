/** Standard errors of carried parts, against what drawing the sales again and again gives (Gelbach 2016, §3.3). */
import { describe, expect, test } from "vitest";
import { carriedCovariance } from "../../src/explanation/carriedErrors.ts";
import type { AttributeGroup, Design } from "../../src/hedonic/fit.ts";
import { fitColumns } from "../../src/hedonic/fitPriceModel.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { plainDesign } from "../fixtures/plainDesign.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

function designOf(values: readonly Float64Array[], response: Float64Array): Design {
  return plainDesign(
    values.map((column, at) => ({ key: `a${at}`, values: column, kind: "line" })),
    response,
  );
}

interface Carried {
  readonly amount: number;
  readonly error: number;
}

function carriedOf(design: Design): Carried {
  const [a, b] = design.groups as [AttributeGroup, AttributeGroup];
  const short = fitColumns(design, [a]);
  const long = fitColumns(design, [a, b]);
  const left = design.columns[1]!.values as Float64Array;
  const { slopes, residuals } = solveLeastSquares([design.columns[0]!.values], left, { intercept: true });
  const covariance = carriedCovariance(short, long, b, [{ column: 1, slopes, residuals }])!;
  return { amount: slopes[0]! * long.solution.slopes[1]!, error: Math.sqrt(covariance[0]!) };
}

/** y = 1 + 2a + 3b + noise, b = 0.8a + its own. */
function drawn(next: () => number, n: number): Design {
  const around = () => next() + next() + next() + next() - 2;
  const a = Float64Array.from({ length: n }, around);
  const b = a.map((value) => 0.8 * value + around());
  return designOf(
    [a, b],
    a.map((value, i) => 1 + 2 * value + 3 * b[i]! + 4 * around()),
  );
}

describe("carriedCovariance", () => {
  test("gives the spread that carried parts have over many drawings of the sales", () => {
    const next = drawFrom(4711);
    const parts = Array.from({ length: 1500 }, () => carriedOf(drawn(next, 80)));
    const mean = parts.reduce((sum, { amount }) => sum + amount, 0) / parts.length;
    const found = Math.sqrt(parts.reduce((sum, { amount }) => sum + (amount - mean) ** 2, 0) / (parts.length - 1));
    const told = Math.sqrt(parts.reduce((sum, { error }) => sum + error ** 2, 0) / parts.length);
    expect(mean).toBeCloseTo(2.4, 1);
    expect(told / found).toBeGreaterThan(0.94);
    expect(told / found).toBeLessThan(1.06);
  });

  test("is the textbook formula, written out, for one attribute left out", () => {
    const design = drawn(drawFrom(9), 30);
    const [a, b] = design.columns.map((column) => column.values as Float64Array) as [Float64Array, Float64Array];
    const long = fitColumns(design, design.groups).solution;
    const mean = (values: Float64Array) => values.reduce((sum, v) => sum + v, 0) / values.length;
    const saa = a.reduce((sum, v) => sum + (v - mean(a)) ** 2, 0);
    const sab = a.reduce((sum, v, i) => sum + (v - mean(a)) * (b[i]! - mean(b)), 0);
    const sbb = b.reduce((sum, v) => sum + (v - mean(b)) ** 2, 0);
    const delta = sab / saa;
    const rest = (long.slopes[1]! ** 2 * (sbb - sab ** 2 / saa)) / (30 - 2);
    const expected = Math.sqrt(delta ** 2 * long.standardErrors[1]! ** 2 + rest / saa);
    expect(carriedOf(design).error / expected - 1).toBeCloseTo(0, 10);
  });

  test("is not given when the long fit has no degrees of freedom to tell a spread from", () => {
    const full = drawn(drawFrom(3), 30);
    const [a, b] = full.groups as [AttributeGroup, AttributeGroup];
    const short = fitColumns(full, [a]);
    const long = fitColumns(full, [a, b]);
    const bare = { ...long, solution: { ...long.solution, residualStandardError: null } };
    expect(carriedCovariance(short, bare, b, [])).toBeNull();
  });
});
