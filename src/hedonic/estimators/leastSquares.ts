/** Least squares at the recency weights: every sale counts by its weight and nothing is drawn anywhere. */
import { type EstimatorRule, NO_EXTRAS, sentences } from "./estimator.ts";

export const leastSquares: EstimatorRule<"leastSquares"> = {
  label: "least squares",
  about: "Makes the squared residuals least; the best choice when no sale is out of line.",
  estimate(_design, _groups, _setting, { rule, pooled, sentence }) {
    const isPlain = rule.weights === null && pooled.length === 0;
    const found = rule.weights === null ? "Every sale counts alike." : "Sales count by how recent they are.";
    return {
      rule,
      scale: null,
      iterations: 0,
      sentence: sentences(`Least squares. ${found}`, sentence),
      exactRange: isPlain,
      whichRange: whichRange(rule.weights !== null, pooled.length > 0),
      extras: { ...NO_EXTRAS, pooled },
    };
  },
};

function whichRange(isWeighted: boolean, isPooled: boolean): string {
  if (isPooled) {
    return "Pooled levels are drawn towards their mean, so the t range is not exact; the jackknife+ range asks for no such thing.";
  }
  if (isWeighted) {
    return "Recency weights are a preference, not a precision, so the t range is not exact; the jackknife+ range asks for no such thing.";
  }
  return "The t range for one sale is exact when residuals are normal and spread evenly.";
}
