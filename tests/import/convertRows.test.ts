import { describe, expect, it } from "vitest";
import type { Attribute } from "../../src/domain/attribute.ts";
import type { ColumnMatch, ReadingOptions } from "../../src/domain/importRecord.ts";
import { convertOneRow, convertRows } from "../../src/import/convertRows.ts";
import { indexOfSales } from "../../src/import/duplicates.ts";
import { matchColumns } from "../../src/import/matchColumns.ts";
import { readSalesFile } from "../../src/import/readSalesFile.ts";
import { attributeOf } from "./attributeOf.ts";

const ATTRIBUTES: readonly Attribute[] = [
  attributeOf("make", { kind: "choice", levels: ["Tessaly", "Brannock", "Orveld"] }),
  attributeOf("built", { kind: "built", unit: "years" }),
  attributeOf("hours", { unit: "h", lowest: 0, highest: 40_000 }),
  attributeOf("power", { unit: "kW", lowest: 1 }),
  attributeOf("aircon", { label: "Air conditioning", kind: "yesNo" }),
];
const CLASS = {
  attributes: ATTRIBUTES,
  currencyCode: "EUR",
  priceBasis: { premium: "in", tax: "out" } as const,
};
const NONE = indexOfSales([]);
const HEADING = "lot;machine;make;built;sold on;hours;power;air con;price;currency;notes";

function convert(lines: readonly string[], heading = HEADING, options: Partial<ReadingOptions> | null = null) {
  const bytes = new TextEncoder().encode(`${heading}\n${lines.join("\n")}\n`);
  const table = readSalesFile(bytes, "week.csv", {
    decimalMark: ",",
    thousandsMark: ".",
    dateOrder: "dmy",
    ...options,
  });
  const match = matchColumns(table, ATTRIBUTES, null);
  return { table, match, result: convertRows(table, match, CLASS, NONE) };
}

const GOOD = "A-1;Tessaly TH-740;Tessaly;03/2018;12.05.2025;4200;97;ja;38.500,50;EUR;";
const like = (column: string, cell: string) => {
  const cells = GOOD.split(";");
  cells[HEADING.split(";").indexOf(column)] = cell;
  return cells.join(";");
};

describe("a row", () => {
  it("becomes a sale with exact minor units, a built day and yes or no", () => {
    const { result } = convert([GOOD]);
    expect(result.heldBack).toEqual([]);
    expect(result.accepted[0]).toEqual({
      row: 2,
      sale: {
        reference: "A-1",
        title: "Tessaly TH-740",
        soldOn: "2025-05-12",
        priceMinor: 3_850_050,
        currencyCode: "EUR",
        priceBasis: { premium: "none", tax: "out" },
        channel: "auction",
        source: "",
        notes: "",
        values: { make: "Tessaly", built: "2018-03-16", hours: 4200, power: 97, aircon: true },
      },
    });
  });

  it.each([
    ["price", "38.500,\u2014", "A dash stands in place of the decimals.", "38500"],
    ["price", "38,500.00", "Point and comma swapped here.", "38500,00"],
    ["price", "free", "Not a number.", null],
    ["price", "", "No price.", null],
    ["price", "0", "A price must be above zero.", null],
    ["price", "-5", "A price must be above zero.", null],
    ["price", "38500,506", "More decimals than EUR has.", "38500,51"],
    ["price", "\u00a3 38500", "No rate table yet: enter the price in EUR.", null],
    ["sold on", "31.02.2025", "No such day.", null],
    ["sold on", "", "No day of sale.", null],
    ["sold on", "05/13/2025", "No such day: read with the day first.", "2025-05-13"],
    ["sold on", "45789", "A spreadsheet's day count, not a day.", "2025-05-12"],
    ["hours", "5l20", "A letter l among the digits.", "5120"],
    ["hours", "4OOO", "A letter O among the digits.", "4000"],
    ["hours", "50000", "Above the highest allowed value, 40,000 h.", null],
    ["hours", "-1", "Below the lowest allowed value, 0 h.", null],
    ["hours", "97 kW", "The unit kW is not h.", null],
    ["make", "Brannok", "Not in the list of makes.", "Brannock"],
    ["make", "Quern", "Not in the list of makes.", null],
    ["air con", "perhaps", "Neither yes nor no.", null],
    ["built", "2026", "Built later than sold.", null],
    ["currency", "SEK", "No rate table yet: enter the price in EUR.", null],
    ["currency", "QQQ", "No currency of that name.", null],
    ["lot", "A-1, 2 units", "2 units under one price: which share is this one\u2019s?", null],
  ])("is held back when its %s is %j: %s", (column, value, reason, suggestion) => {
    const { result } = convert([like(column, value)]);
    expect(result.accepted).toEqual([]);
    expect(result.heldBack[0]!.reasons).toEqual([{ column, value, reason, suggestion }]);
    expect(result.heldBack[0]!.cells[column]).toBe(value);
  });

  it("says every fault it has", () => {
    const cells = GOOD.split(";").map((cell, k) => (k === 4 ? "no day" : k === 8 ? "much" : cell));
    const { result } = convert([cells.join(";")]);
    expect(result.heldBack[0]!.reasons.map(({ column }) => column)).toEqual(["sold on", "price"]);
  });

  it("may lack any attribute value", () => {
    const { result } = convert(["A-2;TH;;;2025-05-12;n/a;-;?;1;;"]);
    expect(result.accepted[0]!.sale.values).toEqual({
      make: null,
      built: null,
      hours: null,
      power: null,
      aircon: null,
    });
  });

  it("is never shifted when it has too few or too many cells", () => {
    const { result } = convert([`${GOOD};extra`, "A-9;TH", GOOD]);
    expect(result.heldBack.map(({ row }) => row)).toEqual([2, 3]);
    expect(result.heldBack[0]!.reasons[0]!.reason).toBe(
      "The row has 12 cells and the heading 11: nothing tells which ones are too many.",
    );
    expect(Object.values(result.heldBack[0]!.cells)).toContain("extra");
    expect(result.accepted).toHaveLength(1);
  });

  it("is converted where its cell or heading names another unit, and that is said", () => {
    const heading = HEADING.replace("power", "Power (hp)");
    const { result } = convert([GOOD], heading);
    expect(result.accepted[0]!.sale.values.power).toBeCloseTo(97 * 0.7456998715822702, 9);
    expect(result.notes).toEqual(["Power (hp): hp in the file, kW in the class; converted with 1 hp = 0.7457 kW."]);
    const cells = convert([like("power", "97 kW"), like("power", "130 hp"), like("power", "131")]);
    expect(cells.result.accepted.length + cells.result.duplicates.length).toBe(2);
    expect(cells.result.heldBack[0]!.reasons).toEqual([
      { column: "power", value: "131", reason: "No unit: hp or kW? The column has both.", suggestion: "131 hp" },
    ]);
    expect(cells.result.notes).toEqual(["power: hp converted to kW in 1 cell."]);
  });
});

describe("prices that look ten times off", () => {
  const week = (last: string) => [
    ...Array.from({ length: 30 }, (_, k) =>
      GOOD.replace("A-1", `A-${k}`).replace("38.500,50", String(36_000 + 250 * k)),
    ),
    GOOD.replace("A-1", "B-1").replace("38.500,50", last),
  ];

  it("are held back with the shifted price offered", () => {
    const { result } = convert(week("4150"));
    expect(result.accepted).toHaveLength(30);
    expect(result.heldBack[0]!.reasons).toEqual([
      {
        column: "price",
        value: "4150",
        reason: "About a tenth of the middle price in this file, \u20ac39,500.",
        suggestion: "41500",
      },
    ]);
  });

  it("are taken when they are merely low, or when a person has looked at them", () => {
    expect(convert(week("9000")).result.accepted).toHaveLength(31);
    const { table, match, result } = convert(week("4150"));
    const { row, cells } = result.heldBack[0]!;
    const mended = convertOneRow(row, cells, { ...table, match }, CLASS, NONE);
    expect(mended.accepted[0]).toMatchObject({ row: 32, sale: { priceMinor: 415_000 } });
  });

  it("are left alone in a class whose prices spread that far", () => {
    const lines = Array.from({ length: 40 }, (_, k) =>
      GOOD.replace("A-1", `A-${k}`).replace("38.500,50", String(Math.round(100 * 1.2 ** k))),
    );
    expect(convert(lines).result.accepted).toHaveLength(40);
  });
});

describe("duplicates", () => {
  it("are found by reference and day, and by day, price and values", () => {
    const { result } = convert([GOOD, like("notes", "again"), like("lot", ""), like("lot", "A-2")]);
    expect(result.accepted.map(({ row }) => row)).toEqual([2, 5]);
    expect(result.duplicates.map(({ row, sameAs, why }) => ({ row, sameAs, why }))).toEqual([
      { row: 3, sameAs: { row: 2 }, why: "same reference and day" },
      { row: 4, sameAs: { row: 2 }, why: "same day, price and values" },
    ]);
  });

  it("are found among the sales that are there already", () => {
    const { table, match, result } = convert([GOOD, like("lot", "")]);
    const known = indexOfSales([{ ...result.accepted[0]!.sale, id: 612 }]);
    const again = convertRows(table, match, CLASS, known);
    expect(again.accepted).toEqual([]);
    expect(again.duplicates.map(({ sameAs }) => sameAs)).toEqual([
      { saleId: 612, reference: "A-1" },
      { saleId: 612, reference: "A-1" },
    ]);
  });

  it("are not seen in rows that are alike but were all given one day", () => {
    const { table, match } = convert(["9;1", "9;1"], "price;hours");
    const given = { ...match, fixed: { ...match.fixed, soldOn: "2025-05-12" } };
    const first = convertRows(table, given, CLASS, NONE);
    expect(first.accepted).toHaveLength(2);
    const known = indexOfSales(first.accepted.map(({ sale }, k) => ({ ...sale, id: k + 1 })));
    expect(convertRows(table, given, CLASS, known).duplicates).toHaveLength(2);
  });
});

describe("a match", () => {
  const { table, match } = convert([GOOD]);
  const refused = (columns: ColumnMatch["columns"]) => () => convertRows(table, { ...match, columns }, CLASS, NONE);

  it("is refused when it does not belong to the file or the class", () => {
    expect(refused([{ heading: "Preis", target: { to: "price" } }])).toThrow('no column "Preis"');
    expect(refused([{ heading: "price", target: { to: "attribute", key: "mast" } }])).toThrow('no attribute "mast"');
    expect(
      refused([
        { heading: "price", target: { to: "price" } },
        { heading: "hours", target: { to: "price" } },
      ]),
    ).toThrow("Two columns");
  });

  it("without price or day holds every row back and says why", () => {
    const result = convertRows(table, { ...match, columns: [] }, CLASS, NONE);
    expect(result.heldBack[0]!.reasons.map(({ reason }) => reason)).toEqual([
      "No day of sale: no column or fixed day for it.",
      "No price: no column is matched to it.",
    ]);
  });
});
