/** Prices of a tried file: whole minor units for the import, as written for the fit. */
import { minorUnitDigits } from "../domain/format.ts";
import type { DuplicateRow, HeldBackRow } from "../domain/importRecord.ts";
import type { SaleColumns } from "../domain/sale.ts";
import { readNumber } from "../import/readNumber.ts";
import type { RawRow, RawTable } from "../import/readSalesFile.ts";
import type { NumberedSale } from "./columnsOfSales.ts";

/** The number in the price cell of a row, null where it is none. */
function writtenPrice(row: RawRow, at: number, table: RawTable): number | null {
  const reading = readNumber((row.cells[at] ?? "").trim(), table.options);
  return reading.ok ? reading.value : null;
}

/** Prices finer than a minor unit are rounded for the import, which keeps whole units; the fit takes them as written. */
export function withWholeUnits(table: RawTable, at: number, currencyCode: string): RawTable {
  const digits = minorUnitDigits(currencyCode);
  const rows = table.rows.map((row) => {
    const value = writtenPrice(row, at, table);
    if (value === null || Number(value.toFixed(digits)) === value) return row;
    const rounded = value.toFixed(digits).replace(".", table.options.decimalMark);
    return { ...row, cells: row.cells.map((cell, column) => (column === at ? rounded : cell)) };
  });
  return { ...table, rows };
}

/** Where the cell differs by more than rounding, the import has read it otherwise, and its reading stands. */
export function exactPrices(
  table: RawTable,
  at: number,
  sales: readonly NumberedSale[],
  columns: SaleColumns,
): Float64Array {
  const rows = new Map(table.rows.map((row) => [row.row, row]));
  return columns.price.map((rounded, index) => {
    const { id, sale } = sales[index]!;
    const written = writtenPrice(rows.get(id)!, at, table);
    const halfUnit = 0.5 / 10 ** minorUnitDigits(sale.currencyCode);
    return written !== null && Math.abs(written - rounded) <= halfUnit * (1 + 1e-6) ? written : rounded;
  });
}

/** Held-back rows and duplicates say what stands in the file, not what it was rounded to. */
export function verbatim<T extends HeldBackRow | DuplicateRow>(found: readonly T[], table: RawTable, at: number): T[] {
  const rows = new Map(table.rows.map((row) => [row.row, row]));
  const heading = table.headings[at]!;
  return found.map((one) => ({ ...one, cells: { ...one.cells, [heading]: rows.get(one.row)?.cells[at] ?? "" } }));
}
