/**
 * Choice: one 0/1 column for each level that occurs in the evidence, but for the reference level.
 * Reference = the stated one if it occurs, else the most frequent (ties: the earlier in the attribute's list).
 */
import { indicator } from "../../numerics/column.ts";
import type { AttributeFormRule } from "./form.ts";

export const choice: AttributeFormRule = {
  label: "choice",
  columns({ stored, levels, reference }) {
    const counts = new Array<number>(levels.length).fill(0);
    for (const level of stored) counts[level]! += 1;
    const present = levels.map((_, at) => at).filter((at) => counts[at]! > 0);
    const stated = reference === null ? -1 : levels.indexOf(reference);
    const base =
      stated >= 0 && counts[stated]! > 0
        ? stated
        : present.reduce((best, at) => (counts[at]! > counts[best]! ? at : best), present[0] ?? -1);
    const codes = Uint16Array.from(stored);
    return {
      columns: present.filter((at) => at !== base).map((at) => ({ level: levels[at]!, values: indicator(codes, at) })),
      reference: levels[base] ?? null,
      step: 1,
      stepWords: null,
      unit: null,
    };
  },
  subject: (value, made) => made.columns.map((column) => (column.level === value ? 1 : 0)),
};
