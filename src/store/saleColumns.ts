/**
 * Sales as typed arrays, read in blocks of sale numbers: the built-in columns from sales, the attributes from the wide table,
 * both in the order of the sale number, so no join is needed. This is the way a million sales reach the computing rooms.
 */
import type { Database } from "better-sqlite3";
import { minorUnitDigits } from "../domain/format.ts";
import { CHANNELS, type Channel, priceBasisWords, type SaleColumns } from "../domain/sale.ts";
import { type StoredAttribute, valuesTable } from "./attributeTables.ts";
import { priceBasisOf } from "./saleRows.ts";

/** Sale numbers per block: large enough to make a call cheap, small enough to keep the rows of one block in cache. */
const BLOCK = 8192;

type BaseRow = [number, number, number, string, number, number, number, string, string | null, number, string | null];

interface Filling {
  readonly ids: Float64Array;
  readonly references: (string | null)[];
  readonly titles: string[];
  readonly soldOn: Float64Array;
  readonly price: Float64Array;
  readonly currencyCodes: string[];
  readonly channels: Channel[];
  readonly sources: string[];
  readonly verified: Uint8Array;
  readonly priceBases: string[];
  readonly setAsideReasons: (string | null)[];
}

function emptyColumns(count: number): Filling {
  return {
    ids: new Float64Array(count),
    references: new Array(count),
    titles: new Array(count),
    soldOn: new Float64Array(count),
    price: new Float64Array(count),
    currencyCodes: new Array(count),
    channels: new Array(count),
    sources: new Array(count),
    verified: new Uint8Array(count),
    priceBases: new Array(count),
    setAsideReasons: new Array(count),
  };
}

/** Minor units in one major unit, looked up once per currency. */
function minorPerMajor(): (currencyCode: string) => number {
  const known = new Map<string, number>();
  return (currencyCode) => {
    let units = known.get(currencyCode);
    if (units === undefined) {
      units = 10 ** minorUnitDigits(currencyCode);
      known.set(currencyCode, units);
    }
    return units;
  };
}

const BASIS_WORDS = [0, 1, 2, 3, 4, 5].map((code) => priceBasisWords(priceBasisOf(code)));

/** Every sale of the class, set aside or not, in the order of the sale number. No sales give columns of length 0. */
export function readSaleColumns(db: Database, classId: number, attributes: readonly StoredAttribute[]): SaleColumns {
  const table = valuesTable(classId);
  const extent = db
    .prepare<[], { count: number; low: number | null; high: number | null }>(
      `SELECT count(*) AS count, min(sale_id) AS low, max(sale_id) AS high FROM ${table}`,
    )
    .get()!;
  const columns = emptyColumns(extent.count);
  const arrays = attributes.map(() => new Float64Array(extent.count));
  const sourceNames = new Map(db.prepare<[], [number, string]>("SELECT id, name FROM sources").raw().all());
  // "+class_id" keeps SQLite on the row number instead of a class index, which would have to be sorted.
  const selectBase = db
    .prepare<[number, number, number], BaseRow>(
      `SELECT id, sold_on, price_minor, currency_code, price_basis, channel, source_id, title, reference,
         verified_on IS NOT NULL, set_aside_reason
       FROM sales WHERE id >= ? AND id < ? AND +class_id = ? ORDER BY id`,
    )
    .raw();
  const names = attributes.map(({ column }) => `, ${column}`).join("");
  const selectValues = db
    .prepare<[number, number], (number | null)[]>(
      `SELECT sale_id${names} FROM ${table} WHERE sale_id >= ? AND sale_id < ? ORDER BY sale_id`,
    )
    .raw();
  const unitsOf = minorPerMajor();
  let at = 0;
  for (let low = extent.low ?? 1; low <= (extent.high ?? 0); low += BLOCK) {
    const base = selectBase.all(low, low + BLOCK, classId);
    fillBase(columns, base, at, unitsOf, sourceNames);
    fillValues(arrays, selectValues.all(low, low + BLOCK), at);
    at += base.length;
  }
  const values = Object.fromEntries(attributes.map(({ attribute }, k) => [attribute.key, arrays[k]!]));
  return { count: extent.count, ...columns, values };
}

function fillBase(
  columns: Filling,
  rows: readonly BaseRow[],
  at: number,
  unitsOf: (currencyCode: string) => number,
  sourceNames: ReadonlyMap<number, string>,
): void {
  for (let r = 0, i = at; r < rows.length; r++, i++) {
    const row = rows[r]!;
    columns.ids[i] = row[0];
    columns.soldOn[i] = row[1];
    columns.price[i] = row[2] / unitsOf(row[3]);
    columns.currencyCodes[i] = row[3];
    columns.priceBases[i] = BASIS_WORDS[row[4]]!;
    columns.channels[i] = CHANNELS[row[5]]!;
    columns.sources[i] = sourceNames.get(row[6])!;
    columns.titles[i] = row[7];
    columns.references[i] = row[8];
    columns.verified[i] = row[9];
    columns.setAsideReasons[i] = row[10];
  }
}

function fillValues(arrays: readonly Float64Array[], rows: readonly (number | null)[][], at: number): void {
  for (let r = 0, i = at; r < rows.length; r++, i++) {
    const row = rows[r]!;
    for (let k = 0; k < arrays.length; k++) {
      const value = row[k + 1]!;
      arrays[k]![i] = value === null ? Number.NaN : value;
    }
  }
}
