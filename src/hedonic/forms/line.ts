/** Straight line: the value itself. */
import { formatNumber } from "../../domain/format.ts";
import { type AttributeFormRule, PLAIN } from "./form.ts";

export const line: AttributeFormRule = {
  label: "straight line",
  columns({ attribute, stored }) {
    const step = attribute?.step ?? 1;
    const unit = attribute?.kind === "built" ? (attribute.unit ?? "years") : (attribute?.unit ?? null);
    const decimals = Number.isInteger(step) ? 0 : (attribute?.decimals ?? 2);
    const named = unit === "years" && step === 1 ? "year" : unit;
    return {
      ...PLAIN,
      columns: [{ level: null, values: stored }],
      reference: null,
      step,
      stepWords: named === null ? formatNumber(step, decimals) : `${formatNumber(step, decimals)}\u00a0${named}`,
      unit,
      numbersAt: (value) => [Number(value)],
    };
  },
};
