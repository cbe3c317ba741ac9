/** A price cell → whole minor units (cents), exactly: the digits are moved as text, never through a floating-point number. */
import { minorUnitDigits } from "../domain/format.ts";
import { type Reading, read, unread } from "./reading.ts";
import { asWritten, type Marks, readDecimal } from "./readNumber.ts";
import { readCurrency, splitCurrency } from "./readWord.ts";

const digitsByCurrency = new Map<string, number>();

function digitsOf(currencyCode: string): number {
  let digits = digitsByCurrency.get(currencyCode);
  if (digits === undefined) {
    digits = minorUnitDigits(currencyCode);
    digitsByCurrency.set(currencyCode, digits);
  }
  return digits;
}

/** "1234.5" with 2 digits → 123450. Finer than the minor unit: null. */
export function minorFromPlain(plain: string, digits: number): number | null {
  const [whole = "", fraction = ""] = plain.split(".");
  if (/[1-9]/.test(fraction.slice(digits))) return null;
  const minor = Number(whole + fraction.slice(0, digits).padEnd(digits, "0"));
  return Number.isSafeInteger(minor) ? minor : null;
}

/**
 * Minor units of the price in a trimmed cell, with or without its currency. `faultOfCurrency` judges a currency written beside
 * it. Zero and less are no price.
 */
export function readPrice(
  cell: string,
  marks: Marks,
  expectedCurrency: string,
  faultOfCurrency: (code: string) => string | null,
): Reading<number> {
  const { amount, currency } = splitCurrency(cell);
  if (currency !== null) {
    const code = readCurrency(currency, expectedCurrency);
    if (!code.ok) return unread(code.reason);
    const fault = faultOfCurrency(code.value);
    if (fault !== null) return unread(fault);
  }
  const plain = readDecimal(amount, marks);
  if (!plain.ok) return plain;
  const digits = digitsOf(expectedCurrency);
  const minor = minorFromPlain(plain.value, digits);
  if (minor === null) {
    const value = Number(plain.value);
    if (Math.abs(value) * 10 ** digits > Number.MAX_SAFE_INTEGER) return unread("A price too large to keep.");
    const rounded = asWritten(value.toFixed(digits), marks);
    return unread(`More decimals than ${expectedCurrency} has.`, value > 0 ? rounded : null);
  }
  return minor > 0 ? read(minor) : unread("A price must be above zero.");
}
