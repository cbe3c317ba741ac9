/** Headings: is the first row one, and names that are distinct and never empty. */
import { looksLikeDay } from "./readDay.ts";

const NUMBER_LIKE = /^[\s€£$¥+\-\u2212]*\d[\d\s.,'\u2019\u00a0\u202f]*[%€£$]?$/;

/** A heading is words: most filled cells are neither numbers nor days. */
export function rowLooksLikeHeading(cells: readonly string[]): boolean {
  const filled = cells.map((cell) => cell.trim()).filter((cell) => cell !== "");
  const words = filled.filter((cell) => !NUMBER_LIKE.test(cell) && !looksLikeDay(cell));
  return filled.length > 0 && words.length * 2 > filled.length;
}

export interface NamedHeadings {
  readonly headings: readonly string[];
  readonly sentences: readonly string[];
}

/** Without a heading (null) columns are "column 1" … of `width`. Renamed and unnamed columns are said. */
export function nameHeadings(cells: readonly string[] | null, width: number): NamedHeadings {
  if (cells === null) {
    const headings = Array.from({ length: width }, (_, k) => `column ${k + 1}`);
    return { headings, sentences: ["The first row holds values, so the columns are numbered."] };
  }
  const sentences: string[] = [];
  const taken = new Set<string>();
  const headings = cells.map((cell, k) => {
    const typed = cell.replace(/\s+/g, " ").trim();
    const base = typed === "" ? `column ${k + 1}` : typed;
    let name = base;
    for (let n = 2; taken.has(name.toLowerCase()); n++) name = `${base} (${n})`;
    taken.add(name.toLowerCase());
    if (typed === "") sentences.push(`Column ${k + 1} has no heading; it is called "${name}".`);
    else if (name !== typed) sentences.push(`The heading "${typed}" stands twice; the later one is called "${name}".`);
    return name;
  });
  return { headings, sentences };
}
