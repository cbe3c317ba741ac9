/**
 * The one place where digits are dropped: money, numbers, days and ranges as people read them, by locale.
 * Real minus (U+2212), en dash in ranges, no-break spaces inside figures. Nothing here computes a price.
 */
import { type Day, dayNumber } from "./day.ts";

export interface Locale {
  /** BCP 47, such as "en-GB". */
  readonly tag: string;
}

export const DEFAULT_LOCALE: Locale = { tag: "en-GB" };

const MINUS = "\u2212";
const NBSP = "\u00a0";

/** Decimals of a currency's minor unit by ISO 4217 (EUR 2, JPY 0, KWD 3). */
export function minorUnitDigits(currencyCode: string): number {
  return (
    new Intl.NumberFormat("en", { style: "currency", currency: currencyCode }).resolvedOptions()
      .maximumFractionDigits ?? 2
  );
}

export function majorOf(minor: number, currencyCode: string): number {
  return minor / 10 ** minorUnitDigits(currencyCode);
}

/** Nearest whole number of minor units. */
export function minorOf(major: number, currencyCode: string): number {
  return Math.round(major * 10 ** minorUnitDigits(currencyCode));
}

function withRealMinus(text: string): string {
  return text.replace(/-/g, MINUS);
}

/** A plain number with grouping and fixed decimals: 12,345.6 */
export function formatNumber(value: number, decimals = 0, locale: Locale = DEFAULT_LOCALE): string {
  const rounded = Object.is(Number(value.toFixed(decimals)), -0) ? 0 : value;
  return withRealMinus(
    new Intl.NumberFormat(locale.tag, { minimumFractionDigits: decimals, maximumFractionDigits: decimals }).format(
      Number(rounded.toFixed(decimals)) === 0 ? 0 : rounded,
    ),
  );
}

/** +1,230 / −990 / 0 */
export function formatSigned(value: number, decimals = 0, locale: Locale = DEFAULT_LOCALE): string {
  const text = formatNumber(value, decimals, locale);
  return Number(value.toFixed(decimals)) > 0 ? `+${text}` : text;
}

/** ISO 4217 for "no currency": a file tried in memory that does not say what its prices are in. */
const NO_CURRENCY = "XXX";

/** Money with its symbol, whole units unless decimals are asked: €41,800 */
export function formatMoney(
  value: number,
  currencyCode: string,
  locale: Locale = DEFAULT_LOCALE,
  decimals = 0,
): string {
  if (currencyCode === NO_CURRENCY) return formatNumber(value, decimals, locale);
  return withRealMinus(
    new Intl.NumberFormat(locale.tag, {
      style: "currency",
      currency: currencyCode,
      currencyDisplay: "narrowSymbol",
      minimumFractionDigits: decimals,
      maximumFractionDigits: decimals,
    }).format(Number(value.toFixed(decimals)) === 0 ? 0 : value),
  ).replace(/ /g, NBSP);
}

/** Fraction as a percentage: 0.113 → 11.3 % */
export function formatPercent(fraction: number, decimals = 0, locale: Locale = DEFAULT_LOCALE): string {
  return `${formatNumber(fraction * 100, decimals, locale)}${NBSP}%`;
}

/** English months are fixed here: a sheet must read the same whatever a runtime's own tables say ("Sep" or "Sept"). */
const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

/** 12 May 2025, held together. Text that is no day is given back as it is. */
export function formatDay(day: Day, locale: Locale = DEFAULT_LOCALE): string {
  const number = dayNumber(day);
  if (number === null) return day;
  const [year, month, date] = day.split("-").map(Number);
  if (locale.tag === DEFAULT_LOCALE.tag) return `${date}${NBSP}${MONTHS[month! - 1]}${NBSP}${year}`;
  return new Intl.DateTimeFormat(locale.tag, { day: "numeric", month: "short", year: "numeric", timeZone: "UTC" })
    .format(new Date(number * 86_400_000))
    .replace(/ /g, NBSP);
}

/** 90 % of one sale: "9 in 10"; 50 %: "1 in 2"; else "95 in 100". */
export function levelWords(level: number): string {
  const percent = Math.round(level * 1000) / 10;
  if (percent === 50) return "1 in 2";
  return percent % 10 === 0 ? `${percent / 10} in 10` : `${percent} in 100`;
}

/** Rounding step of the form 1, 2 or 5 × 10^k at or below `target`, never below 1. */
export function niceStep(target: number): number {
  if (!(target > 1)) return 1;
  const power = 10 ** Math.floor(Math.log10(target));
  const head = target / power;
  return (head >= 5 ? 5 : head >= 2 ? 2 : 1) * power;
}

/** Step that a price is rounded to: a tenth of half the width of its range. */
export function roundingStep(range: { low: number; high: number }): number {
  return niceStep((range.high - range.low) / 20);
}

export function roundTo(value: number, step: number): number {
  return Math.round(value / step) * step;
}

/** Range ends go outward, so that rounding never narrows a range. */
export function roundOutward(range: { low: number; high: number }, step: number): { low: number; high: number } {
  return { low: Math.floor(range.low / step) * step, high: Math.ceil(range.high / step) * step };
}

/**
 * Parts rounded to `step` so that they add up to their rounded total (largest remainder).
 * Guards: no parts → no parts; ties go to the earlier part.
 */
export function roundToAddUp(parts: readonly number[], total: number, step: number): number[] {
  const floors = parts.map((part) => Math.floor(part / step));
  const left = Math.round(total / step) - floors.reduce((sum, part) => sum + part, 0);
  const order = parts
    .map((part, index) => ({ index, remainder: part / step - Math.floor(part / step) }))
    .sort((a, b) => b.remainder - a.remainder || a.index - b.index);
  for (let k = 0; k < Math.abs(left) && order.length > 0; k++) {
    const at = (left > 0 ? order[k % order.length] : order[order.length - 1 - (k % order.length)])!.index;
    floors[at]! += Math.sign(left);
  }
  return floors.map((part) => (part === 0 ? 0 : part * step));
}

/** Lower case at the start inside a sentence, unless the word is an abbreviation: "Hours" → "hours", "LPG" stays. */
export function lowerStart(label: string): string {
  return /^\p{Lu}\p{Ll}/u.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label;
}

/** "age", "age and hours", "age, hours and make" */
export function listWords(words: readonly string[]): string {
  if (words.length <= 1) return words.join("");
  return `${words.slice(0, -1).join(", ")} and ${words[words.length - 1]}`;
}

/** Commas only where thousands are parted as the program itself writes them, a point before decimals. */
const TYPED_NUMBER = /^[+-]?(\d+|\d{1,3}(,\d{3})+)(\.\d+)?$/;

/**
 * A number as a person types it into a form, or null when it could be meant otherwise: "1,500.5" and "1500.5" are read,
 * "1,5", "1500,50" and "1.500,50" are not. Nothing is guessed, since the number goes into a price.
 */
export function readTypedNumber(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\u00a0\u202f ]/g, "")
    .replace("\u2212", "-");
  return TYPED_NUMBER.test(plain) ? Number(plain.replaceAll(",", "")) : null;
}
