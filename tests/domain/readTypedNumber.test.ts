/** A typed number goes into a price: it is read in one way only, or not at all. */
import { expect, test } from "vitest";
import { formatNumber, readTypedNumber } from "../../src/domain/format.ts";

test.each([
  ["1500", 1500],
  ["1,500", 1500],
  ["1,500.50", 1500.5],
  ["12,345,678", 12_345_678],
  ["-990", -990],
  ["−990", -990],
  ["+250.5", 250.5],
  [" 4 200 ", 4200],
  ["0.25", 0.25],
])("%s is read", (text, number) => {
  expect(readTypedNumber(text)).toBe(number);
});

test.each(["1500,50", "1,5", "1.500,50", "15,00", "1,5000", ",5", "1.", "1.2.3", "12a", "1e5", "--3", "", "Infinity"])(
  "%s could be meant otherwise, or is none, and is not guessed at",
  (text) => {
    expect(readTypedNumber(text)).toBeNull();
  },
);

test("what the program itself writes is read back", () => {
  for (const number of [0, 7, 4200, -1234567, 1234.5]) {
    expect(readTypedNumber(formatNumber(number, Number.isInteger(number) ? 0 : 1))).toBe(number);
  }
});
