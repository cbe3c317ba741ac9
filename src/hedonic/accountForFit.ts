/** What a fit supposes and how it was come by: the errors that its ranges rest on, and the account that screen and sheet print. */
import type { FitAccount } from "../domain/appraisal.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { FitErrors } from "./errorRules/errors.ts";
import { errorsOf } from "./errorRules/index.ts";
import type { Estimate } from "./estimators/estimator.ts";
import type { Fit } from "./fit.ts";

/** Sales that a robust estimate counts for less than this are listed. */
const HALF = 0.5;
const LISTED = 20;

/**
 * Errors under the model's rule; null where least squares at an even spread says the same. Refuses (AppError, family "fit")
 * what the rule refuses; without residual degrees of freedom there are no errors and nothing is refused.
 */
export function errorsFor(
  { errors = { kind: "even" } }: PriceModel,
  fit: Fit,
  { extras }: Estimate,
  sources: SaleColumns["sources"],
): FitErrors | null {
  const isPlain = errors.kind === "even" && fit.rule.weights === null && fit.rule.penalty === null;
  if (isPlain || fit.solution.residualDf <= 0) return null;
  return errorsOf(errors, fit, { curvature: extras.curvature, sources });
}

/** `sales` are those that the design was built from. */
export function accountForFit(
  { estimator = { kind: "leastSquares" } }: PriceModel,
  fit: Fit,
  { sentence, whichRange, extras }: Estimate,
  errors: FitErrors | null,
  sales: Pick<SaleColumns, "ids">,
): FitAccount {
  const { ridge, pooled, robustness } = extras;
  return {
    estimator: estimator.kind,
    sentence,
    errorsSentence: errors?.sentence ?? "Supposes that residuals spread evenly and that sales are independent.",
    errorsCaution: errors?.caution ?? null,
    errorsDf: errors?.df ?? (fit.solution.residualDf > 0 ? fit.solution.residualDf : null),
    whichRange,
    ridge:
      ridge === null
        ? null
        : {
            penalty: ridge.penalty,
            isChosen: ridge.isChosen,
            curve: ridge.curve.map(({ penalty, looError }) => ({ penalty, looError })),
          },
    pooled: pooled.map(({ key, label, levels }) => ({ key, label, levels })),
    countedLess: robustness === null ? [] : countedLess(fit, robustness, sales),
    notes: fit.design.notes,
  };
}

function countedLess(
  { design }: Fit,
  robustness: Float64Array,
  { ids }: Pick<SaleColumns, "ids">,
): FitAccount["countedLess"] {
  const order = Array.from(robustness.keys())
    .filter((i) => robustness[i]! < HALF)
    .sort((a, b) => robustness[a]! - robustness[b]! || a - b);
  return order.slice(0, LISTED).map((i) => ({ sale: ids[design.rows[i]!]!, weight: robustness[i]! }));
}
