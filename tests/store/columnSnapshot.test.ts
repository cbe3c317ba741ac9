/** The copy of sales as columns: read when it stands, never when it may be stale, torn or half written. */
import { spawn } from "node:child_process";
import { fileURLToPath } from "node:url";
import BetterSqlite3, { type Database } from "better-sqlite3";
import { describe, expect, it } from "vitest";
import { type SaleColumns, textsOf } from "../../src/domain/sale.ts";
import { SNAPSHOT_SALES } from "../../src/store/columnSnapshot.ts";
import { openStore, type Store } from "../../src/store/openStore.ts";
import { fill, freshStore, sale } from "./filledStore.ts";

const MANY = Array.from({ length: SNAPSHOT_SALES + 3 }, (_, i) =>
  sale({
    title: `item ${i}`,
    reference: i % 3 === 0 ? null : `L-${i}`,
    priceMinor: 1000 + i,
    channel: i % 2 === 0 ? "auction" : "dealer",
    source: i % 5 === 0 ? "autumn list" : "spring list",
    currencyCode: i % 7 === 0 ? "JPY" : "EUR",
    values: { hours: i % 11 === 0 ? null : i / 8, make: i % 2 === 0 ? "Brannock" : "Corvane", cabin: i % 4 === 0 },
  }),
);

interface Kept {
  readonly store: Store;
  readonly classId: number;
  readonly db: Database;
}

/** A class with many sales whose columns have been read once, and a second way into its file. */
function kept(): Kept {
  const store = freshStore();
  const classId = fill(store, MANY);
  store.sales.readColumns(classId);
  return { store, classId, db: new BetterSqlite3(store.path) };
}

function stampOf({ db, classId }: Kept): unknown {
  return db.prepare("SELECT sale_count FROM snapshot_stamps WHERE class_id = ?").pluck().get(classId);
}

/** As another window would read them. */
function readAnew({ store, classId }: Kept): SaleColumns {
  const other = openStore(store.path);
  const columns = other.sales.readColumns(classId);
  // Texts are looked up when asked for, so they are asked for while the store is open.
  const plain = { ...columns, titles: textsOf(columns.titles), references: textsOf(columns.references) };
  other.close();
  return plain;
}

function plain(columns: SaleColumns) {
  const { titles, references, currencyCodes, channels, sources, priceBases, setAsideReasons, ...numbers } = columns;
  const texts = [titles, references, currencyCodes, channels, sources, priceBases, setAsideReasons];
  return { texts: texts.map((column) => textsOf<string | null>(column)), numbers };
}

describe("the copy in columns", () => {
  it("is written by the first reading of many sales and says the same as the rows", () => {
    const one = kept();
    expect(stampOf(one)).toBe(MANY.length);
    const fromCopy = plain(readAnew(one));
    one.db.exec("DELETE FROM snapshot_stamps");
    expect(plain(readAnew(one))).toEqual(fromCopy);
    expect(fromCopy.texts[0]![7]).toBe("item 7");
    expect(fromCopy.numbers.price[7]).toBe(1007);
    one.db.close();
  });

  it("is what is read while it stands: a changed blob shows", () => {
    const one = kept();
    const marked = Buffer.from(new Float64Array(MANY.length).fill(42).buffer);
    one.db
      .prepare("UPDATE column_snapshots SET bytes = ? WHERE class_id = ? AND name = 'base:price'")
      .run(marked, one.classId);
    expect(readAnew(one).price[5]).toBe(42);
    one.db.close();
  });

  const writes: readonly [string, (one: Kept) => void][] = [
    [
      "bringing sales in",
      ({ store, classId }) =>
        void store.transaction(() =>
          store.sales.insertSales(classId, null, [{ row: null, sale: sale(), cells: null }]),
        ),
    ],
    [
      "bringing many sales in at once, which puts the guards back",
      ({ store, classId, db }) => {
        const many = Array.from({ length: 300 }, () => ({ row: null, sale: sale(), cells: null }));
        store.transaction(() => store.sales.insertSales(classId, null, many));
        const guards = db
          .prepare("SELECT count(*) FROM sqlite_schema WHERE name LIKE 'snapshot_ends_with%'")
          .pluck()
          .get();
        expect(guards).toBe(6);
      },
    ],
    ["raw SQL on a price", ({ db }) => void db.exec("UPDATE sales SET price_minor = 5 WHERE id = 3")],
    ["raw SQL on a day", ({ db }) => void db.exec("UPDATE sales SET sold_on = 5 WHERE id = 3")],
    [
      "raw SQL on a value",
      ({ db, classId }) => void db.exec(`UPDATE sale_values_${classId} SET sale_id = sale_id WHERE sale_id = 3`),
    ],
    [
      "raw SQL that takes a sale out",
      ({ db, classId }) =>
        void db.exec(
          `PRAGMA foreign_keys = OFF; DELETE FROM sale_values_${classId} WHERE sale_id = 3; DELETE FROM sales WHERE id = 3`,
        ),
    ],
  ];
  it.each(writes)("ends with %s", (_, write) => {
    const one = kept();
    write(one);
    expect(stampOf(one)).toBeUndefined();
    const columns = readAnew(one);
    const rows = one.db.prepare("SELECT count(*) FROM sales WHERE class_id = ?").pluck().get(one.classId);
    expect(columns.count).toBe(rows);
    one.db.close();
  });

  it("does not count for another rows_version, as when an attribute is added", () => {
    const one = kept();
    one.store.transaction(() =>
      one.store.attributes.insert(one.classId, {
        ...one.store.assetClasses.get(one.classId).attributes[0]!,
        key: "weight",
        label: "Weight",
      }),
    );
    const columns = readAnew(one);
    expect(Object.keys(columns.values)).toContain("weight");
    expect(columns.values.weight!.every(Number.isNaN)).toBe(true);
    one.db.close();
  });

  it("stands while sales are verified and set aside, whose marks are read beside it", () => {
    const one = kept();
    one.store.sales.setAside(one.classId, [2], "A", "2026-01-01", "burnt");
    one.store.sales.verify(one.classId, [4], "A", "2026-01-01", "invoice");
    expect(stampOf(one)).toBe(MANY.length);
    const columns = readAnew(one);
    expect(columns.setAsideReasons.at(1)).toBe("burnt");
    expect(columns.verified[3]).toBe(1);
    one.db.close();
  });

  it("is passed over when a block is torn or missing", () => {
    const one = kept();
    one.db.exec("UPDATE column_snapshots SET bytes = substr(bytes, 1, 100) WHERE name = 'base:price'");
    expect(readAnew(one).price[9]).toBe(10.09);
    one.db.exec("DELETE FROM column_snapshots WHERE name LIKE 'value:%'");
    expect(readAnew(one).values.hours![8]).toBe(1);
    one.db.close();
  });

  it("is not made for few sales", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    store.sales.readColumns(classId);
    const db = new BetterSqlite3(store.path);
    expect(db.prepare("SELECT count(*) FROM column_snapshots").pluck().get()).toBe(0);
    db.close();
  });

  it("is whole or not there after the program is killed while writing it", async () => {
    const one = kept();
    const { path } = one.store;
    one.db.close();
    one.store.close();
    const script = fileURLToPath(new URL("snapshotUntilKilled.mjs", import.meta.url));
    const child = spawn(process.execPath, [script, path, String(one.classId)], {
      stdio: ["ignore", "pipe", "inherit"],
    });
    await new Promise<void>((resolve) => {
      child.stdout.on("data", (chunk: Buffer) => {
        if (chunk.toString().includes("2")) setTimeout(() => child.kill("SIGKILL"), 37);
      });
      child.on("close", () => resolve());
    });
    expect(child.signalCode).toBe("SIGKILL");
    const db = new BetterSqlite3(path);
    const after = { ...one, db };
    const stamped = stampOf(after);
    const columns = readAnew(after);
    const price = db
      .prepare<[], [number, string]>("SELECT price_minor, currency_code FROM sales ORDER BY id")
      .raw()
      .all();
    expect(columns.price[9]).toBe(price[9]![0] / (price[9]![1] === "JPY" ? 1 : 100));
    expect([undefined, MANY.length]).toContain(stamped);
    expect(db.pragma("integrity_check", { simple: true })).toBe("ok");
    db.close();
  });
});

it("ends when another window changes a sale after the copy was written", () => {
  const store = freshStore();
  const classId = fill(store, MANY);
  const columns = store.sales.readColumns(classId);
  const other = new BetterSqlite3(store.path);
  other.exec("UPDATE sales SET price_minor = 77 WHERE id = 3");
  expect(columns.price[2]).toBe(10.02);
  expect(other.prepare("SELECT count(*) FROM snapshot_stamps").pluck().get()).toBe(0);
  const again = openStore(store.path);
  expect(again.sales.readColumns(classId).price[2]).toBe(0.77);
  again.close();
  other.close();
});

it("puts its guards back when bringing many sales in fails", () => {
  const one = kept();
  const bad = [
    ...Array.from({ length: 300 }, () => ({ row: null, sale: sale(), cells: null })),
    { row: 301, sale: sale({ soldOn: "no day" }), cells: null },
  ];
  expect(() => one.store.sales.insertSales(one.classId, null, bad)).toThrow();
  const guards = one.db
    .prepare("SELECT count(*) FROM sqlite_schema WHERE name LIKE 'snapshot_ends_with%'")
    .pluck()
    .get();
  expect(guards).toBe(6);
  expect(stampOf(one)).toBe(MANY.length);
  one.db.close();
});
