/**
 * Sales as typed arrays, read in blocks of sale numbers: the built-in columns from sales, the attributes from the wide table,
 * both in the order of the sale number, so no join is needed. This is the way a million sales reach the computing rooms.
 */
import type { Database } from "better-sqlite3";
import { minorUnitDigits } from "../domain/format.ts";
import { CHANNELS, priceBasisWords, type SaleColumns } from "../domain/sale.ts";
import { type StoredAttribute, valuesTable } from "./attributeTables.ts";
import { type BaseColumns, type KeptColumns, readSnapshot, SNAPSHOT_SALES, writeSnapshot } from "./columnSnapshot.ts";
import { type PackedColumn, packColumns, unpackInto } from "./packedColumns.ts";
import { priceBasisOf } from "./saleRows.ts";
import { codedTexts, saleTexts } from "./textColumns.ts";

/** Sale numbers per block: large enough to make a call cheap, small enough to keep the rows of one block in cache. */
const BLOCK = 8192;

/** Price in minor units, packed small columns (see PACKED), currency. */
type BaseRow = [number, number, string];

/**
 * Crossing from SQLite costs the same for every column, so the small ones cross as one whole number below 2^53:
 * ((day + DAY_SHIFT) × 6 + price basis) × 4 + channel, times SOURCE_LIMIT, plus the source's number.
 */
const DAY_SHIFT = 1_000_000;
const SOURCE_LIMIT = 2 ** 26;
const PACKED = `(((sold_on + ${DAY_SHIFT}) * 6 + price_basis) * 4 + channel) * ${SOURCE_LIMIT} + source_id`;

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

/** By the code of BaseColumns.kinds: channel + 4 × price basis. */
const CHANNEL_OF_KIND = Array.from({ length: 24 }, (_, kind) => CHANNELS[kind % 4]!);
const BASIS_OF_KIND = Array.from({ length: 24 }, (_, kind) => BASIS_WORDS[Math.floor(kind / 4)]!);

/**
 * Every sale of the class, set aside or not, in the order of the sale number. No sales give columns of length 0.
 * From the copy in columns where one stands for `rowsVersion`, else from the rows; many rows leave a copy behind.
 */
export function readSaleColumns(
  db: Database,
  classId: number,
  rowsVersion: number,
  attributes: readonly StoredAttribute[],
): SaleColumns {
  const look = () => readSnapshot(db, classId, rowsVersion, attributes);
  const kept = db.inTransaction ? look() : db.transaction(look)();
  if (kept !== null) return toSaleColumns(db, classId, attributes, kept);
  const before = commitsOfOthers(db);
  const found = readRows(db, classId, attributes);
  if (found.base.ids.length >= SNAPSHOT_SALES) keep(db, classId, rowsVersion, attributes, found, before);
  return toSaleColumns(db, classId, attributes, found);
}

/** Changes whenever another connection has committed anything to the file. */
function commitsOfOthers(db: Database): unknown {
  return db.pragma("data_version", { simple: true });
}

/**
 * Writes the copy unless somebody has written to the file since the rows began to be read. A copy is a convenience: a store that
 * cannot be written just now is read all the same.
 */
function keep(
  db: Database,
  classId: number,
  rowsVersion: number,
  attributes: readonly StoredAttribute[],
  columns: KeptColumns,
  before: unknown,
): void {
  if (db.readonly) return;
  try {
    db.transaction(() => {
      if (commitsOfOthers(db) === before) writeSnapshot(db, classId, rowsVersion, attributes, columns);
    }).immediate();
  } catch (cause) {
    if (!isOfTheDatabase(cause)) throw cause;
  }
}

/** Busy, full, read-only or failing: reading has succeeded, and what is wrong with writing shows at the next write. */
function isOfTheDatabase(cause: unknown): boolean {
  const code = (cause as { code?: unknown }).code;
  return typeof code === "string" && code.startsWith("SQLITE_");
}

function toSaleColumns(
  db: Database,
  classId: number,
  attributes: readonly StoredAttribute[],
  { base, currencyCodes, values }: KeptColumns,
): SaleColumns {
  const { ids, soldOn, price, kinds } = base;
  const names: string[] = [];
  for (const [id, name] of db.prepare<[], [number, string]>("SELECT id, name FROM sources").raw().iterate()) {
    names[id] = name;
  }
  return {
    count: ids.length,
    ids,
    ...saleTexts(db, ids),
    soldOn,
    price,
    currencyCodes: codedTexts(base.currencies, currencyCodes),
    channels: codedTexts(kinds, CHANNEL_OF_KIND),
    sources: codedTexts(base.sources, names),
    priceBases: codedTexts(kinds, BASIS_OF_KIND),
    ...readMarks(db, classId, ids),
    values: Object.fromEntries(attributes.map(({ attribute }, k) => [attribute.key, values[k]!])),
  };
}

function readRows(db: Database, classId: number, attributes: readonly StoredAttribute[]): KeptColumns {
  const table = valuesTable(classId);
  const extent = db
    .prepare<[], { count: number; low: number | null; high: number | null }>(
      `SELECT count(*) AS count, min(sale_id) AS low, max(sale_id) AS high FROM ${table}`,
    )
    .get()!;
  const base: BaseColumns = {
    ids: new Float64Array(extent.count),
    soldOn: new Float64Array(extent.count),
    price: new Float64Array(extent.count),
    currencies: new Uint16Array(extent.count),
    kinds: new Uint8Array(extent.count),
    sources: new Uint32Array(extent.count),
  };
  const currencies = new Map<string, number>();
  const values = attributes.map(() => new Float64Array(extent.count));
  // "+class_id" keeps SQLite on the row number instead of a class index, which would have to be sorted.
  const selectBase = db
    .prepare<[number, number, number], BaseRow>(
      `SELECT price_minor, ${PACKED}, currency_code FROM sales WHERE id >= ? AND id < ? AND +class_id = ? ORDER BY id`,
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
    const rows = selectBase.all(low, low + BLOCK, classId);
    fillBase(base, rows, at, unitsOf, currencies);
    fillValues(base.ids, values, packed, selectValues.all(low, low + BLOCK), at);
    at += rows.length;
  }
  return { base, currencyCodes: [...currencies.keys()], values };
}

function fillBase(
  columns: BaseColumns,
  rows: readonly BaseRow[],
  at: number,
  unitsOf: (currencyCode: string) => number,
  currencies: Map<string, number>,
): void {
  for (let r = 0, i = at; r < rows.length; r++, i++) {
    const row = rows[r]!;
    const small = Math.floor(row[1] / SOURCE_LIMIT);
    const basisAndDay = Math.floor(small / 4);
    columns.price[i] = row[0] / unitsOf(row[2]);
    columns.sources[i] = row[1] - small * SOURCE_LIMIT;
    columns.kinds[i] = (small % 4) + 4 * (basisAndDay % 6);
    columns.soldOn[i] = Math.floor(basisAndDay / 6) - DAY_SHIFT;
    let currency = currencies.get(row[2]);
    if (currency === undefined) {
      currency = currencies.size;
      currencies.set(row[2], currency);
    }
    columns.currencies[i] = currency;
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
