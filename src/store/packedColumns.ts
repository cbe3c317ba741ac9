/**
 * Crossing from SQLite to JavaScript costs the same for every column, whatever is in it. Columns with few possible values
 * (choices, yes/no, built days) therefore cross several at a time as one whole number below 2^53, in mixed radix:
 * each digit is 0 for not known, else the stored value plus `shift`.
 */
import type { StoredAttribute } from "./attributeTables.ts";

/** Every day that domain/day.ts knows (years 100 to 9999) fits into one digit. */
const DAY_SHIFT = 1_000_001;
const DAY_RADIX = 4_000_000;
const LIMIT = 2 ** 53;

interface Digit {
  /** Place of the attribute among those that are read. */
  readonly at: number;
  readonly column: string;
  readonly radix: number;
  readonly shift: number;
}

/** One column of the SELECT: a number attribute as it is, or several digits. */
export interface PackedColumn {
  readonly sql: string;
  /** Place of the number attribute, or null for digits. */
  readonly numberAt: number | null;
  /** Least significant first. */
  readonly digits: readonly Digit[];
}

function digitOf({ attribute, column }: StoredAttribute, at: number): Digit {
  if (attribute.kind === "built") return { at, column, radix: DAY_RADIX, shift: DAY_SHIFT };
  return { at, column, radix: (attribute.kind === "yesNo" ? 2 : attribute.levels.length) + 1, shift: 1 };
}

function packed(digits: readonly Digit[]): PackedColumn {
  const sql = digits.reduceRight(
    (higher, { column, radix, shift }) =>
      `${higher === "" ? "" : `(${higher}) * ${radix} + `}coalesce(${column} + ${shift}, 0)`,
    "",
  );
  return { sql, numberAt: null, digits };
}

/** The columns to select so that every attribute crosses once. */
export function packColumns(attributes: readonly StoredAttribute[]): PackedColumn[] {
  const columns: PackedColumn[] = [];
  let digits: Digit[] = [];
  let product = 1;
  for (const [at, stored] of attributes.entries()) {
    if (stored.attribute.kind === "number") {
      columns.push({ sql: stored.column, numberAt: at, digits: [] });
      continue;
    }
    const digit = digitOf(stored, at);
    if (product * digit.radix > LIMIT) {
      columns.push(packed(digits));
      digits = [];
      product = 1;
    }
    digits.push(digit);
    product *= digit.radix;
  }
  if (digits.length > 0) columns.push(packed(digits));
  return columns;
}

/** Puts the digits of one packed number into their arrays at place `i`; NaN = not known. */
export function unpackInto(arrays: readonly Float64Array[], digits: readonly Digit[], value: number, i: number): void {
  let rest = value;
  for (const { at, radix, shift } of digits) {
    const higher = Math.floor(rest / radix);
    const digit = rest - higher * radix;
    arrays[at]![i] = digit === 0 ? Number.NaN : digit - shift;
    rest = higher;
  }
}
