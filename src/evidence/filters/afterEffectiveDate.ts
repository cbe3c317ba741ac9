/** Sold after the day the price speaks of: nobody could have known it then. */
import { dayOf } from "../../domain/day.ts";
import { formatDay } from "../../domain/format.ts";
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

export const afterEffectiveDate: EvidenceFilterRule = {
  reason: "after-effective-date",
  out: ({ sales, effectiveOn }, at) =>
    effectiveOn !== null && sales.soldOn[at]! > effectiveOn ? dayOf(effectiveOn) : null,
  sentence: (count, detail) => `${salesWords(count)} later than the effective date, ${formatDay(detail)}.`,
};
