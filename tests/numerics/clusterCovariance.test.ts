/** Sandwich covariances against published standard errors (tests/reference/README.md) and sandwiches written out. */
import { inverse, Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import {
  breadOf,
  breadOfCurvature,
  evenCovariance,
  pulledCovariance,
  varianceAt,
} from "../../src/numerics/clusterCovariance.ts";
import { leverages } from "../../src/numerics/leverages.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { publishedSales } from "../fixtures/publishedSales.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

describe.each([
  // The README of the reference values: 1e-10 for houses; 1e-7 for the nearly collinear stones.
  { name: "houseprices" as const, tolerance: 1e-10 },
  { name: "diamonds600" as const, tolerance: 1e-7 },
])("on $name", ({ name, tolerance }) => {
  const { names, columns, lnPrice, expected } = publishedSales(name);
  const solution = solveLeastSquares(columns, lnPrice, { intercept: true });
  const bread = breadOf(solution, null);
  const h = leverages(columns, solution);

  test.each(["HC0", "HC1", "HC2", "HC3"])("%s standard errors", (kind) => {
    const n = lnPrice.length;
    const scores = solution.residuals.map((e, i) => {
      if (kind === "HC1") return e * Math.sqrt(n / (n - names.length));
      return kind === "HC0" ? e : kind === "HC2" ? e / Math.sqrt(1 - h[i]!) : e / (1 - h[i]!);
    });
    const covariance = pulledCovariance(columns, bread, scores, null);
    const k = columns.length;
    const found = [
      Math.sqrt(varianceAt(covariance, new Float64Array(k))),
      ...columns.map((_, j) => Math.sqrt(covariance.matrix[(j + 1) * (k + 2)]!)),
    ];
    for (const [at, one] of names.entries()) {
      expect(Math.abs(found[at]! / expected.ols.seRobust[kind][one] - 1)).toBeLessThan(tolerance);
    }
  });

  test("the even covariance has the classical standard errors, intercept included", () => {
    const covariance = evenCovariance(bread, solution.residualStandardError! ** 2);
    const found = Math.sqrt(varianceAt(covariance, new Float64Array(columns.length)));
    expect(Math.abs(found / expected.ols.se["(Intercept)"] - 1)).toBeLessThan(tolerance);
  });
});

function drawn(n: number) {
  const draw = drawFrom(31);
  const columns = [0, 1].map((j) => Float64Array.from({ length: n }, () => draw() + 3 * j));
  const response = Float64Array.from({ length: n }, (_, i) => columns[0]![i]! - columns[1]![i]! + draw());
  const codes = Uint16Array.from({ length: n }, () => Math.floor(4 * draw()));
  return {
    columns,
    response,
    codes,
    x: new Matrix([...response.keys()].map((i) => [1, ...columns.map((c) => c[i]!)])),
  };
}

test("clusters: (X′X)⁻¹ Σ X_g′e_g e_g′X_g (X′X)⁻¹, written out", () => {
  const { columns, response, codes, x } = drawn(40);
  const solution = solveLeastSquares(columns, response, { intercept: true });
  const found = pulledCovariance(columns, breadOf(solution, null), solution.residuals, { codes, count: 4 });
  const outer = inverse(x.transpose().mmul(x));
  let meat = Matrix.zeros(3, 3);
  for (let g = 0; g < 4; g++) {
    const own = new Matrix([...response.keys()].map((i) => [codes[i] === g ? solution.residuals[i]! : 0]));
    const score = x.transpose().mmul(own);
    meat = meat.add(score.mmul(score.transpose()));
  }
  const wanted = outer.mmul(meat).mmul(outer);
  for (const at of [
    [0, 0],
    [1.5, 2],
    [-3, 7],
  ]) {
    const a = Matrix.columnVector([1, ...at]);
    expect(varianceAt(found, at) / a.transpose().mmul(wanted).mmul(a).get(0, 0)).toBeCloseTo(1, 9);
  }
});

test("a cluster for every row is HC0", () => {
  const { columns, response } = drawn(25);
  const solution = solveLeastSquares(columns, response, { intercept: true });
  const bread = breadOf(solution, null);
  const alone = pulledCovariance(columns, bread, solution.residuals, null);
  const codes = Uint16Array.from({ length: 25 }, (_, i) => i);
  const own = pulledCovariance(columns, bread, solution.residuals, { codes, count: 25 });
  for (const [at, value] of alone.matrix.entries()) expect(own.matrix[at]! / value).toBeCloseTo(1, 12);
});

test("curvature of one everywhere is the plain inverse, and none at all is refused", () => {
  const { columns, response } = drawn(30);
  const solution = solveLeastSquares(columns, response, { intercept: true });
  const bread = breadOfCurvature(columns, new Float64Array(30).fill(1), null);
  for (const [at, value] of solution.inverse.entries()) expect(bread.inverse[at]! / value).toBeCloseTo(1, 10);
  expect(bread.totalWeight).toBe(30);
  expect(() => breadOfCurvature(columns, new Float64Array(30).fill(-1), null)).toThrow(
    expect.objectContaining({ code: "rankDeficient" }),
  );
});
