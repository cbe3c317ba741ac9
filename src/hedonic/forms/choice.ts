/**
 * Choice: one column of a level against the others for each level that occurs in the evidence, but for the reference level.
 * Reference = the stated one if it occurs, else the most frequent (ties: the earlier in the attribute's list). Levels with few
 * sales are kept, merged into one, or drawn together (then every level has a column and none is the reference: see
 * estimators/partialPooling.ts).
 */
import { formatNumber, listWords } from "../../domain/format.ts";
import { indicator } from "../../numerics/column.ts";
import { type AttributeFormRule, type FormColumns, type FormSource, type KnownValue, PLAIN } from "./form.ts";

/** A level with fewer sales than this is rare. Common practice, no source. */
export const RARE_SALES = 5;

export const choice: AttributeFormRule = {
  label: "choice",
  columns(source) {
    const { stored, levels, wanted } = source;
    const codes = new Uint16Array(stored);
    const counts = new Array<number>(levels.length).fill(0);
    for (const level of codes) counts[level]! += 1;
    const merged = wanted.rare === "merge" ? mergeRare(source, codes, counts) : null;
    const names = merged === null ? levels : [...levels, merged.name];
    const present = names.map((_, at) => at).filter((at) => (counts[at] ?? 0) > 0);
    const base = wanted.rare === "pool" && present.length > 1 ? -1 : baseOf(source, counts, present);
    const columns = present
      .filter((at) => at !== base)
      .map((at) => ({ level: names[at]!, values: indicator(codes, at) }));
    const nameOf = (value: KnownValue) => (merged?.levels.includes(String(value)) ? merged.name : String(value));
    return {
      ...PLAIN,
      columns,
      reference: names[base] ?? null,
      step: 1,
      stepWords: null,
      unit: null,
      merged: merged === null ? null : { name: merged.name, levels: merged.levels },
      notes: notesOf(source, merged, counts),
      numbersAt: (value) => columns.map((column) => (column.level === nameOf(value) ? 1 : 0)),
    } satisfies FormColumns;
  },
};

/** What merging did, or why it did nothing; and a stated reference level that is not there to be read against. */
function notesOf({ label, levels, wanted }: FormSource, merged: Merged | null, counts: readonly number[]): string[] {
  const { rare, reference } = wanted;
  const few = levels.filter((_, at) => counts[at]! > 0 && counts[at]! < RARE_SALES);
  const alone =
    rare === "merge" && merged === null && few.length === 1
      ? [`${label}: only ${few[0]} has fewer than ${RARE_SALES} sales, so there is nothing to take it together with.`]
      : [];
  const isGone = reference !== null && rare !== "pool" && !((counts[levels.indexOf(reference)] ?? 0) > 0);
  const moved = isGone
    ? [`${label}: ${reference} is not there to be read against; the most frequent level stands in.`]
    : [];
  return [...(merged?.notes ?? []), ...alone, ...moved];
}

function baseOf({ levels, wanted }: FormSource, counts: readonly number[], present: readonly number[]): number {
  const stated = wanted.reference === null ? -1 : levels.indexOf(wanted.reference);
  if (stated >= 0 && counts[stated]! > 0) return stated;
  return present.reduce((best, at) => (counts[at]! > counts[best]! ? at : best), present[0] ?? -1);
}

interface Merged {
  readonly name: string;
  readonly levels: readonly string[];
  readonly notes: readonly string[];
}

/** Gives the rare levels one code of their own, in place; null where fewer than two are rare. */
function mergeRare({ label, levels }: FormSource, codes: Uint16Array, counts: number[]): Merged | null {
  const rare = levels.map((_, at) => at).filter((at) => counts[at]! > 0 && counts[at]! < RARE_SALES);
  if (rare.length < 2) return null;
  const name =
    ["other", "other levels", "levels merged"].find((one) => !levels.includes(one)) ?? `merged ${levels.length}`;
  const code = levels.length;
  const isRare = new Set(rare);
  for (let i = 0; i < codes.length; i++) if (isRare.has(codes[i]!)) codes[i] = code;
  const named = rare.map((at) => `${levels[at]} (${formatNumber(counts[at]!)})`);
  counts[code] = rare.reduce((sum, at) => sum + counts[at]!, 0);
  for (const at of rare) counts[at] = 0;
  const words = `${label}: ${listWords(named)} have fewer than ${RARE_SALES} sales each and are taken together as ${name}, ${formatNumber(counts[code]!)} sales.`;
  return { name, levels: rare.map((at) => levels[at]!), notes: [words] };
}
