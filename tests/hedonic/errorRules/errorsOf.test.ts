/** Error rules against published standard errors (tests/reference/README.md), sandwiches written out, and laws. */
import { inverse, Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { errorsOf } from "../../../src/hedonic/errorRules/index.ts";
import { estimate } from "../../../src/hedonic/estimators/index.ts";
import { fitColumns } from "../../../src/hedonic/fitPriceModel.ts";
import { valueAt } from "../../../src/numerics/column.ts";
import { plainDesign, publishedDesign } from "../../fixtures/plainDesign.ts";
import { readReference } from "../../fixtures/publishedSales.ts";
import { drawFrom } from "../../fixtures/randomClass.ts";

describe.each([
  { name: "houseprices" as const, tolerance: 1e-10 },
  { name: "diamonds600" as const, tolerance: 1e-7 },
])("on $name", ({ name, tolerance }) => {
  const design = publishedDesign(name);
  const fit = fitColumns(design, design.groups);
  const { ols } = readReference(`${name}/expected.json`);

  test.each(["even", "HC0", "HC1", "HC2", "HC3"] as const)("%s", (kind) => {
    const found = errorsOf({ kind }, fit);
    const wanted = kind === "even" ? ols.se : ols.seRobust[kind];
    for (const [at, one] of design.names.entries()) {
      const value = at === 0 ? found.interceptStandardError : found.standardErrors[at - 1]!;
      expect(Math.abs(value / wanted[one] - 1)).toBeLessThan(tolerance);
    }
    expect(found.df).toBe(design.n - design.names.length);
    const atZero = found.varianceOfAverage(new Float64Array(fit.columns.length));
    expect(atZero / found.interceptStandardError ** 2).toBeCloseTo(1, 12);
  });
});

function dealers(count: number, n = 60) {
  const draw = drawFrom(41);
  const size = Float64Array.from({ length: n }, () => 5 * draw());
  const dealer = Array.from({ length: n }, (_, i) => i % count);
  const prices = Float64Array.from(size, (v, i) => 50 + 4 * v + 3 * Math.sin(dealer[i]!) + draw());
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "dealer", values: dealer, kind: "choice" },
    ],
    prices,
  );
  return { design, fit: fitColumns(design, design.groups.slice(0, 1)), dealer };
}

describe("clusters", () => {
  test("CR1, written out, by a choice that is not in the model", () => {
    const { design, fit } = dealers(6);
    const { standardErrors, df, caution, sentence } = errorsOf({ kind: "cluster", by: "dealer" }, fit);
    const x = new Matrix([...design.prices.keys()].map((i) => [1, (design.columns[0]!.values as Float64Array)[i]!]));
    const outer = inverse(x.transpose().mmul(x));
    let meat = Matrix.zeros(2, 2);
    for (let g = 0; g < 6; g++) {
      const e = Matrix.columnVector([...fit.solution.residuals].map((one, i) => (i % 6 === g ? one : 0)));
      const score = x.transpose().mmul(e);
      meat = meat.add(score.mmul(score.transpose()));
    }
    const wanted = (outer.mmul(meat).mmul(outer).get(1, 1) * (6 / 5) * 59) / 58;
    expect(standardErrors[0]! / Math.sqrt(wanted)).toBeCloseTo(1, 10);
    expect(df).toBe(5);
    expect(caution).toContain("6 clusters are few");
    expect(sentence).toContain("alike in dealer");
  });

  test("by source, in the order of the sales; one cluster and no such choice are refused", () => {
    const { fit, dealer } = dealers(6);
    const context = { curvature: null, sources: dealer.map((d) => `Source ${d}`) };
    const bySource = errorsOf({ kind: "cluster", by: "source" }, fit, context);
    expect(bySource.standardErrors).toEqual(errorsOf({ kind: "cluster", by: "dealer" }, fit).standardErrors);
    const alike = { curvature: null, sources: dealer.map(() => "Archive") };
    expect(() => errorsOf({ kind: "cluster", by: "source" }, fit, alike)).toThrow(
      expect.objectContaining({ code: "one-cluster" }),
    );
    for (const by of ["source", "size", "colour"]) {
      expect(() => errorsOf({ kind: "cluster", by }, fit)).toThrow(expect.objectContaining({ code: "no-clusters" }));
    }
  });

  test("forty clusters and more bring no caution", () => {
    expect(errorsOf({ kind: "cluster", by: "dealer" }, dealers(40, 200).fit).caution).toBeNull();
  });
});

describe("recency weights are preferences", () => {
  const { design } = dealers(6);
  const weights = design.prices.map((_, i) => 0.5 ** (i / 30));
  const weighted = { ...design, weights };
  const groups = design.groups.slice(0, 1);

  test("weights that are all two change no error of any rule", () => {
    const twos = { ...design, weights: new Float64Array(design.n).fill(2) };
    const plain = fitColumns(design, groups);
    const doubled = fitColumns(twos, groups);
    for (const kind of ["even", "HC0", "HC1", "HC2", "HC3"] as const) {
      expect(errorsOf({ kind }, doubled).standardErrors[0]! / errorsOf({ kind }, plain).standardErrors[0]!).toBeCloseTo(
        1,
        9,
      );
    }
  });

  test("even: B⁻¹(Σ w²xx′)B⁻¹ times the unbiased variance, written out", () => {
    const fit = fitColumns(weighted, groups);
    const size = design.columns[0]!.values as Float64Array;
    const x = new Matrix([...size].map((v) => [1, v]));
    const times = (power: number) =>
      new Matrix([...size].map((v, i) => [weights[i]! ** power, weights[i]! ** power * v]));
    const outer = inverse(x.transpose().mmul(times(1)));
    const hat = x.mmul(outer).mmul(times(1).transpose());
    const residuals = Matrix.eye(60)
      .sub(hat)
      .mmul(Matrix.columnVector([...design.prices]));
    const squares = residuals.to1DArray().reduce((sum, e, i) => sum + weights[i]! * e * e, 0);
    const free = weights.reduce((sum, w, i) => sum + w * (1 - hat.get(i, i)), 0);
    const wanted = outer
      .mmul(x.transpose().mmul(times(2)))
      .mmul(outer)
      .mul(squares / free);
    const found = errorsOf({ kind: "even" }, fit);
    expect(found.covariance[0]! / wanted.get(1, 1)).toBeCloseTo(1, 9);
    expect(found.interceptStandardError ** 2 / wanted.get(0, 0)).toBeCloseTo(1, 9);
  });
});

describe("robust estimates", () => {
  const design = publishedDesign("houseprices");

  test("with residuals that all count in full, their errors are those of least squares", () => {
    const { fit } = dealers(6);
    const curvature = new Float64Array(60).fill(1);
    for (const kind of ["even", "HC3"] as const) {
      const robust = errorsOf({ kind }, fit, { curvature, sources: null });
      expect(robust.standardErrors[0]! / errorsOf({ kind }, fit).standardErrors[0]!).toBeCloseTo(1, 10);
    }
  });

  // The stored errors follow another formula (they let the scale vary too): they agree to a tenth, not to digits.
  test("MM errors lie near those of an independent formula", () => {
    const found = estimate(design, design.groups, { kind: "mm" });
    const fit = fitColumns(design, design.groups, found.rule);
    const { mm } = readReference("houseprices/robust.json").robust;
    const errors = errorsOf({ kind: "HC0" }, fit, { curvature: found.extras.curvature, sources: null });
    for (const [at, one] of design.names.slice(1).entries()) {
      expect(Math.abs(errors.standardErrors[at]! / mm.se[one] - 1)).toBeLessThan(0.1);
    }
  });
});

test("a sale alone of its kind has no HC2 and HC3; no degrees of freedom are refused in a sentence", () => {
  const draw = drawFrom(2);
  const prices = Float64Array.from({ length: 12 }, () => 50 + draw());
  const lone = plainDesign([{ key: "make", values: [1, ...new Array(11).fill(0)], kind: "choice" }], prices);
  const fit = fitColumns(lone, lone.groups);
  for (const kind of ["HC2", "HC3"] as const) {
    expect(() => errorsOf({ kind }, fit)).toThrow(expect.objectContaining({ code: "lone-sale" }));
  }
  expect(errorsOf({ kind: "HC1" }, fit).caution).toContain("HC3 is the safer choice");
  expect(errorsOf({ kind: "even" }, fit).caution).toContain("HC3");
});

describe("pooled levels", () => {
  const draw = drawFrom(23);
  const n = 90;
  const make = Array.from({ length: n }, () => Math.floor(8 * draw() * draw()));
  const size = Float64Array.from({ length: n }, () => 3 * draw());
  const prices = Float64Array.from(size, (v, i) => 80 + 6 * v + 2 * Math.sin(2 * make[i]!) + 2 * draw());
  const design = plainDesign(
    [
      { key: "size", values: size, kind: "line" },
      { key: "make", values: make, kind: "pooled" },
    ],
    prices,
  );
  const { rule, extras } = estimate(design, design.groups);
  const fit = fitColumns(design, design.groups, rule);
  const found = errorsOf({ kind: "even" }, fit);

  test("even: s² times the inverse of the penalised matrix, intercept included, written out", () => {
    const x = new Matrix(make.map((_, i) => [1, ...design.columns.map(({ values }) => valueAt(values, i))]));
    const penalised = x.transpose().mmul(x);
    for (const [j, penalty] of rule.penalty!.entries())
      penalised.set(j + 1, j + 1, penalised.get(j + 1, j + 1) + penalty);
    const outer = inverse(penalised);
    const hat = x.mmul(outer).mmul(x.transpose());
    const squares = fit.solution.residuals.reduce((sum, e) => sum + e * e, 0);
    const s2 = squares / (n - hat.trace());
    for (const [j, se] of found.standardErrors.entries())
      expect(se ** 2 / (s2 * outer.get(j + 1, j + 1))).toBeCloseTo(1, 8);
    expect(found.interceptStandardError ** 2 / (s2 * outer.get(0, 0))).toBeCloseTo(1, 8);
  });

  test("at the restricted maximum the two ways to the residual variance agree: Σe²/(n − Σh) = λτ²", () => {
    const squares = fit.solution.residuals.reduce((sum, e) => sum + e * e, 0);
    const { penalty, spread } = extras.pooled[0]!;
    expect((penalty * spread ** 2 * found.df) / squares).toBeCloseTo(1, 9);
  });
});
