import { expect, test } from "vitest";
import { evidenceCsv } from "../../src/sheet/evidenceCsv.ts";
import { evidenceTable } from "../fixtures/sheetEvidence.ts";

const table = evidenceTable(2);
const [first] = table.rows;
const linesOf = (text: string): string[] => text.split("\r\n");

test("has one line a sale, with the age at sale beside the built day, at full digits", () => {
  const [head, line, , end] = linesOf(evidenceCsv(table));
  expect(head).toBe(
    "id,reference,title,sold_on,price,currency,channel,source,verified,maker,built,built_age_years,hours,condition,lift_height",
  );
  const cells = line!.split(",");
  expect(cells.slice(0, 4)).toEqual(["1", "S-1100", "Brannoc TH-740", first!.soldOn]);
  expect(Number(cells[4])).toBe(first!.priceMinor / 100);
  expect(Number(cells[11])).toBeCloseTo(
    (Date.parse(first!.soldOn) - Date.parse(String(first!.values[1]))) / 86_400_000 / 365.2425,
    12,
  );
  expect(end).toBe("");
});

test("quotes what needs it, leaves unknown values empty, and lets no text pass for a formula", () => {
  const row = { ...first!, reference: null, title: '=HYPERLINK("x"), "y"\nz', values: [null, null, null, 3, 7] };
  const text = evidenceCsv({ ...table, rows: [row] });
  expect(text).toContain(`1,,"'=HYPERLINK(""x""), ""y""\nz",`);
  expect(text.trimEnd().endsWith(",,,,,3,7")).toBe(true);
});
