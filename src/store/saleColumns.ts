/**
 * Sales as typed arrays, read in blocks of sale numbers: the built-in columns from sales, the attributes from the wide table,
 * both in the order of the sale number, so no join is needed. This is the way a million sales reach the computing rooms.
 */
import type { Database } from "better-sqlite3";
import { minorUnitDigits } from "../domain/format.ts";
import { CHANNELS, type Channel, priceBasisWords, type SaleColumns } from "../domain/sale.ts";
import { type StoredAttribute, valuesTable } from "./attributeTables.ts";
import { type PackedColumn, packColumns, unpackInto } from "./packedColumns.ts";
import { priceBasisOf } from "./saleRows.ts";

/** Sale numbers per block: large enough to make a call cheap, small enough to keep the rows of one block in cache. */
const BLOCK = 8192;

/** Price in minor units, packed small columns (see PACKED), currency, title, reference. */
type BaseRow = [number, number, string, string, string | null];

/**
 * Crossing from SQLite costs the same for every column, so the small ones cross as one whole number below 2^53:
 * ((day + DAY_SHIFT) × 6 + price basis) × 4 + channel, times SOURCE_LIMIT, plus the source's number.
 */
const DAY_SHIFT = 1_000_000;
const SOURCE_LIMIT = 2 ** 26;
const PACKED = `(((sold_on + ${DAY_SHIFT}) * 6 + price_basis) * 4 + channel) * ${SOURCE_LIMIT} + source_id`;

interface Filling {
  readonly ids: Float64Array;
  readonly references: (string | null)[];
  readonly titles: string[];
  readonly soldOn: Float64Array;
  readonly price: Float64Array;
  readonly currencyCodes: string[];
  readonly channels: Channel[];
  readonly sources: string[];
  readonly priceBases: string[];
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
    priceBases: new Array(count),
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
      `SELECT price_minor, ${PACKED}, currency_code, title, reference
       FROM sales WHERE id >= ? AND id < ? AND +class_id = ? ORDER BY id`,
    )
    .raw();
  const packed = packColumns(attributes);
  const selectValues = db
    .prepare<[number, number], (number | null)[]>(
      `SELECT sale_id${packed.map(({ sql }) => `, ${sql}`).join("")} FROM ${table} WHERE sale_id >= ? AND sale_id < ? ORDER BY sale_id`,
    )
    .raw();
  const unitsOf = minorPerMajor();
  let at = 0;
  for (let low = extent.low ?? 1; low <= (extent.high ?? 0); low += BLOCK) {
    const base = selectBase.all(low, low + BLOCK, classId);
    fillBase(columns, base, at, unitsOf, sourceNames);
    fillValues(columns.ids, arrays, packed, selectValues.all(low, low + BLOCK), at);
    at += base.length;
  }
  const values = Object.fromEntries(attributes.map(({ attribute }, k) => [attribute.key, arrays[k]!]));
  return { count: extent.count, ...columns, ...readMarks(db, classId, columns.ids), values };
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
    const small = Math.floor(row[1] / SOURCE_LIMIT);
    const basisAndDay = Math.floor(small / 4);
    columns.price[i] = row[0] / unitsOf(row[2]);
    columns.sources[i] = sourceNames.get(row[1] - small * SOURCE_LIMIT)!;
    columns.channels[i] = CHANNELS[small % 4]!;
    columns.priceBases[i] = BASIS_WORDS[basisAndDay % 6]!;
    columns.soldOn[i] = Math.floor(basisAndDay / 6) - DAY_SHIFT;
    columns.currencyCodes[i] = row[2];
    columns.titles[i] = row[3];
    columns.references[i] = row[4];
  }
}

/**
 * What people mark on sales, for the sales numbered `ids` (ascending): verified, set aside with a reason. The marked ones come
 * by their index, in any order, and are found by halving.
 */
export function readMarks(
  db: Database,
  classId: number,
  ids: Float64Array,
): Pick<SaleColumns, "verified" | "setAsideReasons"> {
  const verified = new Uint8Array(ids.length);
  const setAsideReasons = new Array<string | null>(ids.length).fill(null);
  const verifiedIds = db
    .prepare<[number], number>("SELECT id FROM sales WHERE class_id = ? AND verified_on IS NOT NULL")
    .pluck()
    .all(classId);
  for (const id of verifiedIds) verified[placeOf(ids, id)] = 1;
  const reasons = db
    .prepare<[number], [number, string]>(
      "SELECT id, set_aside_reason FROM sales WHERE class_id = ? AND set_aside_on IS NOT NULL",
    )
    .raw()
    .all(classId);
  for (const [id, reason] of reasons) setAsideReasons[placeOf(ids, id)] = reason;
  return { verified, setAsideReasons };
}

function placeOf(ids: Float64Array, id: number): number {
  let [low, high] = [0, ids.length - 1];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ids[middle]! < id) low = middle + 1;
    else high = middle;
  }
  return low;
}

function fillValues(
  ids: Float64Array,
  arrays: readonly Float64Array[],
  packed: readonly PackedColumn[],
  rows: readonly (number | null)[][],
  at: number,
): void {
  for (let r = 0, i = at; r < rows.length; r++, i++) {
    const row = rows[r]!;
    ids[i] = row[0]!;
    for (let k = 0; k < packed.length; k++) {
      const { numberAt, digits } = packed[k]!;
      const value = row[k + 1]!;
      if (numberAt === null) unpackInto(arrays, digits, value!, i);
      else arrays[numberAt]![i] = value === null ? Number.NaN : value;
    }
  }
}
