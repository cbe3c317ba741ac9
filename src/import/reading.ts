/** What came of one cell: its value, or a sentence and perhaps a reading that would be accepted. */

export type Reading<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly reason: string; readonly suggestion: string | null };

export function read<T>(value: T): Reading<T> {
  return { ok: true, value };
}

export function unread(reason: string, suggestion: string | null = null): Reading<never> {
  return { ok: false, reason, suggestion };
}

const NOT_STATED = new Set([
  "",
  "-",
  "\u2013",
  "\u2014",
  "\u2212",
  "?",
  "n/a",
  "n.a.",
  "na",
  "#n/a",
  "null",
  "nil",
  "unknown",
  "not known",
  "not stated",
  "k.a.",
  "k. a.",
  "unbekannt",
  "inconnu",
  "nc",
  "tbc",
]);

/** A cell that says that it says nothing. Zero is a value. */
export function isNotStated(cell: string): boolean {
  return cell === "" || (cell.length < 11 && NOT_STATED.has(cell.toLowerCase()));
}
