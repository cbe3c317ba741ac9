/** Taken out by a person, with a reason, reversibly. */
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

export const setAside: EvidenceFilterRule = {
  reason: "set-aside",
  out: ({ sales }, at) => sales.setAsideReasons.at(at) ?? null,
  sentence: (count, detail) => `${salesWords(count)} set aside by a person: ${detail}.`,
};
