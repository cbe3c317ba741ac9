/**
 * The columns of a class kept as blobs, one to a column up to four million sales: read back some ten times as fast as rows, and
 * without a copy, as they lie in memory (little-endian). A copy is read only inside one transaction with its stamp, and only when the stamp names the
 * class's rows_version and every column has the length it must have; else rows are read, as if there were none.
 */
import type { Database } from "better-sqlite3";
import { type StoredAttribute, valuesTable } from "./attributeTables.ts";

/** From this many sales on a copy is worth its room. */
export const SNAPSHOT_SALES = 20_000;
const BLOCK = 4_194_304;

/** What is kept beside the attributes; names that no attribute key can have. */
export interface BaseColumns {
  readonly ids: Float64Array;
  readonly soldOn: Float64Array;
  readonly price: Float64Array;
  /** Places in the list of currencies. */
  readonly currencies: Uint16Array;
  /** Channel + 4 × price basis. */
  readonly kinds: Uint8Array;
  /** Numbers of the table sources. */
  readonly sources: Uint32Array;
}

export interface KeptColumns {
  readonly base: BaseColumns;
  readonly currencyCodes: readonly string[];
  readonly values: readonly Float64Array[];
}

type Numbers = Float64Array | Uint32Array | Uint16Array | Uint8Array;

const BASE_TYPES = {
  ids: Float64Array,
  soldOn: Float64Array,
  price: Float64Array,
  currencies: Uint16Array,
  kinds: Uint8Array,
  sources: Uint32Array,
} as const;

/** The copy of the class at `rowsVersion`, or null when there is none that can be trusted. Call it inside a transaction. */
export function readSnapshot(
  db: Database,
  classId: number,
  rowsVersion: number,
  attributes: readonly StoredAttribute[],
): KeptColumns | null {
  const stamp = db
    .prepare<[number, number], number>("SELECT sale_count FROM snapshot_stamps WHERE class_id = ? AND rows_version = ?")
    .pluck()
    .get(classId, rowsVersion);
  if (stamp === undefined) return null;
  const select = db
    .prepare<[number, string], Uint8Array>(
      "SELECT bytes FROM column_snapshots WHERE class_id = ? AND name = ? ORDER BY block",
    )
    .pluck();
  const read = (name: string, width: number): Uint8Array | null =>
    joined(select.all(classId, name), stamp * width, width);
  const base: Partial<Record<keyof BaseColumns, Numbers>> = {};
  for (const [name, Type] of Object.entries(BASE_TYPES)) {
    const bytes = read(`base:${name}`, Type.BYTES_PER_ELEMENT);
    if (bytes === null) return null;
    base[name as keyof BaseColumns] = new Type(bytes.buffer as ArrayBuffer, bytes.byteOffset, stamp);
  }
  const values: Float64Array[] = [];
  for (const { column } of attributes) {
    const bytes = read(`value:${column}`, 8);
    if (bytes === null) return null;
    values.push(new Float64Array(bytes.buffer as ArrayBuffer, bytes.byteOffset, stamp));
  }
  const codes = select.get(classId, "list:currencies");
  if (codes === undefined) return null;
  const currencyCodes = new TextDecoder().decode(codes).split("\n");
  return { base: base as unknown as BaseColumns, currencyCodes, values };
}

/** The blobs of a column end to end; null unless they have `length` bytes together. One that lies well is taken as it is. */
function joined(blobs: readonly Uint8Array[], length: number, width: number): Uint8Array | null {
  if (blobs.reduce((sum, one) => sum + one.length, 0) !== length) return null;
  const [only] = blobs;
  if (blobs.length === 1 && only !== undefined && only.byteOffset % width === 0) return only;
  const whole = new Uint8Array(length);
  let at = 0;
  for (const blob of blobs) {
    whole.set(blob, at);
    at += blob.length;
  }
  return whole;
}

/** Puts the columns in place of whatever copy there was. Call it inside a transaction, with columns read in it. */
export function writeSnapshot(
  db: Database,
  classId: number,
  rowsVersion: number,
  attributes: readonly StoredAttribute[],
  { base, currencyCodes, values }: KeptColumns,
): void {
  endWithValues(db, classId);
  db.prepare("DELETE FROM column_snapshots WHERE class_id = ?").run(classId);
  const insert = db.prepare("INSERT INTO column_snapshots (class_id, name, block, bytes) VALUES (?, ?, ?, ?)");
  const write = (name: string, numbers: Numbers): void => {
    for (let from = 0, block = 0; from < numbers.length || block === 0; from += BLOCK, block++) {
      const part = numbers.subarray(from, from + BLOCK);
      // SQLite takes its own copy; a Buffer over shared memory is refused, so the block is copied out first.
      insert.run(
        classId,
        name,
        block,
        Buffer.from(new Uint8Array(part.buffer, part.byteOffset, part.byteLength).slice()),
      );
    }
  };
  for (const name of Object.keys(BASE_TYPES)) write(`base:${name}`, base[name as keyof BaseColumns]);
  attributes.forEach(({ column }, k) => {
    write(`value:${column}`, values[k]!);
  });
  insert.run(classId, "list:currencies", 0, Buffer.from(currencyCodes.join("\n")));
  db.prepare(
    `INSERT INTO snapshot_stamps (class_id, rows_version, sale_count) VALUES (?, ?, ?)
     ON CONFLICT (class_id) DO UPDATE SET rows_version = excluded.rows_version, sale_count = excluded.sale_count`,
  ).run(classId, rowsVersion, base.ids.length);
}

/** Below this many rows the triggers are simply left to fire. */
const MANY_ROWS = 200;

/**
 * Many rows at once, in one transaction, so that a failure puts everything back: the copy is ended first, and the triggers that would end it again at every
 * row (and make each row a step that can be undone by itself) are taken off while the work runs, and put back.
 */
export function withSnapshotEnded<T>(db: Database, classId: number, rowCount: number, work: () => T): T {
  if (rowCount < MANY_ROWS) return work();
  if (!db.inTransaction) return db.transaction(() => withSnapshotEnded(db, classId, rowCount, work))();
  db.prepare("DELETE FROM snapshot_stamps WHERE class_id = ?").run(classId);
  const triggers = db
    .prepare<[string], { name: string; sql: string }>(
      `SELECT name, sql FROM sqlite_schema
       WHERE type = 'trigger' AND name GLOB 'snapshot_ends_with_*' AND tbl_name IN ('sales', ?)`,
    )
    .all(valuesTable(classId));
  for (const { name } of triggers) db.exec(`DROP TRIGGER ${name}`);
  const result = work();
  for (const { sql } of triggers) db.exec(sql);
  return result;
}

/** Triggers on the class's own table of values; made with the first copy, as before it there is nothing to end. */
function endWithValues(db: Database, classId: number): void {
  const table = valuesTable(classId);
  for (const [act, word] of [
    ["INSERT", "new"],
    ["UPDATE", "changed"],
    ["DELETE", "removed"],
  ]) {
    db.exec(
      `CREATE TRIGGER IF NOT EXISTS snapshot_ends_with_${word}_${table} AFTER ${act} ON ${table}
       BEGIN DELETE FROM snapshot_stamps WHERE class_id = ${classId}; END`,
    );
  }
}
