/** Sold through a channel that the model does not take in. */
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

export const channel: EvidenceFilterRule = {
  reason: "channel",
  out: ({ sales, model }, at) => {
    const own = sales.channels.at(at)!;
    return model.filter.channels === null || model.filter.channels.includes(own) ? null : own;
  },
  sentence: (count, detail) =>
    detail === "asking"
      ? `${count} asking ${count === 1 ? "price" : "prices"}, kept out by the filter.`
      : `${salesWords(count)} through ${detail}, kept out by the filter.`,
};
