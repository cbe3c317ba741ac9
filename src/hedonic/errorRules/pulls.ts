/** How each sale of a fit pulls on it: what both the uneven and the clustered covariance are summed from. */
import { type Bread, breadOf, breadOfCurvature } from "../../numerics/clusterCovariance.ts";
import type { Column } from "../../numerics/column.ts";
import { inClassWords } from "../estimators/modelColumns.ts";
import type { Fit } from "../fit.ts";

export interface Pulls {
  readonly columns: readonly Column[];
  /** Of the fit itself, with its weights and penalties. */
  readonly own: Bread;
  /** Of the covariance: the curvature's for a robust estimate, else `own`. */
  readonly outer: Bread;
  /** w·e, n. */
  readonly scores: Float64Array;
  /** h, n, of the fit at its weights and penalties. */
  readonly leverages: Float64Array;
}

/** Refuses (AppError, family "fit") a robust estimate whose curvature does not carry a covariance. */
export function pullsOf(fit: Fit, curvature: Float64Array | null): Pulls {
  const { design, rule, solution } = fit;
  const columns = fit.columns.map((index) => design.columns[index]!.values);
  const own = breadOf(solution, rule.weights);
  const { weights, penalty } = rule;
  const raw = penalty && Float64Array.from(fit.columns, (index) => penalty[index]!);
  return {
    columns,
    own,
    outer: curvature ? inClassWords(design, fit.groups, () => breadOfCurvature(columns, curvature, raw)) : own,
    scores: weights === null ? solution.residuals : solution.residuals.map((e, i) => weights[i]! * e),
    leverages: fit.leverages,
  };
}
