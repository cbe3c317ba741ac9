/**
 * Ranges for m items together. Their errors share the coefficients: covariance s²(I + X₀C⁻¹X₀′), so the average of the m has
 * variance s²(1/m + 1/W + d̄′C⁻¹d̄), d̄ the mean of x₀ − x̄ over the items (Montgomery, Peck & Vining 2012, §3.5, m new
 * observations at points of their own). Exact under normal errors for least squares with equal weights.
 */
import type { Range } from "../domain/appraisal.ts";
import type { Fit } from "../hedonic/fit.ts";
import { quadraticForm } from "../numerics/leverages.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";

export interface JointRange {
  /** Average price; of a model of ln price the geometric mean, as a median. */
  readonly average: number;
  readonly rangesOfAverage: readonly Range[];
  /** Null for a model of ln price, where a sum of prices has no exact range. */
  readonly sum: number | null;
  readonly rangesOfSum: readonly Range[];
  readonly sentence: string;
}

/** Items in the order of fit.columns, one or more; null under weights or a penalty, or without residual degrees of freedom. */
export function jointRange(fit: Fit, items: readonly Float64Array[], levels: readonly number[]): JointRange | null {
  const { solution, design, rule } = fit;
  const [m, s] = [items.length, solution.residualStandardError];
  if (m === 0 || s === null || rule.weights !== null || rule.penalty !== null) return null;
  const d = solution.means.map((mean, j) => items.reduce((sum, x) => sum + (x[j]! - mean), 0) / m);
  const fitted = solution.slopes.reduce((sum, b, j) => sum + b * d[j]!, solution.responseMean);
  const error = s * Math.sqrt(1 / m + 1 / solution.weightSum + quadraticForm(solution.rootInverse, d));
  const isLn = design.responseForm === "lnPrice";
  const back = isLn ? Math.exp : (value: number) => value;
  const rangesOfAverage = levels.map((level): Range => {
    const half = tUpperQuantile((1 - level) / 2, solution.residualDf) * error;
    return { level, low: back(fitted - half), high: back(fitted + half) };
  });
  return {
    average: back(fitted),
    rangesOfAverage,
    sum: isLn ? null : m * fitted,
    rangesOfSum: isLn ? [] : rangesOfAverage.map(({ level, low, high }) => ({ level, low: m * low, high: m * high })),
    sentence: isLn
      ? "The range holds the geometric mean of the prices at the level stated, if distances from the model are normal."
      : "The range holds the average, and the other one the sum, at the level stated, if distances from the model are normal.",
  };
}
