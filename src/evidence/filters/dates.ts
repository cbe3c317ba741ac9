/** Sold before or after the span of days that the model looks at. */
import { type Day, dayNumber } from "../../domain/day.ts";
import { formatDay } from "../../domain/format.ts";
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

function numberOf(day: Day | null): number | null {
  return day === null ? null : dayNumber(day);
}

export const tooEarly: EvidenceFilterRule = {
  reason: "too-early",
  out: ({ sales, model }, at) => {
    const from = numberOf(model.filter.soldFrom);
    return from !== null && sales.soldOn[at]! < from ? model.filter.soldFrom : null;
  },
  sentence: (count, detail) => `${salesWords(count)} sold before ${formatDay(detail)}, kept out by the filter.`,
};

export const tooLate: EvidenceFilterRule = {
  reason: "too-late",
  out: ({ sales, model }, at) => {
    const to = numberOf(model.filter.soldTo);
    return to !== null && sales.soldOn[at]! > to ? model.filter.soldTo : null;
  },
  sentence: (count, detail) => `${salesWords(count)} sold after ${formatDay(detail)}, kept out by the filter.`,
};
