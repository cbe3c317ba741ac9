import { describe, expect, it } from "vitest";
import type { ReadingOptions } from "../../src/domain/importRecord.ts";
import { MOST_BYTES, readSalesFile } from "../../src/import/readSalesFile.ts";

const utf8 = (text: string) => new TextEncoder().encode(text);
const bytesOf = (...bytes: number[]) => Uint8Array.from(bytes);
const readText = (text: string, chosen: Partial<ReadingOptions> | null = null) =>
  readSalesFile(utf8(text), "sales.csv", chosen);

function utf16(text: string, highFirst: boolean, mark: boolean): Uint8Array {
  const units = [...(mark ? "\ufeff" : ""), ...text].map((character) => character.charCodeAt(0));
  return Uint8Array.from(units.flatMap((unit) => (highFirst ? [unit >> 8, unit & 255] : [unit & 255, unit >> 8])));
}

function refusalOf(bytes: Uint8Array): string {
  try {
    readSalesFile(bytes, "sales.csv", null);
  } catch (cause) {
    const { family, code, where, whatToDo } = cause as {
      family: string;
      code: string;
      where: string;
      whatToDo: string;
    };
    expect([family, where.startsWith("sales.csv"), whatToDo.endsWith(".")]).toEqual(["import", true, true]);
    return code;
  }
  return "read";
}

describe("bytes", () => {
  const text = "lot,price\nM\u00fcnz,1\nB,2\n";

  it.each([
    ["UTF-8", utf8(text), "utf-8"],
    ["UTF-8 with a mark", utf8(`\ufeff${text}`), "utf-8"],
    ["UTF-16, low byte first, with a mark", utf16(text, false, true), "utf-16le"],
    ["UTF-16, high byte first, with a mark", utf16(text, true, true), "utf-16be"],
    ["UTF-16, low byte first", utf16(text, false, false), "utf-16le"],
    ["UTF-16, high byte first", utf16(text, true, false), "utf-16be"],
    ["windows-1252", Uint8Array.from(text, (c) => c.charCodeAt(0)), "windows-1252"],
  ] as const)("in %s are read as such", (_, bytes, encoding) => {
    const table = readSalesFile(bytes, "sales.csv", null);
    expect(table.options.encoding).toBe(encoding);
    expect(table.headings).toEqual(["lot", "price"]);
    expect(table.rows[0]).toEqual({ row: 2, cells: ["M\u00fcnz", "1"] });
    expect(table.detected[0]).toMatch(/^Read as /);
  });

  it("from 0x80 to 0x9f in windows-1252 are the characters of that table", () => {
    const high = Array.from({ length: 32 }, (_, k) => 0x80 + k);
    const table = readSalesFile(bytesOf(...utf8("a,b\n1,"), ...high, 10), "sales.csv", null);
    expect(table.rows[0]!.cells[1]).toBe(
      "\u20ac\u0081\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\u008d\u017d\u008f\u0090\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\u009d\u017e\u0178",
    );
  });

  it("that a chosen encoding has not are said", () => {
    const table = readSalesFile(bytesOf(...utf8("a,b\n1,"), 0xfc, 10), "sales.csv", { encoding: "utf-8" });
    expect(table.detected).toContain("1 characters could not be read as UTF-8; they show as \ufffd.");
  });

  it.each([
    ["empty-file", new Uint8Array()],
    ["not-a-table", bytesOf(0x50, 0x4b, 3, 4, 20, 0, 6)],
    ["not-a-table", utf8("%PDF-1.7\n")],
    ["not-a-table", bytesOf(0x89, 0x50, 0x4e, 0x47, 13, 10)],
    ["not-a-table", bytesOf(0xff, 0xd8, 0xff, 0xe0)],
    ["not-a-table", bytesOf(1, 0, 7, 0, 0, 0, 0, 9, 200, 0, 0)],
    ["no-rows", utf8("lot,price\n")],
    ["no-rows", utf8("\n\n")],
    ["unclosed-quote", utf8('lot,price\nA,1\n"B,2\nC,3\n')],
  ] as const)("that are no table are refused: %s", (code, bytes) => {
    expect(refusalOf(bytes)).toBe(code);
  });

  it("beyond 200 MB are refused before they are looked at", () => {
    expect(refusalOf({ length: MOST_BYTES + 1 } as Uint8Array)).toBe("file-too-large");
  });
});

describe("rows", () => {
  it("are counted as a spreadsheet counts them, quoted line breaks and blank rows included", () => {
    const table = readText('lot,notes\r\nA,"two\r\nlines"\r\n\r\n , \r\nB,"say ""so"""\r\n');
    expect(table.rows).toEqual([
      { row: 2, cells: ["A", "two\nlines"] },
      { row: 5, cells: ["B", 'say "so"'] },
    ]);
    expect(table.blankRows).toBe(2);
  });

  it("keep as many cells as they have", () => {
    expect(readText("a,b,c\n1,2\n1,2,3,4\n").rows.map(({ cells }) => cells.length)).toEqual([2, 4]);
  });

  it("whose quotes or NULs spoil them are marked", () => {
    const nul = readText(`lot,price\nA,1\n"B "x,"2"\nC\0,3\n${"D,4\n".repeat(200)}`);
    expect(nul.rows.filter(({ fault }) => fault !== undefined).map(({ row }) => row)).toEqual([3, 4]);
  });

  it("that all end in a separator have no further column", () => {
    const table = readText("a;b;\n1;2;\n3;4;\n");
    expect(table.headings).toEqual(["a", "b"]);
    expect(table.detected).toContain("A separator ends every row; it was not read as a column.");
    expect(readText("a;b;\n1;2;x\n").headings).toEqual(["a", "b", "column 3"]);
  });

  it("under no heading are all values, and the columns are numbered", () => {
    const table = readText("1,2025-01-01,3\n2,2025-01-02,4\n");
    expect(table.options.hasHeading).toBe(false);
    expect(table.headings).toEqual(["column 1", "column 2", "column 3"]);
    expect(table.rows[0]!.row).toBe(1);
    expect(readText("1,2\n3,4\n", { hasHeading: true }).headings).toEqual(["1", "2"]);
  });
});

describe("headings", () => {
  it("that are empty or stand twice get names of their own, and it is said", () => {
    const table = readText("price,,Price\n1,2,3\n");
    expect(table.headings).toEqual(["price", "column 2", "Price (2)"]);
    expect(table.detected).toContain('Column 2 has no heading; it is called "column 2".');
    expect(table.detected).toContain('The heading "Price" stands twice; the later one is called "Price (2)".');
  });
});

describe("the separator", () => {
  it.each([
    [";", "a;b\n1,5;2,5\n"],
    ["\t", "a\tb\n1\t2\n"],
    ["|", "a|b\n1|2\n"],
    [",", 'a,b\n"x;y;z",2\n'],
  ] as const)("%j is found", (delimiter, text) => {
    expect(readText(text).options.delimiter).toBe(delimiter);
  });

  it("is the chosen one, or the one that the file names", () => {
    expect(readText("a,b;c\n1,2;3\n", { delimiter: ";" }).headings).toEqual(["a,b", "c"]);
    const named = readText("sep=|\na|b\n1|2\n");
    expect([named.options.delimiter, named.rows]).toEqual(["|", [{ row: 3, cells: ["1", "2"] }]]);
  });

  it("may be missing", () => {
    expect(readText("price\n1\n").detected).toContain("No separator was found; each row reads as one cell.");
  });
});

describe("marks and days", () => {
  const column = (...cells: string[]) => readText(`price;x\n${cells.map((cell) => `${cell};1`).join("\n")}\n`);
  const marks = ({ options }: ReturnType<typeof readText>) => options.decimalMark + options.thousandsMark;

  it.each([
    [",.", ["1.234,5", "12"]],
    [".,", ["1,234.5", "12"]],
    [",.", ["1.234.567"]],
    [",", ["7,0", "12,25"]],
    [".", ["7.0", "12.25"]],
    [".", ["0.750", "1.250"]],
    [", ", ["38 500", "7,5"]],
    [".'", ["38\u2019500", "7.5"]],
    [",.", ["\u20ac 38.500", "7,5", "38.500,\u2014"]],
  ])("reads %j from %j", (expected, cells) => {
    expect(marks(column(...cells))).toBe(expected);
  });

  it("says when thousands could be decimals", () => {
    expect(column("38.500", "41.200").detected).toContain(
      "Numbers such as 38.500 could have thousands or decimals behind the mark; read as thousands.",
    );
  });

  it.each([
    ["dmy", ["13/05/2025", "01/02/2025"], "Dates are read day first: 1 date has a number above 12 there."],
    ["mdy", ["05/13/2025", "01/02/2025"], "Dates are read month first: 1 date has a number above 12 there."],
    ["dmy", ["01/02/2025"], "Every date could be day-month or month-day; read as day-month."],
    ["dmy", ["01.02.2025"], "Days with points between are read day first, as is usual."],
    ["ymd", ["2025-02-01", "3 May 2025"], "Days are written with the year first or the month by name."],
    ["ymd", ["12"], "No column of days was found."],
  ])("reads %s from %j", (order, cells, sentence) => {
    const table = column(...cells);
    expect(table.options.dateOrder).toBe(order);
    expect(table.detected).toContain(sentence);
  });

  it("are as chosen", () => {
    const chosen = { decimalMark: ",", thousandsMark: "'", dateOrder: "mdy" } as const;
    expect(readText("price;day\n1.5;13/05/2025\n", chosen).options).toMatchObject(chosen);
  });
});
