/**
 * What every estimator gives back. Members of this folder share one signature, so that a fit takes any of them: weights for the
 * sales and penalties for the columns (FitRule), with which least squares gives the estimator's own coefficients.
 */
import type { Estimator } from "../../domain/priceModel.ts";
import type { RidgePoint } from "../../numerics/ridge.ts";
import type { AttributeGroup, Design, FitRule } from "../fit.ts";

export interface Estimate {
  readonly rule: FitRule;
  /** The estimator's own measure of a usual residual, in response units; null where it has none besides s. */
  readonly scale: number | null;
  /** Steps to the fixed point; 0 for what is worked out in one go. */
  readonly iterations: number;
  /** What was done to these sales, in one to three sentences. */
  readonly sentence: string;
  /** Whether the t range for one sale is exact under this estimator (even, normal residuals supposed). */
  readonly exactRange: boolean;
  /** Which range can honestly be given, and why. */
  readonly whichRange: string;
  readonly extras: EstimateExtras;
}

export interface EstimateExtras {
  /** n: 1 = the sale counts in full, 0 = not at all; without the recency weights. Null unless the estimator is robust. */
  readonly robustness: Float64Array | null;
  /** n: weights of the inner matrix of a robust estimate's covariance (errorRules want it). */
  readonly curvature: Float64Array | null;
  readonly ridge: RidgeExtras | null;
  /** One per choice whose levels are partially pooled. */
  readonly pooled: readonly PooledChoice[];
}

export interface RidgeExtras {
  /** λ in sales: an attribute counts as if λ sales with no effect of it had been added. */
  readonly penalty: number;
  readonly isChosen: boolean;
  /** At λ. */
  readonly looError: number;
  /** Coefficients that are still free to follow the sales, the intercept included. */
  readonly effectiveCount: number;
  /** For a chart: λ from 0 upwards with its leave-one-out error; empty for a stated penalty. */
  readonly curve: readonly RidgePoint[];
}

export interface PooledChoice {
  readonly key: string;
  readonly label: string;
  /** λ = σ²/τ² in sales: a level with λ sales keeps half of its own difference from the mean. */
  readonly penalty: number;
  /** τ in response units; 0: the levels do not differ by more than chance. */
  readonly spread: number;
  readonly levels: readonly PooledLevel[];
}

/** Differences from the mean over the levels, in response units. */
export interface PooledLevel {
  readonly level: string;
  readonly sales: number;
  /** By least squares alone; null where the level cannot be told apart without pooling. */
  readonly before: number | null;
  readonly after: number;
}

/** What stands before an estimator begins: the recency weights and the penalties of pooled choices. */
export interface Ground {
  readonly rule: FitRule;
  readonly pooled: readonly PooledChoice[];
  /** λ of pooled choices as said to the reader; empty when none is pooled. */
  readonly sentence: string;
}

export interface EstimatorRule<Kind extends Estimator["kind"]> {
  readonly label: string;
  /** One plain sentence: what it is good for. */
  readonly about: string;
  readonly estimate: (
    design: Design,
    groups: readonly AttributeGroup[],
    setting: Extract<Estimator, { kind: Kind }>,
    ground: Ground,
  ) => Estimate;
}

export const NO_EXTRAS: EstimateExtras = { robustness: null, curvature: null, ridge: null, pooled: [] };

/** Sentences that stand, one after another. */
export function sentences(...parts: string[]): string {
  return parts.filter((part) => part !== "").join(" ");
}
