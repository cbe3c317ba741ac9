/**
 * Do the latest sales follow the model of the earlier ones? Chow's forecast test (1960): the sales of the last sixth of the period
 * against a fit of all before, F = ((S − S₁)/a)/(S₁/b), S and S₁ the residual sums of squares of all and of the earlier sales.
 * Attributes and levels that only the late sales have are theirs alone, p − p₁ columns: a = n₂ − (p − p₁), b = n₁ − p₁.
 */
import { type Column, rowsOf } from "../../numerics/column.ts";
import { fUpperTail } from "../../numerics/fDistribution.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import type { Design, Fit } from "../fit.ts";
import { columnsOf, type Diagnostic, verdictOf } from "./diagnostic.ts";

/** Common practice, no source. */
const LAST_PART = 1 / 6;

/** Latest sales that spread by less than a tenth more (√1.2) are near enough. Common practice, no source. */
const SMALL_RATIO = 1.2;

export const forecast: Diagnostic = {
  code: "forecast",
  label: "Latest sales",
  needs: 3,
  underWeights: false,
  run: (fit) => {
    const { solution, design } = fit;
    const early = earlyRows(design);
    if (early === design.n || early === 0) return "All sales are of one day, so there are no latest ones.";
    const before = earlyFit(fit, early);
    if (before === null) return "The sales before the last sixth of the period are too few for the model.";
    const late = design.n - early - (solution.rank - before.rank);
    if (late < 1) return "The latest sales are needed for what only they have, and nothing is left to test.";
    const gained = Math.max(0, solution.residualSumOfSquares - before.residualSumOfSquares);
    const statistic = gained / late / (before.residualSumOfSquares / before.residualDf);
    const p = fUpperTail(statistic, late, before.residualDf);
    return {
      statistic,
      df: [late, before.residualDf],
      p,
      verdict: verdictOf(p, statistic < SMALL_RATIO),
      sentence:
        p < 0.05
          ? `The ${design.n - early} sales of the last sixth of the period lie further from a model of the earlier sales than chance allows: what items fetch has changed.`
          : `The ${design.n - early} sales of the last sixth of the period agree with a model of the earlier ones.`,
      whatToDo:
        p < 0.05
          ? "Let recent sales count more, start the evidence later, or give the market movement more freedom."
          : "Nothing.",
      source: "Chow 1960",
    };
  },
};

/** Rows before the last sixth of the period; the design's rows are in the order sold. */
function earlyRows({ soldOn, n }: Design): number {
  const cut = soldOn[n - 1]! - LAST_PART * (soldOn[n - 1]! - soldOn[0]!);
  const first = soldOn.findIndex((day) => day > cut);
  return first < 0 ? n : first;
}

/** A fit of the first rows, without the columns that say nothing there; null when the rows are too few. */
function earlyFit(fit: Fit, early: number): LeastSquaresSolution | null {
  let columns = columnsOf(fit).map((column) => rowsOf(column, 0, early));
  const response = fit.design.response.subarray(0, early);
  while (early > columns.length + 1) {
    try {
      const solution = solveLeastSquares(columns, response, { intercept: true });
      return solution.residualSumOfSquares > 0 ? solution : null;
    } catch (cause) {
      const kept: Column[] = columns.filter((_, j) => !(cause instanceof NumericsError && cause.columns.includes(j)));
      if (kept.length === columns.length) throw cause;
      columns = kept;
    }
  }
  return null;
}
