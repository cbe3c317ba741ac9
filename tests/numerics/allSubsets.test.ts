/**
 * All sets of attributes at once agree with a fit of each set by itself: sums of squares, prices, leverages, coefficients, and
 * errors out of sample by folds and one sale left out. Reference values: tests/reference/README.md (houseprices, diamonds600).
 */
import { describe, expect, test } from "vitest";
import { accumulateMoments, partsBy } from "../../src/numerics/accumulateMoments.ts";
import { allSubsets, isInSet } from "../../src/numerics/allSubsets.ts";
import { type Column, numbersOf } from "../../src/numerics/column.ts";
import { leverages, quadraticForm } from "../../src/numerics/leverages.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { foldErrors, generalisedErrors, leaveOneOutErrors } from "../../src/numerics/subsetErrors.ts";
import { drawFrom } from "../fixtures/randomClass.ts";
import { referenceSales, rowOf } from "../fixtures/referenceSales.ts";

/** 160 rows, seven columns that move together in four groups, weights of which some are zero. */
function drawn(seed: number) {
  const draw = drawFrom(seed);
  const n = 160;
  const base = Float64Array.from({ length: n }, () => draw() - 0.5);
  const columns = Array.from({ length: 7 }, (_, j) =>
    base.map((value) => 10 ** (j - 3) * (5 + (j % 3) * value + 0.6 * (draw() - 0.5))),
  );
  const response = base.map((value, i) => 40 + value + columns[6]![i]! / 4000 + draw());
  return {
    n,
    columns,
    response,
    groups: [[0], [2, 1], [3, 5, 4], [6]],
    weights: Float64Array.from({ length: n }, () => (draw() < 0.1 ? 0 : 0.2 + draw())),
    penalty: Float64Array.from({ length: 7 }, (_, j) => (3 + j) / 100 ** (j - 3)),
    subject: rowOf(columns, 3).map((value) => value * 1.01),
  };
}

function inside(groups: readonly (readonly number[])[], set: number): number[] {
  return groups.flatMap((columns, g) => (isInSet(set, g) ? [...columns] : []));
}

function near(found: number, expected: number, digits: number): void {
  expect(Math.abs(found - expected) / Math.max(1e-300, Math.abs(expected))).toBeLessThan(10 ** -digits);
}

describe.each([
  ["plain", false, false],
  ["with weights", true, false],
  ["with weights and penalties", true, true],
])("every set, %s", (_, isWeighted, isPenalised) => {
  const { n, columns, response, groups, subject, ...drawnRest } = drawn(41);
  const weights = isWeighted ? drawnRest.weights : undefined;
  const penalty = isPenalised ? drawnRest.penalty : undefined;
  const moments = accumulateMoments([...columns, response], { weights });
  const table = allSubsets(moments, groups, { subject, penalty, coefficients: true });

  function fitOf(set: number, counts = weights) {
    const at = inside(groups, set);
    const values: Column[] = at.map((j) => columns[j]!);
    const fit = solveLeastSquares(values, response, {
      intercept: true,
      ...(counts === undefined ? {} : { weights: counts }),
      ...(penalty === undefined ? {} : { penalty: Float64Array.from(at, (j) => penalty[j]!) }),
    });
    return { at, values, fit };
  }
  const price = (at: number[], fit: ReturnType<typeof fitOf>["fit"], x: Float64Array) =>
    at.reduce((sum, j, k) => sum + fit.slopes[k]! * x[j]!, fit.intercept!);

  test("has the sum of squares, price, leverage and coefficients of its own fit", () => {
    const total = moments.weightSum;
    for (let set = 0; set < 16; set++) {
      const { at, fit } = fitOf(set);
      const errors = fit.residuals.reduce((sum, e, i) => sum + (weights?.[i] ?? 1) * e * e, 0);
      near(table.residualSums[set]!, errors, 11);
      near(table.fitted![set]!, price(at, fit, subject), 11);
      const d = Float64Array.from(at, (j, k) => subject[j]! - fit.means[k]!);
      near(table.leverages![set]!, 1 / total + quadraticForm(fit.rootInverse, d), 10);
      for (const [k, j] of at.entries()) near(table.coefficients![set * 7 + j]!, fit.slopes[k]!, 9);
      expect(table.ranks[set]).toBe(at.length + 1);
      expect(columns.every((_, j) => at.includes(j) !== Number.isNaN(table.coefficients![set * 7 + j]))).toBe(true);
    }
  });

  test("errs on each fold as the fit of the other folds does", () => {
    const codes = Uint16Array.from({ length: n }, (_, i) => (i * 7) % 5);
    const errors = foldErrors(partsBy([...columns, response], codes, 6, weights), groups, { penalty });
    for (const set of [0, 3, 6, 13, 15]) {
      let sum = 0;
      for (let fold = 0; fold < 5; fold++) {
        const { at, fit } = fitOf(
          set,
          codes.reduce((kept, code, i) => {
            kept[i] = code === fold ? 0 : (weights?.[i] ?? 1);
            return kept;
          }, new Float64Array(n)),
        );
        codes.forEach((code, i) => {
          if (code === fold) sum += (weights?.[i] ?? 1) * (response[i]! - price(at, fit, rowOf(columns, i))) ** 2;
        });
      }
      near(errors[set]!, sum, 11);
    }
  });

  test("errs on each sale as the fit without that sale does", () => {
    const errors = leaveOneOutErrors(moments, columns, response, groups, { weights, penalty });
    for (const set of [0, 5, 15]) {
      let sum = 0;
      for (let i = 0; i < n; i++) {
        const counts = weights?.slice() ?? new Float64Array(n).fill(1);
        const weight = counts[i]!;
        counts[i] = 0;
        const { at, fit } = fitOf(set, counts);
        sum += weight * (response[i]! - price(at, fit, rowOf(columns, i))) ** 2;
      }
      near(errors[set]!, sum, 10);
    }
  });
});

describe("all sets of the reference sales", () => {
  test.each([
    ["houseprices", 1e-11],
    ["diamonds600", 1e-8],
  ] as const)("%s: leave-one-out error of the full set and R² of all", (name, tolerance) => {
    const { columns, response, groups, expected } = referenceSales(name);
    const moments = accumulateMoments([...columns, response]);
    const all = 2 ** groups.length - 1;
    const press = leaveOneOutErrors(moments, columns, response, groups)[all]!;
    expect(Math.abs(press / expected.crossValidation.PRESS - 1)).toBeLessThan(tolerance);
    const { r2, fitted, leverages } = allSubsets(moments, groups, {
      subject: Float64Array.from(
        expected.specification.columns.slice(1),
        (key: string) => expected.newRows[0].designRow[key],
      ),
    });
    expect(Math.abs(r2[all]! / expected.relativeImportance.sumsTo - 1)).toBeLessThan(tolerance);
    expect(Math.abs(fitted![all]! / expected.newRows[0].fitLog - 1)).toBeLessThan(tolerance);
    expect(Math.abs(leverages![all]! / expected.newRows[0].leverage - 1)).toBeLessThan(tolerance);
  });

  test("one sale left out equals the sum over leverages of a refined fit, for sets in between", () => {
    const { columns, response, groups } = referenceSales("houseprices");
    const press = leaveOneOutErrors(accumulateMoments([...columns, response]), columns, response, groups);
    for (const set of [1, 700, 1500, 2000]) {
      const kept = inside(groups, set).map((j) => columns[j]!);
      const fit = solveLeastSquares(kept, response, { intercept: true });
      const h = leverages(kept.map(numbersOf), fit);
      near(
        press[set]!,
        fit.residuals.reduce((sum, e, i) => sum + (e / (1 - h[i]!)) ** 2, 0),
        11,
      );
    }
  });
});

describe("what cannot be told apart is not made up", () => {
  const { columns, response } = drawn(7);
  const twice = [columns[0]!, columns[0]!.map((value) => 3 * value - 2), columns[1]!];
  const groups = [[0], [1], [2]];
  const moments = accumulateMoments([...twice, response]);

  test("a set with dependent columns has its R², but no price and no error out of sample", () => {
    const table = allSubsets(moments, groups, { subject: Float64Array.of(1, 1, 1) });
    near(table.residualSums[3]!, table.residualSums[1]!, 11);
    expect(table.ranks[3]).toBe(2);
    expect(table.fitted![3]).toBeNaN();
    expect(table.smallestPivots[3]).toBe(0);
    expect(Number.isFinite(table.fitted![5]!)).toBe(true);
    const press = leaveOneOutErrors(moments, twice, response, groups);
    expect([press[3], press[7]]).toEqual([Number.NaN, Number.NaN]);
    expect(Number.isFinite(press[6]!)).toBe(true);
  });

  test("a sale that is the only one of its kind makes the leave-one-out error unknown", () => {
    const only = Float64Array.from(response, (_, i) => (i === 5 ? 1 : 0));
    const press = leaveOneOutErrors(accumulateMoments([only, columns[0]!, response]), [only, columns[0]!], response, [
      [0],
      [1],
    ]);
    expect(press.map((error) => (Number.isNaN(error) ? 0 : 1))).toEqual(Float64Array.of(1, 0, 1, 0));
  });

  test("generalised cross-validation is n·RSS/(n − p)²", () => {
    const table = allSubsets(moments, groups);
    near(generalisedErrors(table, 160)[5]!, (160 * table.residualSums[5]!) / 157 ** 2, 14);
    expect(generalisedErrors(table, 3)[5]).toBeNaN();
  });

  test("columns named twice, unknown columns and too many groups are refused", () => {
    expect(() => allSubsets(moments, [[0], [0]])).toThrowError(
      expect.objectContaining({ code: "shape", columns: [0] }),
    );
    expect(() => allSubsets(moments, [[3]])).toThrowError(expect.objectContaining({ code: "shape", columns: [3] }));
    expect(() =>
      allSubsets(
        moments,
        Array.from({ length: 21 }, () => []),
      ),
    ).toThrowError(/at most 20/);
    expect(() => allSubsets(moments, [[1]], { subject: Float64Array.of(0, Number.NaN, 0) })).toThrowError(
      expect.objectContaining({ code: "notFinite", columns: [1] }),
    );
    expect(() => foldErrors([moments], groups)).toThrowError(expect.objectContaining({ code: "tooFewRows" }));
  });

  test("columns that are always in are in every set", () => {
    const pinned = allSubsets(moments, [[2]], { alwaysIn: [0] });
    const free = allSubsets(moments, groups);
    near(pinned.residualSums[0]!, free.residualSums[1]!, 12);
    near(pinned.residualSums[1]!, free.residualSums[5]!, 12);
  });
});
