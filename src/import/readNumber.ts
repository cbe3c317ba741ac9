/**
 * Numbers as written in a file, read strictly by its decimal and thousands marks. What does not fit is never guessed into a
 * value: it comes back with a reason and, where a repair is plain, a suggestion written the way the file writes numbers.
 */
import type { ReadingOptions } from "../domain/importRecord.ts";
import { type Reading, read, unread } from "./reading.ts";

export type Marks = Pick<ReadingOptions, "decimalMark" | "thousandsMark">;

const LOOKALIKES: Readonly<Record<string, string>> = {
  l: "1",
  I: "1",
  i: "1",
  "|": "1",
  O: "0",
  o: "0",
  S: "5",
  B: "8",
  Z: "2",
};
const GROUP: Readonly<Record<Exclude<ReadingOptions["thousandsMark"], "">, string>> = {
  ",": ",",
  ".": "\\.",
  " ": "[ \\u00a0\\u202f\\u2009]",
  "'": "['\\u2019]",
};

const shapes = new Map<string, RegExp>();

function shapeOf({ decimalMark, thousandsMark }: Marks): RegExp {
  const name = decimalMark + thousandsMark;
  let shape = shapes.get(name);
  if (shape === undefined) {
    const point = decimalMark === "." ? "\\." : ",";
    const grouped =
      thousandsMark === "" || thousandsMark === decimalMark ? "" : `\\d{1,3}(?:${GROUP[thousandsMark]}\\d{3})+|`;
    shape = new RegExp(`^([+\\-\\u2212]?)(${grouped}\\d+)?(?:${point}(\\d+))?$`);
    shapes.set(name, shape);
  }
  return shape;
}

/**
 * The number as plain decimal text with a point ("38500.5", "-3"), exact: no step through a floating-point number. Null where
 * the cell is not a number by these marks. 1.234,5 by comma and point → "1234.5".
 */
export function plainDecimal(cell: string, marks: Marks): string | null {
  const match = shapeOf(marks).exec(cell);
  if (match === null || (match[2] === undefined && match[3] === undefined)) return null;
  const whole = (match[2] ?? "0").replace(/\D/g, "");
  const sign = match[1] === "-" || match[1] === "\u2212" ? "-" : "";
  return match[3] === undefined ? sign + whole : `${sign}${whole}.${match[3]}`;
}

function swapped({ decimalMark }: Marks): Marks {
  return decimalMark === "," ? { decimalMark: ".", thousandsMark: "," } : { decimalMark: ",", thousandsMark: "." };
}

/** The file's own decimal mark, with the other mark for thousands. */
function withGroups({ decimalMark }: Marks): Marks {
  return { decimalMark, thousandsMark: decimalMark === "," ? "." : "," };
}

/** Plain decimal text as the file would write it: without grouping, with its decimal mark. */
export function asWritten(plain: string, marks: Marks): string {
  return marks.decimalMark === "," ? plain.replace(".", ",") : plain;
}

/** Digits in groups of three behind one kind of mark: 38.500, 1,234,500. */
function ungrouped(cell: string): string | null {
  return /^[1-9]\d{0,2}([.,])\d{3}(?:\1\d{3})*$/.test(cell) ? cell.replace(/[.,]/g, "") : null;
}

/** A reading by looser rules, for suggestions only. */
function looselyRead(cell: string, marks: Marks): string | null {
  return plainDecimal(cell, marks) ?? ungrouped(cell) ?? plainDecimal(cell, swapped(marks));
}

function lettersAmongDigits(cell: string, marks: Marks): Reading<never> | null {
  const letters = cell.match(/[A-Za-z|]/g);
  if (letters === null || !/\d/.test(cell) || !letters.every((letter) => letter in LOOKALIKES)) return null;
  const repaired = looselyRead(
    cell.replace(/[A-Za-z|]/g, (letter) => LOOKALIKES[letter]!),
    marks,
  );
  if (repaired === null) return null;
  const kinds = [...new Set(letters)];
  const which = kinds.length === 1 ? `A letter ${kinds[0]}` : `Letters (${kinds.join(", ")})`;
  return unread(`${which} among the digits.`, asWritten(repaired, marks));
}

function faultOf(cell: string, marks: Marks): Reading<never> {
  const letters = lettersAmongDigits(cell, marks);
  if (letters !== null) return letters;
  const dashed = /^(.*\d)\s?[.,]\s?[-\u2013\u2014\u2212]+$/.exec(cell);
  const beforeDash = dashed === null ? null : looselyRead(dashed[1]!, marks);
  if (beforeDash !== null) return unread("A dash stands in place of the decimals.", asWritten(beforeDash, marks));
  const exchanged = plainDecimal(cell, swapped(marks));
  if (/[.,].*[.,]/.test(cell) && exchanged !== null) {
    return unread("Point and comma swapped here.", asWritten(exchanged, marks));
  }
  const grouped = ungrouped(cell) ?? plainDecimal(cell, withGroups(marks));
  if (grouped !== null) {
    return unread(
      `A mark among the digits that this file does not use for thousands: ${cell}.`,
      asWritten(grouped, marks),
    );
  }
  if (exchanged !== null) return unread("Point and comma swapped here.", asWritten(exchanged, marks));
  return unread(/\d/.test(cell) ? "Not a plain number." : "Not a number.");
}

const POWERED = /^([+-]?)(\d+)(?:([.,])(\d+))?[eE]([+-]?\d{1,2})$/;

/** "1e+05" → "100000", "1.5E-2" → "0.015": some programs write round numbers so. Exact: only the point moves. */
function plainFromPowered(cell: string, { decimalMark }: Marks): string | null {
  const match = POWERED.exec(cell);
  if (match === null || (match[3] ?? decimalMark) !== decimalMark) return null;
  const [, sign, whole = "", , fraction = "", power] = match;
  const digits = whole + fraction;
  const point = whole.length + Number(power);
  const padded = digits.padStart(digits.length + Math.max(0, 1 - point), "0").padEnd(point, "0");
  const at = Math.max(1, point);
  const minus = sign === "-" ? "-" : "";
  const head = padded.slice(0, at).replace(/^0+(?=\d)/, "");
  return at < padded.length ? `${minus}${head}.${padded.slice(at)}` : minus + head;
}

/** The plain decimal text of a trimmed cell, or why it is none. "5l20" → "A letter l among the digits.", 5120. */
export function readDecimal(cell: string, marks: Marks): Reading<string> {
  const plain = plainDecimal(cell, marks) ?? plainFromPowered(cell, marks);
  return plain === null ? faultOf(cell, marks) : read(plain);
}

const PLAIN_WHOLE = /^\d{1,15}$/;
const SCIENTIFIC = /^[+-]?\d+(?:[.,]\d+)?[eE][+-]?\d{1,3}$/;

/** The number in a trimmed cell, as the nearest floating-point number. */
export function readNumber(cell: string, marks: Marks): Reading<number> {
  if (PLAIN_WHOLE.test(cell)) return read(Number(cell));
  if (SCIENTIFIC.test(cell)) {
    const value = Number(cell.replace(",", "."));
    if (Number.isFinite(value) && !cell.includes(marks.decimalMark === "." ? "," : ".")) return read(value);
  }
  const plain = readDecimal(cell, marks);
  if (!plain.ok) return plain;
  const value = Number(plain.value);
  return Number.isFinite(value) ? read(value) : unread("A number too large to keep.");
}
