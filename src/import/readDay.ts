/**
 * Calendar days as written in a file. A year first (2025-05-12) and a month by name are read whatever the file's order; two
 * numbers before a year are read by it. No such day is said, never rolled over into the next month.
 */
import { type Day, dayNumber, dayOf } from "../domain/day.ts";
import type { ReadingOptions } from "../domain/importRecord.ts";
import { type Reading, read, unread } from "./reading.ts";

type DateOrder = ReadingOptions["dateOrder"];

const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?:[T ]\d{1,2}:\d{2}.*)?$/;
const COMPACT = /^((?:19|20)\d{2})(\d{2})(\d{2})$/;
export const TWO_NUMBERS = /^(\d{1,2})\s?([./-])\s?(\d{1,2})\s?\2\s?(\d{4}|\d{2})(?:,? \d{1,2}:\d{2}.*)?$/;
const DAY_NAME_YEAR = /^(\d{1,2})(?:st|nd|rd|th)?\.?[\s\-/]*([\p{L}]{3,})\.?[\s\-/,]*(\d{4}|\d{2})$/u;
const NAME_DAY_YEAR = /^([\p{L}]{3,})\.?\s+(\d{1,2})(?:st|nd|rd|th)?,?\s+(\d{4})$/u;
const SERIAL = /^[2-6]\d{4}(?:\.\d+)?$/;
/** Day number of the day that spreadsheets count from, so that 1 March 1900 is 61. */
const SERIAL_ORIGIN = -25_569;

const MONTHS: Readonly<Record<string, number>> = Object.fromEntries(
  [
    "jan january januar jänner janvier janv",
    "feb february februar février fevrier févr fevr",
    "mar march märz maerz mrz mär mars",
    "apr april avril avr",
    "may mai",
    "jun june juni juin",
    "jul july juli juillet juil",
    "aug august août aout",
    "sep sept september septembre",
    "oct october okt oktober octobre",
    "nov november novembre",
    "dec december dez dezember décembre decembre déc",
  ].flatMap((names, k) => names.split(" ").map((name) => [name, k + 1])),
);

function isoOf(year: number, month: number, day: number): Day | null {
  const iso = `${String(year).padStart(4, "0")}-${String(month).padStart(2, "0")}-${String(day).padStart(2, "0")}`;
  return dayNumber(iso) === null ? null : iso;
}

/** Two digits: 70–99 are 19.., 00–69 are 20... */
function fullYear(text: string): number {
  const year = Number(text);
  return text.length === 4 ? year : year < 70 ? 2000 + year : 1900 + year;
}

function dayOrNone(year: number, month: number, day: number): Reading<Day> {
  if (year < 1800 || year > 2199) return unread("The year cannot be right.");
  const iso = isoOf(year, month, day);
  return iso === null ? unread("No such day.") : read(iso);
}

function twoNumbers(first: number, second: number, year: number, order: DateOrder): Reading<Day> {
  if (order === "ymd") {
    if (first > 12) return dayOrNone(year, second, first);
    if (second > 12) return dayOrNone(year, first, second);
    if (first === second) return dayOrNone(year, first, second);
    return unread("Day first or month first? Both would be days.");
  }
  const [day, month, other] = order === "dmy" ? [first, second, "month"] : [second, first, "day"];
  const found = dayOrNone(year, month, day);
  const exchanged = month > 12 ? isoOf(year, day, month) : null;
  if (found.ok || exchanged === null) return found;
  return unread(`No such day: read with the ${other === "month" ? "day" : "month"} first.`, exchanged);
}

/** A cell that is meant as a day, by its look; for headings and for judging columns. */
export function looksLikeDay(cell: string): boolean {
  return YEAR_FIRST.test(cell) || TWO_NUMBERS.test(cell) || COMPACT.test(cell) || byName(cell) !== null;
}

function byName(cell: string): { year: number; month: number; day: number } | null {
  const dayFirst = DAY_NAME_YEAR.exec(cell);
  const nameFirst = dayFirst === null ? NAME_DAY_YEAR.exec(cell) : null;
  const [name, day, year] =
    dayFirst !== null ? [dayFirst[2]!, dayFirst[1]!, dayFirst[3]!] : [nameFirst?.[1], nameFirst?.[2], nameFirst?.[3]];
  const month = name === undefined ? undefined : MONTHS[name.toLowerCase()];
  return month === undefined ? null : { year: fullYear(year!), month, day: Number(day) };
}

/** The day in a trimmed cell. "31.02.2025" → No such day. A time of day after it is left aside. */
export function readDay(cell: string, order: DateOrder): Reading<Day> {
  const yearFirst = YEAR_FIRST.exec(cell);
  if (yearFirst !== null) return dayOrNone(Number(yearFirst[1]), Number(yearFirst[3]), Number(yearFirst[4]));
  const two = TWO_NUMBERS.exec(cell);
  if (two !== null) return twoNumbers(Number(two[1]), Number(two[3]), fullYear(two[4]!), order);
  const compact = COMPACT.exec(cell);
  if (compact !== null) return dayOrNone(Number(compact[1]), Number(compact[2]), Number(compact[3]));
  const named = byName(cell);
  if (named !== null) return dayOrNone(named.year, named.month, named.day);
  if (SERIAL.test(cell))
    return unread("A spreadsheet's day count, not a day.", dayOf(Math.floor(Number(cell)) + SERIAL_ORIGIN));
  return unread("Not a day.");
}

const MONTH_ONLY = /^(?:(\d{4})[-/.](\d{1,2})|(\d{1,2})[-/.](\d{4}))$/;

/** First and last day that a built cell can mean: a day, a month (03/2018) or a year (2018). */
export function readBuilt(cell: string, order: DateOrder): Reading<{ first: Day; last: Day }> {
  if (/^\d{4}$/.test(cell)) {
    const year = Number(cell);
    if (year < 1500 || year > 2199) return unread("The year cannot be right.");
    return read({ first: `${cell}-01-01`, last: `${cell}-12-31` });
  }
  const month = MONTH_ONLY.exec(cell);
  if (month !== null) {
    const [year, number] = [Number(month[1] ?? month[4]), Number(month[2] ?? month[3])];
    const first = isoOf(year, number, 1);
    if (first === null) return unread("No such month.");
    const next = number === 12 ? isoOf(year + 1, 1, 1)! : isoOf(year, number + 1, 1)!;
    return read({ first, last: dayOf(dayNumber(next)! - 1) });
  }
  const day = readDay(cell, order);
  return day.ok ? read({ first: day.value, last: day.value }) : day;
}

/** Middle of what a built cell can mean, but not after the sale when its first day is not: 2018 → 2018-07-02. */
export function builtDay(span: { first: Day; last: Day }, soldOn: Day | null): Day {
  if (span.first === span.last) return span.first;
  const first = dayNumber(span.first)!;
  const sold = soldOn === null ? null : dayNumber(soldOn);
  const last = sold !== null && sold >= first ? Math.min(sold, dayNumber(span.last)!) : dayNumber(span.last)!;
  return dayOf(Math.floor((first + last) / 2));
}
