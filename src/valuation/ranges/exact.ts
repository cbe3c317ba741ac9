/** Range for one sale by Student's t: ŷ₀ ± t·s·√(1 + h₀) (Montgomery, Peck & Vining 2012, §3.5), worked out in estimatePrice.ts. */
import { estimatePrice } from "../estimatePrice.ts";
import { type RangeRule, whatIsHeld, withoutRanges } from "./rangeRule.ts";

export const exact: RangeRule = (fit, row, levels) => {
  if (fit.solution.residualStandardError === null)
    return withoutRanges(
      "exact",
      "There are no more sales than coefficients, so nothing is left to measure a range by.",
    );
  const isPlain = whatIsHeld(fit.rule) === null;
  return {
    kind: "exact",
    ranges: estimatePrice(fit, row, levels, null).rangeForOneSale,
    sentence: isPlain
      ? "The range takes the distances from the model as normal and equally wide for all items."
      : "The range takes the distances from the model as normal and equally wide, and the weights and penalties of the fit as beside the point; it is not exact.",
    guarantee: isPlain
      ? "If distances are normal and equally wide, the range holds the next sale exactly as often as asked."
      : null,
  };
};
