/**
 * What every error rule gives back: the covariance of a fit under what the rule supposes, from which coefficient ranges and the
 * range for an average follow. Symbols: n sales, k columns in the order of fit.columns, p = k + 1.
 */
import type { TextColumn } from "../../domain/sale.ts";
import { type FitCovariance, varianceAt } from "../../numerics/clusterCovariance.ts";
import type { Fit } from "../fit.ts";

export interface FitErrors {
  /** Of the slopes, k × k row-major. */
  readonly covariance: Float64Array;
  /** Of the slopes, k. */
  readonly standardErrors: Float64Array;
  readonly interceptStandardError: number;
  /** Degrees of freedom of the t that ranges take. */
  readonly df: number;
  /** What the rule supposes, and what the errors rest on here. */
  readonly sentence: string;
  /** What to keep in mind or do instead; null when there is nothing. */
  readonly caution: string | null;
  /** Variance of the average price (or ln price) at x₀, k raw column values: without the spread of a single sale. */
  readonly varianceOfAverage: (x: ArrayLike<number>) => number;
}

/** What the rules need beside the fit. */
export interface ErrorContext {
  /** Of a robust estimate (estimators, extras.curvature), n; null for all others. */
  readonly curvature: Float64Array | null;
  /** Where each sale of SaleColumns is from, in its own order; null when nobody clusters by source. */
  readonly sources: TextColumn | null;
}

export function errorsFrom(
  covariance: FitCovariance,
  df: number,
  sentence: string,
  caution: string | null = null,
): FitErrors {
  const { means, matrix } = covariance;
  const k = means.length;
  const slopes = new Float64Array(k * k);
  for (let a = 0; a < k; a++) for (let b = 0; b < k; b++) slopes[a * k + b] = matrix[(a + 1) * (k + 1) + b + 1]!;
  return {
    covariance: slopes,
    standardErrors: means.map((_, a) => Math.sqrt(slopes[a * k + a]!)),
    interceptStandardError: Math.sqrt(varianceAt(covariance, new Float64Array(k))),
    df,
    sentence,
    caution,
    varianceOfAverage: (x) => varianceAt(covariance, x),
  };
}

/** Sales that count at all. */
export function countedSales({ design, rule }: Fit): number {
  return rule.weights?.reduce((count, w) => count + (w > 0 ? 1 : 0), 0) ?? design.n;
}
