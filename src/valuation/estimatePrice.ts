/**
 * The subject's price with its ranges. ŷ₀ = ȳ + Σ b_j(x₀j − x̄_j); h₀ = 1/n + d′C⁻¹d.
 * Range for the average: ŷ₀ ± t·s·√h₀; range for one sale: ŷ₀ ± t·s·√(1 + h₀) (Montgomery, Peck & Vining 2012, §3.5).
 * After ln the ends are e^ends: exact for the median; the mean beside it by smearing (Duan 1983).
 */
import type { PriceEstimate, Range } from "../domain/appraisal.ts";
import type { Day } from "../domain/day.ts";
import type { FitErrors } from "../hedonic/errorRules/errors.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { smearingOf } from "../hedonic/reportModel.ts";
import { quadraticForm } from "../numerics/leverages.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";

/** Contribution of one group on the response's scale: Σ b(x₀ − x̄). */
export function contributionOf(fit: Fit, row: SubjectRow, group: AttributeGroup): number {
  return group.columns.reduce((sum, index) => {
    const at = fit.columns.indexOf(index);
    return sum + fit.solution.slopes[at]! * (row.x[index]! - fit.solution.means[at]!);
  }, 0);
}

/** Groups in the order in which the price is built up: market movement and channel first, then as the model has them. */
export function builtUpOrder(fit: Fit): readonly AttributeGroup[] {
  const rank = (group: AttributeGroup) => (group.isMarket ? 0 : group.key === "channel" ? 1 : 2);
  return [...fit.groups].sort((a, b) => rank(a) - rank(b));
}

/** h₀ of the subject. */
export function subjectLeverage(fit: Fit, row: SubjectRow): number {
  const d = Float64Array.from(fit.columns, (index, at) => row.x[index]! - fit.solution.means[at]!);
  return 1 / fit.solution.weightSum + quadraticForm(fit.solution.rootInverse, d);
}

/** Without residual degrees of freedom there are no ranges: the lists are empty and the standard error null. */
/** With `errors` the range for the average follows their rule; without, an even spread. */
export function estimatePrice(
  fit: Fit,
  row: SubjectRow,
  levels: readonly number[],
  heldAt: Day | null,
  errors: FitErrors | null = null,
): PriceEstimate {
  const { solution, design } = fit;
  const fitted = builtUpOrder(fit).reduce((sum, group) => sum + contributionOf(fit, row, group), solution.responseMean);
  const leverage = subjectLeverage(fit, row);
  const isLn = design.responseForm === "lnPrice";
  const back = isLn ? Math.exp : (value: number) => value;
  const s = solution.residualStandardError;
  const ranges = (standardError: number, df: number): Range[] =>
    levels.map((level) => {
      const half = tUpperQuantile((1 - level) / 2, df) * standardError;
      return { level, low: back(fitted - half), high: back(fitted + half) };
    });
  const averageError =
    errors === null
      ? (s ?? 0) * Math.sqrt(leverage)
      : Math.sqrt(errors.varianceOfAverage(Float64Array.from(fit.columns, (index) => row.x[index]!)));
  return {
    centre: isLn ? "median" : "mean",
    amount: back(fitted),
    meanAmount: isLn ? Math.exp(fitted) * smearingOf(solution.residuals) : fitted,
    fitted,
    standardErrorOfAverage: s === null ? null : averageError,
    leverage,
    rangeForOneSale: s === null ? [] : ranges(s * Math.sqrt(1 + leverage), solution.residualDf),
    rangeForAverage: s === null ? [] : ranges(averageError, errors?.df ?? solution.residualDf),
    // Σ w_i² = h₀ for least squares, so the price rests on 1/h₀ equal sales.
    effectiveSales: 1 / leverage,
    marketHeldAt: heldAt,
  };
}
