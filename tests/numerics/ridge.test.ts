/** Ridge: its closed leave-one-out error against fits that do leave each row out, and its choice of penalty. */
import fc from "fast-check";
import { Matrix, solve } from "ml-matrix";
import { expect, test } from "vitest";
import { leverages } from "../../src/numerics/leverages.ts";
import { chooseRidgePenalty, ridgeErrors } from "../../src/numerics/ridge.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { publishedSales } from "../fixtures/publishedSales.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

interface Drawn {
  columns: Float64Array[];
  response: Float64Array;
  weights: Float64Array;
  scales: Float64Array;
}

function drawSales(seed: number, n: number, k: number): Drawn {
  const draw = drawFrom(seed);
  const columns = Array.from({ length: k }, (_, j) => Float64Array.from({ length: n }, () => 10 ** j * (draw() + j)));
  const response = Float64Array.from({ length: n }, (_, i) => columns.reduce((y, x) => y + x[i]! * draw(), 5 * draw()));
  const weights = Float64Array.from({ length: n }, () => 0.2 + draw());
  return { columns, response, weights, scales: Float64Array.from(columns, (_, j) => 0.3 * 10 ** j) };
}

/** The response at one row by the penalised normal equations of all the others, written out anew. */
function predictedWithout({ columns, response, weights, scales }: Drawn, out: number, penalty: number): number {
  const kept = [...response.keys()].filter((i) => i !== out);
  const x = new Matrix(kept.map((i) => [1, ...columns.map((column) => column[i]!)]));
  const weighted = new Matrix(kept.map((i) => [weights[i]!, ...columns.map((column) => weights[i]! * column[i]!)]));
  const left = weighted.transpose().mmul(x);
  for (const [j, scale] of scales.entries()) left.set(j + 1, j + 1, left.get(j + 1, j + 1) + penalty * scale ** 2);
  const right = weighted.transpose().mmul(Matrix.columnVector(kept.map((i) => response[i]!)));
  const b = solve(left, right).to1DArray();
  return columns.reduce((sum, column, j) => sum + b[j + 1]! * column[out]!, b[0]!);
}

test("the closed leave-one-out error is that of fits without each row", () => {
  const drawn = fc.tuple(fc.integer(), fc.integer({ min: 6, max: 14 }), fc.integer({ min: 1, max: 3 }));
  fc.assert(
    fc.property(drawn, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), ([seed, n, k], penalty) => {
      const sales = drawSales(seed, n, k);
      const { columns, response, weights, scales } = sales;
      const [found] = ridgeErrors(columns, response, scales, [penalty], { weights });
      let sum = 0;
      for (let i = 0; i < n; i++) sum += weights[i]! * (response[i]! - predictedWithout(sales, i, penalty)) ** 2;
      const total = weights.reduce((all, w) => all + w, 0);
      expect(found!.looError / Math.sqrt(sum / total)).toBeCloseTo(1, 7);
    }),
    { seed: 7, numRuns: 60 },
  );
});

test("without a penalty it is the leave-one-out error of least squares, on the published houses", () => {
  const { columns, lnPrice, expected } = publishedSales("houseprices");
  const [none] = ridgeErrors(columns, lnPrice, new Float64Array(columns.length).fill(1), [0]);
  const solution = solveLeastSquares(columns, lnPrice, { intercept: true });
  const h = leverages(columns, solution);
  const press = solution.residuals.reduce((sum, e, i) => sum + (e / (1 - h[i]!)) ** 2, 0);
  expect(none!.looError / Math.sqrt(press / lnPrice.length)).toBeCloseTo(1, 11);
  expect(none!.looError / Math.sqrt(expected.crossValidation.PRESS / lnPrice.length)).toBeCloseTo(1, 10);
  expect(none!.effectiveCount).toBeCloseTo(12, 9);
});

test("the chosen penalty is at least as good as any on a finer grid, and keeps three digits", () => {
  const { columns, lnPrice } = publishedSales("diamonds600");
  const scales = Float64Array.from(columns, (column) => {
    const mean = column.reduce((sum, x) => sum + x, 0) / column.length;
    return Math.sqrt(column.reduce((sum, x) => sum + (x - mean) ** 2, 0) / column.length);
  });
  const { best, curve } = chooseRidgePenalty(columns, lnPrice, scales);
  const finer = Array.from({ length: 300 }, (_, at) => 600 * 10 ** (-8 + at / 30));
  for (const { looError } of ridgeErrors(columns, lnPrice, scales, finer)) {
    expect(looError).toBeGreaterThanOrEqual(best.looError * (1 - 1e-6));
  }
  expect(Number(best.penalty.toPrecision(3))).toBe(best.penalty);
  expect(curve).toHaveLength(42);
  expect(curve[0]!.penalty).toBe(0);
});

test("responses that the columns say nothing of ask for a large penalty; too few rows are refused", () => {
  const draw = drawFrom(3);
  const columns = [0, 1, 2].map(() => Float64Array.from({ length: 40 }, () => draw()));
  const response = Float64Array.from({ length: 40 }, () => draw());
  const scales = Float64Array.from([0.3, 0.3, 0.3]);
  expect(chooseRidgePenalty(columns, response, scales).best.effectiveCount).toBeLessThan(2.5);
  const two = columns.map((column) => column.slice(0, 2));
  expect(() => chooseRidgePenalty(two, response.slice(0, 2), scales)).toThrow(
    expect.objectContaining({ code: "tooFewRows" }),
  );
});
