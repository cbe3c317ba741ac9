/**
 * Range for one sale whose width follows the price: ln e² = γ₀ + γ₁·z, z = ln of the fitted price (Harvey 1976), so the variance of
 * a sale is proportional to v = e^(γ₁(z − z̄)). The model is fitted again with weights 1/v, and the range is
 * ŷ₀ ± t·s·√(v₀ + h₀) with that fit's ŷ₀, s and h₀. Harvey's test of γ₁ = 0: γ₁²·Σ(z − z̄)²/(π²/2), chi-squared with 1,
 * π²/2 being the variance of the ln of a chi-squared with 1.
 */
import { formatPercent } from "../../domain/format.ts";
import type { Fit } from "../../hedonic/fit.ts";
import { chiSquaredUpperTail } from "../../numerics/chiSquared.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import { tUpperQuantile } from "../../numerics/studentT.ts";
import { subjectLeverage } from "../estimatePrice.ts";
import { fittedAt, type RangeRule, toMoney, withoutRanges } from "./rangeRule.ts";

/** A distance below this share of s counts as this share: the ln of next to nothing says nothing of the spread. */
const LEAST_DISTANCE = 1e-3;
/** Below so many sales a spread that changes cannot be told from chance. Common practice, no source. */
const FEWEST = 30;

export const variance: RangeRule = (fit, row, levels) => {
  const reason = whyNot(fit);
  if (reason !== null) return withoutRanges("variance", reason);
  const lnPrices = lnFitted(fit);
  if (lnPrices === null)
    return withoutRanges(
      "variance",
      "The model gives a sale a price below zero, so the spread cannot follow the price.",
    );
  const change = changeOfSpread(fit, lnPrices);
  const at = lnPriceOf(fit, fittedAt(fit, row));
  if (at === null)
    return withoutRanges("variance", "The subject's price is below zero, so the spread cannot follow it.");
  const v = (z: number) => Math.exp(change.slope * (z - change.mean));
  const weighted = {
    ...fit,
    solution: refit(
      fit,
      lnPrices.map((z) => 1 / v(z)),
    ),
  };
  const fitted = fittedAt(weighted, row);
  const { residualStandardError, residualDf } = weighted.solution;
  const error = residualStandardError! * Math.sqrt(v(at) + subjectLeverage(weighted, row));
  const back = toMoney(fit);
  return {
    kind: "variance",
    ranges: levels.map((level) => {
      const half = tUpperQuantile((1 - level) / 2, residualDf) * error;
      return { level, low: back(fitted - half), high: back(fitted + half) };
    }),
    sentence: sentenceOf(change),
    guarantee:
      "If distances are normal and their spread follows the price as found here, the range holds the next sale about as often as asked.",
  };
};

function whyNot({ rule, solution, design }: Fit): string | null {
  if (rule.weights !== null || rule.penalty !== null)
    return "This range is worked out for least squares with equal weights and without a penalty only.";
  if (design.n < FEWEST) return `Fewer than ${FEWEST} sales cannot tell how the spread follows the price.`;
  return solution.residualSumOfSquares > 0 && solution.residualStandardError !== null
    ? null
    : "The model meets every sale exactly, so there is no spread to follow.";
}

function lnPriceOf({ design }: Fit, fitted: number): number | null {
  if (design.responseForm === "lnPrice") return fitted;
  return fitted > 0 ? Math.log(fitted) : null;
}

/** ln of the fitted price of every sale, n; null where one is not above zero. */
function lnFitted(fit: Fit): Float64Array | null {
  const { response } = fit.design;
  const z = response.map((y, i) => lnPriceOf(fit, y - fit.solution.residuals[i]!) ?? Number.NaN);
  return z.some(Number.isNaN) ? null : z;
}

interface ChangeOfSpread {
  /** γ₁: by how much the ln of the variance grows with the ln of the price. */
  readonly slope: number;
  readonly mean: number;
  readonly p: number;
}

function changeOfSpread({ solution }: Fit, z: Float64Array): ChangeOfSpread {
  const floor = LEAST_DISTANCE * solution.residualStandardError!;
  const mean = z.reduce((sum, one) => sum + one, 0) / z.length;
  let crossed = 0;
  let squared = 0;
  for (let i = 0; i < z.length; i++) {
    const d = z[i]! - mean;
    crossed += d * 2 * Math.log(Math.max(Math.abs(solution.residuals[i]!), floor));
    squared += d * d;
  }
  const slope = squared > 0 ? crossed / squared : 0;
  return { slope, mean, p: chiSquaredUpperTail((slope ** 2 * squared) / (Math.PI ** 2 / 2), 1) };
}

function refit({ design, columns }: Fit, weights: Float64Array): LeastSquaresSolution {
  const values = columns.map((index) => design.columns[index]!.values);
  return solveLeastSquares(values, design.response, { intercept: true, weights });
}

function sentenceOf({ slope, p }: ChangeOfSpread): string {
  const per = formatPercent(Math.abs(Math.exp((slope / 2) * Math.log(2)) - 1));
  const way = slope >= 0 ? "wider" : "narrower";
  const found = `The range is ${per} ${way} for an item of twice the price.`;
  return p < 0.05
    ? `${found} The spread changes with the price by more than chance allows, so this range applies.`
    : `${found} That may be chance: the range for an even spread serves as well.`;
}
