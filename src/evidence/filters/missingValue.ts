/**
 * A value that the reference set needs is missing, or has no logarithm. The whole reference set is asked, included or
 * not, so that every attribute set is judged on the same sales.
 */
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import { lowerStart } from "../../domain/format.ts";
import { type EvidenceFilterRule, type FilterContext, salesWords } from "./filter.ts";

function labelOf({ assetClass }: FilterContext, key: string): string {
  return assetClass.attributes.find((attribute) => attribute.key === key)?.label ?? key;
}

export const valueMissing: EvidenceFilterRule = {
  reason: "value-missing",
  out: ({ sales, model }, at) => {
    for (const { key } of model.attributes) {
      if (key !== CHANNEL_KEY && !Number.isFinite(sales.values[key]?.[at] ?? Number.NaN)) return key;
    }
    return null;
  },
  sentence: (count, detail, context) => `${salesWords(count)} without ${lowerStart(labelOf(context, detail))}.`,
};

export const noLogarithm: EvidenceFilterRule = {
  reason: "no-logarithm",
  out: (context, at) => {
    const { sales, model, assetClass } = context;
    for (const { key, form } of model.attributes) {
      if (form !== "ln") continue;
      const built = assetClass.attributes.find((attribute) => attribute.key === key)?.kind === "built";
      const value = sales.values[key]?.[at] ?? Number.NaN;
      if (built ? sales.soldOn[at]! - value <= 0 : value <= 0) return key;
    }
    return model.response === "lnPrice" && !(sales.price[at]! > 0) ? "price" : null;
  },
  sentence: (count, detail, context) =>
    `${salesWords(count)} with ${lowerStart(labelOf(context, detail))} of zero or less, which has no logarithm.`,
};
