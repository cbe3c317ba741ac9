/** The error rules a price model may use: what each supposes is told with it. */
import type { ErrorRule } from "../../domain/priceModel.ts";
import type { Fit } from "../fit.ts";
import { clusteredErrors } from "./clustered.ts";
import type { ErrorContext, FitErrors } from "./errors.ts";
import { evenErrors } from "./even.ts";
import { unevenErrors } from "./uneven.ts";

/**
 * Covariance, standard errors and the variance of an average under the rule.
 * Refuses (AppError, family "fit"): no residual degrees of freedom; a sale alone of its kind (HC2, HC3); fewer than two clusters.
 */
export function errorsOf(
  rule: ErrorRule,
  fit: Fit,
  context: ErrorContext = { curvature: null, sources: null },
): FitErrors {
  if (rule.kind === "even") return evenErrors(fit, context);
  return rule.kind === "cluster" ? clusteredErrors(fit, rule.by, context) : unevenErrors(fit, rule.kind, context);
}
