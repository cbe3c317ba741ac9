/**
 * How coarse the sheet's figures are, in one place: prices to the rounding step, parts to a figure step that adds up.
 */
import { formatMoney, formatNumber, formatSigned, niceStep, roundTo } from "../domain/format.ts";

/** Step of figures beside a price that is rounded to `roundingStep`: a fiftieth of it, from 1 to 10. */
export function figureStep(roundingStep: number): number {
  return Math.max(1, Math.min(10, niceStep(roundingStep / 50)));
}

/** Step of one ledger row's money: three digits of its largest part, from 1 to 10; its sentence is rounded alike. */
export function rowStep(money: { own: number; coefficient: number }): number {
  const largest = Math.max(Math.abs(money.own), Math.abs(money.coefficient), 1);
  return Math.max(1, Math.min(10, niceStep(largest / 100)));
}

export function moneyTo(step: number, amount: number, currencyCode: string): string {
  return formatMoney(roundTo(amount, step), currencyCode);
}

export function signedTo(step: number, amount: number): string {
  return formatSigned(roundTo(amount, step));
}

const SMALL = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** Small whole numbers as words in sentences: "seven", "no"; others as figures. */
export function countWord(count: number): string {
  return SMALL[count] ?? formatNumber(count);
}

export function plural(count: number, one: string, many = `${one}s`): string {
  return count === 1 ? one : many;
}

/** "a machine", "an organ" */
export function withArticle(word: string): string {
  return /^[aeiou]/i.test(word) ? `an ${word}` : `a ${word}`;
}

export function upperStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
