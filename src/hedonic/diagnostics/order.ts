/**
 * Are sales near in time alike in what the model leaves over? d = Σ(e_t − e_t−1)²/Σe² in the order sold (Durbin & Watson 1950);
 * 2 when there is nothing. P(D ≤ d) by the beta distribution on 0 … 4 with the exact mean and variance of D under this design
 * (Durbin & Watson 1951, 1971): with A the differences' matrix, M the residuals' and m = n − p,
 * E = tr(MA)/m, Var = 2(tr(MAMA) − m·E²)/(m(m + 2)).
 */

import type { Moments } from "../../numerics/accumulateMoments.ts";
import { type Column, numbersOf, rowsOf } from "../../numerics/column.ts";
import { fUpperTail } from "../../numerics/fDistribution.ts";
import type { Fit } from "../fit.ts";
import { columnsOf, type Diagnostic, momentsOfMade, product, verdictOf } from "./diagnostic.ts";

export const order: Diagnostic = {
  code: "order",
  label: "Order in time",
  needs: 3,
  underWeights: false,
  run: (fit) => {
    const { residuals, residualSumOfSquares } = fit.solution;
    let changes = 0;
    for (let t = 1; t < residuals.length; t++) changes += (residuals[t]! - residuals[t - 1]!) ** 2;
    const statistic = changes / residualSumOfSquares;
    const { mean, variance } = expectedOrder(fit);
    const p = betaTail(statistic / 4, mean / 4, variance / 16);
    return {
      statistic,
      df: [],
      p,
      // 1 − d/2 is about the correlation of neighbours.
      verdict: verdictOf(p, 1 - statistic / 2 < 0.1),
      sentence:
        p < 0.05
          ? "Sales near in time lie on the same side of the model more often than chance allows: prices move in a way that the model does not follow."
          : "Sales near in time are not more alike than others.",
      whatToDo:
        p < 0.05
          ? "Give the market movement more freedom: quarters or a curve in place of a line or none."
          : "Nothing.",
      source: "Durbin & Watson 1950, 1951; p by a beta distribution with the exact mean and variance",
    };
  },
};

/** P(B ≤ x) of the beta distribution on 0 … 1 with this mean and variance: an upper tail of F (Abramowitz & Stegun 26.6.2). */
function betaTail(x: number, mean: number, variance: number): number {
  const sum = (mean * (1 - mean)) / variance - 1;
  const [a, b] = [sum * mean, sum * (1 - mean)];
  return x >= 1 ? 1 : fUpperTail((a * (1 - x)) / (b * x), 2 * b, 2 * a);
}

/**
 * Mean and variance of D. tr(MA) = tr A − tr(C⁻¹X′AX) and tr(MAMA) = tr A² − 2tr(C⁻¹X′A²X) + tr((C⁻¹X′AX)²), where X′AX is
 * of the columns' first differences and A²'s of the differences of those; the ones drop out, for A1 = 0. tr A = 2(n − 1) and
 * tr A² = 6n − 8.
 */
export function expectedOrder(fit: Fit): { mean: number; variance: number } {
  const { design, solution } = fit;
  const columns = columnsOf(fit);
  const k = columns.length;
  const n = design.n;
  const first = momentsOfMade(n - 1, (start, size) => columns.map((column) => differences(column, start, size)));
  const second = momentsOfMade(n, (start, size) => columns.map((column) => bendings(column, n, start, size)));
  const turned = timesInverse(first, solution.inverse, k);
  const twice = timesInverse(second, solution.inverse, k);
  let trace = 0;
  let square = 0;
  let traceOfTwice = 0;
  for (let a = 0; a < k; a++) {
    trace += turned[a * k + a]!;
    traceOfTwice += twice[a * k + a]!;
    for (let b = 0; b < k; b++) square += turned[a * k + b]! * turned[b * k + a]!;
  }
  const m = solution.residualDf;
  const mean = (2 * (n - 1) - trace) / m;
  return { mean, variance: (2 * (6 * n - 8 - 2 * traceOfTwice + square - m * mean ** 2)) / (m * (m + 2)) };
}

/** x_t+1 − x_t. */
function differences(column: Column, start: number, size: number): Float64Array {
  const x = numbersOf(rowsOf(column, start, start + size + 1));
  const result = new Float64Array(size);
  for (let t = 0; t < size; t++) result[t] = x[t + 1]! - x[t]!;
  return result;
}

/** (Ax)_t = (x_t − x_t−1) − (x_t+1 − x_t), with no difference beyond either end. */
function bendings(column: Column, n: number, start: number, size: number): Float64Array {
  const from = Math.max(0, start - 1);
  const x = numbersOf(rowsOf(column, from, Math.min(n, start + size + 1)));
  const result = new Float64Array(size);
  for (let at = 0, t = start - from; at < size; at++, t++) {
    const before = t > 0 ? x[t]! - x[t - 1]! : 0;
    result[at] = before - (t + 1 < x.length ? x[t + 1]! - x[t]! : 0);
  }
  return result;
}

function timesInverse(moments: Moments, inverse: Float64Array, k: number): Float64Array {
  const result = new Float64Array(k * k);
  for (let a = 0; a < k; a++)
    for (let b = 0; b < k; b++)
      for (let c = 0; c < k; c++) result[a * k + b]! += inverse[a * k + c]! * product(moments, c, b);
  return result;
}
