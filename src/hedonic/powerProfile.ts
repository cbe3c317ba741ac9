/**
 * Which power of the price the attributes add up on (Box & Cox 1964, numerics/powerProfile.ts), and a plain advice: the logarithm
 * when 0 lies in the interval, the price itself when 1 does, either when both do.
 */
import { formatNumber } from "../domain/format.ts";
import type { ResponseForm } from "../domain/priceModel.ts";
import { type PowerProfile, profilePower } from "../numerics/powerProfile.ts";
import { inClassWords, modelColumns } from "./estimators/modelColumns.ts";
import { groundOf } from "./estimators/partialPooling.ts";
import type { AttributeGroup, Design } from "./fit.ts";

export interface PowerAdvice extends PowerProfile {
  /** Null: both forms lie in the interval. The nearer one where neither does. */
  readonly advised: ResponseForm | null;
  readonly sentence: string;
}

/**
 * Least squares at the recency weights, whatever the model's own estimator. Penalties of pooled choices stay as they were found
 * on the model's own response. Refuses (AppError, family "fit") too few sales and dependent columns.
 */
export function advisePower(design: Design, groups: readonly AttributeGroup[]): PowerAdvice {
  const { rule } = groundOf(design, groups);
  const { values, penalty } = modelColumns(design, groups, rule);
  const profile = inClassWords(design, groups, () =>
    profilePower(values, design.prices, { weights: rule.weights, penalty }),
  );
  const holds = (power: number) => power >= (profile.low ?? -2) && power <= (profile.high ?? 2);
  const advised = adviceOf(holds(0), holds(1), profile.best);
  return { ...profile, advised, sentence: sentenceOf(profile, advised, holds(0) || holds(1)) };
}

function adviceOf(holdsLn: boolean, holdsPrice: boolean, best: number): ResponseForm | null {
  if (holdsLn && holdsPrice) return null;
  if (holdsLn || holdsPrice) return holdsLn ? "lnPrice" : "price";
  return best < 0.5 ? "lnPrice" : "price";
}

function sentenceOf({ best, low, high }: PowerProfile, advised: ResponseForm | null, isInside: boolean): string {
  const from = low === null ? "below \u22122" : formatNumber(low, 2);
  const to = high === null ? "above 2" : formatNumber(high, 2);
  const found = `The sales speak for the power ${formatNumber(best, 2)} of the price (95\u00a0%: ${from} to ${to}).`;
  if (advised === null)
    return `${found} The price and its logarithm are both within that: take the one that reads better.`;
  const name = advised === "lnPrice" ? "logarithm (0)" : "price itself (1)";
  const meaning = advised === "lnPrice" ? "effects in proportion" : "effects in money";
  if (isInside) return `${found} The ${name} is within that: ${meaning}.`;
  return `${found} Neither the price (1) nor its logarithm (0) is; the ${name} is nearer, with ${meaning}. Look at the forms of the attributes too.`;
}
