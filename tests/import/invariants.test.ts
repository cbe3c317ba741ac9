import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { convertRows } from "../../src/import/convertRows.ts";
import { indexOfSales } from "../../src/import/duplicates.ts";
import { matchColumns } from "../../src/import/matchColumns.ts";
import { readDay } from "../../src/import/readDay.ts";
import { asWritten, plainDecimal } from "../../src/import/readNumber.ts";
import { minorFromPlain } from "../../src/import/readPrice.ts";
import { readSalesFile } from "../../src/import/readSalesFile.ts";
import { attributeOf } from "./attributeOf.ts";

const CLASS = {
  attributes: [
    attributeOf("hours", { unit: "h", lowest: 0 }),
    attributeOf("make", { kind: "choice", levels: ["Tessaly", "Brannock"] }),
    attributeOf("cabin", { kind: "yesNo" }),
    attributeOf("built", { kind: "built", unit: "years" }),
  ],
  currencyCode: "EUR",
  priceBasis: { premium: "in", tax: "out" } as const,
};
const HEADING = "lot,sold on,price,hours,make,cabin,built";

const cell = fc.oneof(
  fc.constantFrom(
    "",
    "-",
    "1",
    "5l20",
    "38.500,\u2014",
    "2025-03-01",
    "31.02.2025",
    "Brannok",
    "Tessaly",
    "yes",
    "2018",
  ),
  fc.constantFrom("1,234.50", "\u20ac 12", "12 SEK", "7 kW", "0", "-3", "1e5", '"', "two units", "2 units", " x "),
  fc.string({ maxLength: 8 }).map((text) => text.replaceAll("\0", "")),
);
const line = fc
  .array(cell, { minLength: 5, maxLength: 9 })
  .map((cells) => cells.map((each) => `"${each.replaceAll('"', '""')}"`).join(","));
const good = fc
  .tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 3 }))
  .map(([lot, price]) => `L${lot},2025-03-01,${price}000,100,Tessaly,yes,2018-05-01`);

describe("whatever the rows hold", () => {
  it("every row read is accepted, held back with a reason, or a duplicate: once", () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(line, good), { minLength: 1, maxLength: 40 }), (lines) => {
        const table = readSalesFile(new TextEncoder().encode(`${HEADING}\n${lines.join("\n")}\nL9,,,,,,\n`), "x.csv", {
          delimiter: ",",
          hasHeading: true,
        });
        const match = matchColumns(table, CLASS.attributes, null);
        const result = convertRows(table, match, CLASS, indexOfSales([]));
        const rows = [...result.accepted, ...result.heldBack, ...result.duplicates].map(({ row }) => row);
        expect(result.read).toBe(table.rows.length);
        expect(rows.length).toBe(result.read);
        expect(new Set(rows)).toEqual(new Set(table.rows.map(({ row }) => row)));
        expect(result.heldBack.every(({ reasons }) => reasons.length > 0)).toBe(true);
        expect(result.accepted.every(({ sale }) => Number.isSafeInteger(sale.priceMinor) && sale.priceMinor > 0)).toBe(
          true,
        );
        const again = convertRows(
          table,
          match,
          CLASS,
          indexOfSales(result.accepted.map(({ sale, row }) => ({ ...sale, id: row }))),
        );
        expect(again.accepted).toEqual([]);
      }),
      { numRuns: 150 },
    );
  });
});

describe("numbers", () => {
  it("keep every digit on their way to minor units", () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 10 ** 14 }), (minor) => {
        const text = `${Math.floor(minor / 100)}.${String(minor % 100).padStart(2, "0")}`;
        const marks = { decimalMark: ",", thousandsMark: "." } as const;
        const written = asWritten(text, marks).replace(/\B(?=(?:\d{3})+,)/g, ".");
        expect(minorFromPlain(plainDecimal(written, marks)!, 2)).toBe(minor);
      }),
    );
  });
});

describe("days", () => {
  it("come back from every way of writing them", () => {
    fc.assert(
      fc.property(
        fc.date({ min: new Date("1901-01-01"), max: new Date("2099-12-31"), noInvalidDate: true }),
        (date) => {
          const iso = date.toISOString().slice(0, 10);
          const [y, m, d] = iso.split("-");
          for (const [text, order] of [
            [iso, "mdy"],
            [`${d}.${m}.${y}`, "dmy"],
            [`${m}/${d}/${y}`, "mdy"],
            [`${y}${m}${d}`, "dmy"],
            [`${Number(d)} ${date.toLocaleString("en", { month: "long", timeZone: "UTC" })} ${y}`, "ymd"],
          ] as const) {
            expect(readDay(text, order)).toEqual({ ok: true, value: iso });
          }
        },
      ),
    );
  });
});
