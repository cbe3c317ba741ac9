/** What the checks of a fit have in common. A check holds for least squares with equal weights and no penalty. */
import type { Diagnosis, Verdict } from "../../domain/diagnosis.ts";
import type { Column } from "../../numerics/column.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import type { Fit } from "../fit.ts";

export interface Diagnostic {
  readonly code: Diagnosis["code"];
  /** Residual degrees of freedom that the check needs. */
  readonly needs: number;
  readonly run: (fit: Fit) => Diagnosis;
}

/** Common practice, no source: below 1 in 100 trouble, below 1 in 20 a look. */
export function verdictOf(p: number): Verdict {
  return p < 0.01 ? "trouble" : p < 0.05 ? "look" : "fine";
}

export function columnsOf(fit: Fit): Column[] {
  return fit.columns.map((index) => fit.design.columns[index]!.values);
}

/** ŷ less its mean, over its standard deviation: powers of it keep apart in floating point. */
export function standardisedFitted({ design, solution }: Fit): Float64Array {
  const centred = design.response.map((y, i) => y - solution.residuals[i]! - solution.responseMean);
  const spread = Math.sqrt(centred.reduce((sum, value) => sum + value * value, 0) / design.n);
  return centred.map((value) => value / spread);
}

/** n·R² of the squared residuals on columns (Koenker 1981). */
export function explainedSquares(columns: readonly Column[], { residuals }: LeastSquaresSolution): number {
  const squares = residuals.map((e) => e * e);
  const { residualSumOfSquares, totalSumOfSquares } = solveLeastSquares([...columns], squares, {
    intercept: true,
  });
  return squares.length * (1 - residualSumOfSquares / totalSumOfSquares);
}
