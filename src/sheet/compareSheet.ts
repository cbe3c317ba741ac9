/**
 * Every number, mark and sentence of the embedded result beside the one worked out again, by name, compared to the last bit
 * (Object.is on doubles, so that 0 and −0 differ too). What the PDF alone cannot give again is left out: how many records came
 * in and why some were not used, since only the sales used are embedded.
 */
import type { Appraisal } from "../domain/appraisal.ts";
import { formatPercent } from "../domain/format.ts";
import type { Conclusion, SheetEvidence, VerifiedFigure } from "../domain/sheetRecord.ts";

type Leaf = number | string | boolean | null;

export interface CompareOptions {
  /**
   * True where another version of the program made the sheet: it may word sentences differently, know fewer figures, and add
   * in another order. Then sentences and figures it did not have are left out, and numbers may differ in their last digits.
   */
  readonly otherVersion: boolean;
}

/** Two versions may add in another order; more than this is another number. */
const RELATIVE_DIFFERENCE = 1e-9;
/** What is zero but for rounding (a sum of parts less the whole) is no more than this. */
const ABSOLUTE_DIFFERENCE = 1e-12;
/** How a version came to its numbers, not what they are. */
const WAYS = new Set(["report.digitsToTrust", "report.condition", "report.path"]);

/** Places that only the store can give again. */
const NOT_RECOMPUTED = new Set(["evidence.read", "evidence.out"]);
/** Members that name an entry of a list, best first. */
const NAMING = [
  "label",
  "level",
  "fromLabel",
  "reference",
  "from",
  "key",
  "code",
  "attribute",
  "channel",
  "equation",
  "value",
  "a",
];

export function compareSheet(
  embedded: SheetEvidence,
  recomputed: Appraisal,
  recomputedConclusion: Conclusion,
  options: CompareOptions = { otherVersion: false },
): VerifiedFigure[] {
  const figures: VerifiedFigure[] = [];
  const found = { figures, ...options };
  walk(embedded.appraisal, recomputed, [], "", found);
  walk(embedded.conclusion, recomputedConclusion, ["printed price"], "conclusion", found);
  return options.otherVersion
    ? figures.filter(({ printed, recomputed: again }) => isNumeric(printed) || isNumeric(again))
    : figures;
}

const isNumeric = (value: VerifiedFigure["printed"]): boolean => typeof value === "number";

interface Found extends CompareOptions {
  readonly figures: VerifiedFigure[];
}

function walk(a: unknown, b: unknown, names: readonly string[], path: string, found: Found): void {
  if (NOT_RECOMPUTED.has(path)) return;
  if (found.otherVersion && (a === undefined || WAYS.has(path))) return;
  if (Array.isArray(a) && Array.isArray(b)) {
    walkList(a, b, names, path, found);
    return;
  }
  if (isRecord(a) && isRecord(b)) {
    for (const key of new Set([...Object.keys(a), ...Object.keys(b)])) {
      const name = path === "" && key === "priced" ? [] : [words(key)];
      walk(a[key], b[key], [...names, ...name], path === "" ? key : `${path}.${key}`, found);
    }
    return;
  }
  found.figures.push({
    name: nameOf(names, path),
    printed: shown(a),
    recomputed: shown(b),
    equal: Object.is(plain(a), plain(b)) || (found.otherVersion && isNearly(a, b)),
  });
}

function walkList(
  a: readonly unknown[],
  b: readonly unknown[],
  names: readonly string[],
  path: string,
  found: Found,
): void {
  const { figures } = found;
  if (a.length !== b.length) {
    figures.push({ name: `${nameOf(names, path)}, how many`, printed: a.length, recomputed: b.length, equal: false });
  }
  const count = Math.max(a.length, b.length);
  for (let k = 0; k < count; k++) {
    walk(a[k], b[k], [...names, entryName(a[k] ?? b[k], k)], `${path}[]`, found);
  }
}

function isNearly(a: unknown, b: unknown): boolean {
  if (typeof a !== "number" || typeof b !== "number") return false;
  return Math.abs(a - b) <= RELATIVE_DIFFERENCE * Math.max(Math.abs(a), Math.abs(b)) + ABSOLUTE_DIFFERENCE;
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return value !== null && typeof value === "object" && !Array.isArray(value);
}

/** What is compared: a missing member is as good as undefined, and never equal to null or a text. */
function plain(value: unknown): unknown {
  return isRecord(value) || Array.isArray(value) ? JSON.stringify(value) : value;
}

function shown(value: unknown): VerifiedFigure["printed"] {
  if (value === undefined) return "missing";
  if (value === null || typeof value === "number" || typeof value === "string") return value;
  if (typeof value === "boolean") return value ? "yes" : "no";
  return Array.isArray(value) ? `${value.length} entries` : "an entry";
}

/** "rangeForOneSale" → "range for one sale" */
function words(key: string): string {
  return key.replace(/([a-z])([A-Z])/g, (_, before: string, after: string) => `${before} ${after.toLowerCase()}`);
}

function entryName(value: unknown, index: number): string {
  if (typeof value === "string") return value;
  if (isRecord(value)) {
    if (typeof value.level === "number")
      return formatPercent(value.level, value.level * 100 === Math.round(value.level * 100) ? 0 : 1);
    const parts = NAMING.flatMap((key): Leaf[] => {
      const part = value[key];
      return typeof part === "string" && part !== "" ? [part] : [];
    });
    if (parts.length > 0) return [...new Set(parts.slice(0, typeof value.level === "string" ? 2 : 1))].join(" ");
    if (typeof value.sale === "number") return `sale ${value.sale}`;
  }
  return `no. ${index + 1}`;
}

const SPECIAL: Readonly<Record<string, string>> = {
  "priced.price.amount": "price, unrounded",
  "conclusion.amount": "price, as printed",
};

function nameOf(names: readonly string[], path: string): string {
  return (
    SPECIAL[path] ??
    (names.length > 1 ? `${names.slice(0, -1).join(": ")}, ${names[names.length - 1]}` : (names[0] ?? path))
  );
}
