/** Numbers written with a power of ten, as some programs write round ones: 1e+05 is a price like any other. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readDecimal } from "../../src/import/readNumber.ts";
import { readPrice } from "../../src/import/readPrice.ts";

const MARKS = { decimalMark: ".", thousandsMark: "" } as const;
const plain = (cell: string): unknown => readDecimal(cell, MARKS);

describe("a number with a power of ten", () => {
  test("is read by moving its point", () => {
    const pairs = { "1e+05": "100000", "1.5E-2": "0.015", "-3.25e1": "-32.5", "123.456e1": "1234.56", "0.5e2": "50" };
    for (const [cell, value] of Object.entries(pairs)) expect(plain(cell)).toEqual({ ok: true, value });
  });

  test("is the same number as without it", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-9, max: 1e15, noNaN: true }), (value) => {
        const reading = readDecimal(value.toExponential(), MARKS);
        return reading.ok && Number(reading.value) === value;
      }),
    );
  });

  test("keeps to the file's decimal mark", () => {
    expect(readDecimal("1,5e2", { decimalMark: ",", thousandsMark: "" })).toEqual({ ok: true, value: "150" });
    expect(plain("1,5e2")).toMatchObject({ ok: false });
  });

  test("is a price", () => {
    expect(readPrice("1e+05", MARKS, "EUR", () => null)).toEqual({ ok: true, value: 10_000_000 });
  });
});
