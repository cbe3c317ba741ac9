/**
 * Answers while columns are switched and sales edited agree with the refined fit of the same columns and sales.
 * Short fits with an attribute left out: tests/reference/README.md (houseprices, diamonds600).
 */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { quadraticForm } from "../../src/numerics/leverages.ts";
import { openLiveFit } from "../../src/numerics/liveFit.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { drawFrom } from "../fixtures/randomClass.ts";
import { referenceSales } from "../fixtures/referenceSales.ts";

interface ReferenceModel {
  readonly formula: string;
  readonly coefficients: Record<string, number>;
  readonly se: Record<string, number>;
  readonly sigma: number;
  readonly r2: number;
}

function drawn(seed: number) {
  const draw = drawFrom(seed);
  const base = Float64Array.from({ length: 90 }, () => draw() - 0.5);
  const columns = Array.from({ length: 8 }, (_, j) =>
    base.map((value) => 10 ** (j - 3) * (5 + (j % 3) * value + 0.5 * (draw() - 0.5))),
  );
  return {
    columns,
    response: base.map((value) => 40 + value + draw()),
    weights: base.map(() => 0.3 + draw()),
    penalty: Float64Array.from({ length: 8 }, (_, j) => (2 + j) / 100 ** (j - 3)),
  };
}

function near(found: number, expected: number, digits: number): void {
  expect(Math.abs(found - expected)).toBeLessThan(10 ** -digits * Math.max(1e-12, Math.abs(expected)));
}

describe("a live fit", () => {
  test.each([false, true])("agrees with the refined fit through many switches; penalties: %s", (isPenalised) => {
    const { columns, response, weights, penalty } = drawn(5);
    const moments = accumulateMoments([...columns, response], { weights });
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 7 }), { minLength: 1, maxLength: 150 }), (switches) => {
        const live = openLiveFit(moments, [1, 4], isPenalised ? penalty : null);
        for (const j of switches) live.switchColumns([j]);
        const answer = live.answer();
        const fit = solveLeastSquares(
          answer.columns.map((j) => columns[j]!),
          response,
          {
            intercept: true,
            weights,
            ...(isPenalised ? { penalty: Float64Array.from(answer.columns, (j) => penalty[j]!) } : {}),
          },
        );
        for (const [at, slope] of answer.slopes.entries()) near(slope, fit.slopes[at]!, 9);
        for (const [at, error] of answer.standardErrors.entries()) near(error, fit.standardErrors[at]!, 9);
        near(answer.intercept, fit.intercept!, 9);
        near(answer.residualSumOfSquares, fit.residualSumOfSquares, 10);
        const x = columns.map((column) => 1.1 * column[0]!);
        const d = Float64Array.from(answer.columns, (j, at) => x[j]! - fit.means[at]!);
        const estimate = live.estimateAt(x);
        near(estimate.fitted, fit.responseMean + d.reduce((sum, one, at) => sum + one * fit.slopes[at]!, 0), 9);
        near(estimate.leverage, 1 / fit.weightSum + quadraticForm(fit.rootInverse, d), 9);
        expect(answer.residualDf).toBe(fit.residualDf);
        expect(answer.isFinal).toBe(false);
      }),
      { seed: 20263, numRuns: 25 },
    );
  });

  test("follows sales that come and go, and ends where it began when they have all gone again", () => {
    const { columns, response, weights } = drawn(6);
    const all = [...columns, response];
    const live = openLiveFit(accumulateMoments(all, { weights }), [0, 2, 5]);
    const before = live.answer();
    const row = (i: number) => all.map((column) => column[i]!);
    for (let i = 0; i < 30; i++) live.removeSale(row(i), weights[i]!);
    const rest = solveLeastSquares(
      [0, 2, 5].map((j) => columns[j]!.subarray(30)),
      response.subarray(30),
      { intercept: true, weights: weights.slice(30) },
    );
    for (const [at, slope] of live.answer().slopes.entries()) near(slope, rest.slopes[at]!, 9);
    for (const [at, error] of live.answer().standardErrors.entries()) near(error, rest.standardErrors[at]!, 9);
    for (let i = 0; i < 30; i++) live.addSale(row(i), weights[i]!);
    for (const [at, slope] of live.answer().slopes.entries()) near(slope, before.slopes[at]!, 9);
  });

  test.each([
    ["houseprices", 1e-10],
    ["diamonds600", 1e-7],
  ] as const)("leaves any attribute of the %s out as the published short fits do", (name, tolerance) => {
    const { columns, response, names, terms, groups, expected } = referenceSales(name);
    const moments = accumulateMoments([...columns, response]);
    const live = openLiveFit(moments, [...columns.keys()]);
    const { drops } = expected.omittedVariable;
    expect(Object.keys(drops).length).toBeGreaterThan(0);
    for (const [term, { bShort }] of Object.entries<{ bShort: Record<string, number> }>(drops)) {
      const group = groups[terms.indexOf(term)]!;
      live.switchColumns(group);
      const { columns: kept, slopes } = live.answer();
      for (const [at, j] of kept.entries()) {
        expect(Math.abs(slopes[at]! / bShort[names[j]!]! - 1)).toBeLessThan(tolerance);
      }
      live.switchColumns(group);
    }
  });

  test("climbs the ladder of the diamonds with the published coefficients, signs turning with size left out", () => {
    const { columns, response, names, groups, terms, expected } = referenceSales("diamonds600");
    const live = openLiveFit(accumulateMoments([...columns, response]), []);
    for (const { formula, coefficients, se, sigma, r2 } of Object.values<ReferenceModel>(expected.ladder.models)) {
      const inside = formula.split(" ~ ")[1]!.split(" + ");
      const wanted = inside.flatMap((term) => groups[terms.indexOf(term)]!);
      live.switchColumns([...columns.keys()].filter((j) => wanted.includes(j) !== live.answer().columns.includes(j)));
      const answer = live.answer();
      for (const [at, j] of answer.columns.entries()) {
        expect(Math.abs(answer.slopes[at]! / coefficients[names[j]!]! - 1)).toBeLessThan(1e-9);
        expect(Math.abs(answer.standardErrors[at]! / se[names[j]!]! - 1)).toBeLessThan(1e-9);
      }
      expect(Math.abs(answer.residualStandardError! / sigma - 1)).toBeLessThan(1e-9);
      expect(Math.abs(answer.r2 / r2 - 1)).toBeLessThan(1e-9);
    }
  });

  test("refuses a column that says nothing new, names it, and stands as before", () => {
    const { columns, response } = drawn(8);
    const twice = columns[2]!.map((value) => 4 - value);
    const live = openLiveFit(accumulateMoments([...columns, twice, response]), [1, 2]);
    const before = live.answer();
    expect(() => live.switchColumns([5, 8])).toThrowError(
      expect.objectContaining({ code: "rankDeficient", columns: [8] }),
    );
    expect(live.answer().columns).toEqual([1, 2]);
    for (const [at, slope] of live.answer().slopes.entries()) near(slope, before.slopes[at]!, 13);
    expect(() => live.switchColumns([9])).toThrowError(expect.objectContaining({ code: "shape", columns: [9] }));
  });

  test("without residual degrees of freedom there is no spread", () => {
    const { columns, response } = drawn(9);
    const few = [0, 3].map((j) => columns[j]!.slice(0, 3));
    const answer = openLiveFit(accumulateMoments([...few, response.slice(0, 3)]), [0, 1]).answer();
    expect(answer.residualStandardError).toBeNull();
    expect(answer.standardErrors.every((error) => Number.isNaN(error))).toBe(true);
  });
});
