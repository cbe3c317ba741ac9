/** The model asks for verified sales and nobody has verified this one. */
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

export const notVerified: EvidenceFilterRule = {
  reason: "not-verified",
  out: ({ sales, model }, at) => (model.filter.verifiedOnly && sales.verified[at] !== 1 ? "not verified" : null),
  sentence: (count) => `${salesWords(count)} not verified, kept out by the filter.`,
};
