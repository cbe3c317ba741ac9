/** The estimators a price model may use. */
import type { Estimator } from "../../domain/priceModel.ts";
import type { AttributeGroup, Design } from "../fit.ts";
import type { Estimate, EstimatorRule } from "./estimator.ts";
import { huber } from "./huber.ts";
import { leastSquares } from "./leastSquares.ts";
import { mm } from "./mm.ts";
import { groundOf } from "./partialPooling.ts";
import { ridge } from "./ridge.ts";

export const ESTIMATORS: { readonly [Kind in Estimator["kind"]]: EstimatorRule<Kind> } = {
  leastSquares,
  huber,
  mm,
  ridge,
};

/**
 * Weights and penalties for these groups of the design, and what to say of them. Pooled choices come first, then the estimator.
 * Refuses (AppError, family "fit"): too few sales; columns that depend on each other; an MM search that does not settle.
 */
export function estimate(
  design: Design,
  groups: readonly AttributeGroup[],
  estimator: Estimator = { kind: "leastSquares" },
): Estimate {
  return estimateBy(estimator.kind, design, groups, estimator);
}

/** Ties the kind to its own settings, which a lookup by a union would lose. */
function estimateBy<Kind extends Estimator["kind"]>(
  kind: Kind,
  design: Design,
  groups: readonly AttributeGroup[],
  setting: Estimator,
): Estimate {
  return ESTIMATORS[kind].estimate(
    design,
    groups,
    setting as Extract<Estimator, { kind: Kind }>,
    groundOf(design, groups),
  );
}
