/**
 * Ranges for m items together. Their errors share the coefficients: covariance V = s²(I + H), H_ab = 1/W + d_a′C⁻¹d_b with
 * d = x₀ − x̄ (Montgomery, Peck & Vining 2012, §3.5, m new observations at points of their own). The average of the m has variance
 * 1′V1/m², exact under normal errors for least squares with equal weights. After ln the average is one of logarithms: the
 * geometric mean, as exact. A sum of prices has no exact range then: it is taken as lognormal with the mean and variance that the
 * lognormal prices' sum has (Fenton 1960), which for one item is its exact range again.
 */
import type { Range } from "../domain/appraisal.ts";
import type { Fit, SubjectRow } from "../hedonic/fit.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";

export interface JointRange {
  /** Average price; of a model of ln price the geometric mean, as a median. */
  readonly average: number;
  readonly rangesOfAverage: readonly Range[];
  /** Of a model of ln price the median of the sum. */
  readonly sum: number;
  readonly rangesOfSum: readonly Range[];
  readonly sentence: string;
}

/** One or more items; null under weights or a penalty, or without residual degrees of freedom. O(m²k + mk²). */
export function jointRange(fit: Fit, items: readonly SubjectRow[], levels: readonly number[]): JointRange | null {
  const { solution, design, rule } = fit;
  const [m, s] = [items.length, solution.residualStandardError];
  if (m === 0 || s === null || rule.weights !== null || rule.penalty !== null) return null;
  const fitted = items.map(({ x }) =>
    fit.columns.reduce(
      (sum, index, j) => sum + solution.slopes[j]! * (x[index]! - solution.means[j]!),
      solution.responseMean,
    ),
  );
  const covariance = covarianceOf(fit, items, s);
  const average = fitted.reduce((sum, one) => sum + one, 0) / m;
  const error = Math.sqrt(covariance.reduce((sum, one) => sum + one, 0)) / m;
  const ranges = (centre: number, spread: number, back: (value: number) => number): Range[] =>
    levels.map((level) => {
      const half = tUpperQuantile((1 - level) / 2, solution.residualDf) * spread;
      return { level, low: back(centre - half), high: back(centre + half) };
    });
  if (design.responseForm === "lnPrice") {
    const sum = lognormalSum(fitted, covariance);
    return {
      average: Math.exp(average),
      rangesOfAverage: ranges(average, error, Math.exp),
      sum: Math.exp(sum.centre),
      rangesOfSum: ranges(sum.centre, sum.spread, Math.exp),
      sentence:
        "If distances from the model are normal, the range of the average holds the geometric mean of the prices as often as asked; the sum is a median too, more than the single medians added, and its range an approximation, as if a sum of prices had the shape that one price has.",
    };
  }
  return {
    average,
    rangesOfAverage: ranges(average, error, (value) => value),
    sum: m * average,
    rangesOfSum: ranges(m * average, m * error, (value) => value),
    sentence: "If distances from the model are normal, each range holds the average, and the sum, as often as asked.",
  };
}

/** V, m × m row-major; H_ab as the product of T′d_a and T′d_b, C⁻¹ = TT′. */
function covarianceOf({ solution, columns }: Fit, items: readonly SubjectRow[], s: number): Float64Array {
  const { rootInverse, means, weightSum } = solution;
  const k = columns.length;
  const m = items.length;
  const turned = items.map(({ x }) => {
    const t = new Float64Array(k);
    columns.forEach((index, a) => {
      const d = x[index]! - means[a]!;
      for (let b = 0; b < k; b++) t[b] = t[b]! + rootInverse[a * k + b]! * d;
    });
    return t;
  });
  return Float64Array.from({ length: m * m }, (_, at) => {
    const [a, b] = [Math.floor(at / m), at % m];
    const shared = turned[a]!.reduce((sum, one, j) => sum + one * turned[b]![j]!, 1 / weightSum);
    return s * s * (shared + (a === b ? 1 : 0));
  });
}

/** The ln of the sum: E Σ = Σ e^(μ + V/2), Var Σ = ΣΣ E_a E_b (e^V_ab − 1); σ² = ln(1 + Var/E²), μ = ln E − σ²/2. */
function lognormalSum(fitted: readonly number[], covariance: Float64Array): { centre: number; spread: number } {
  const m = fitted.length;
  // Taken relative to the largest, so that no price is too large for exp.
  const top = Math.max(...fitted);
  const means = fitted.map((mu, a) => Math.exp(mu - top + covariance[a * m + a]! / 2));
  const mean = means.reduce((sum, one) => sum + one, 0);
  let variance = 0;
  for (let a = 0; a < m; a++)
    for (let b = 0; b < m; b++) variance += means[a]! * means[b]! * Math.expm1(covariance[a * m + b]!);
  const square = Math.log1p(variance / mean ** 2);
  return { centre: top + Math.log(mean) - square / 2, spread: Math.sqrt(square) };
}
