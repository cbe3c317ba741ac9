import BetterSqlite3 from "better-sqlite3";
import { describe, expect, it } from "vitest";
import type { ColumnMatch, DuplicateRow, HeldBackRow, ReadingOptions } from "../../src/domain/importRecord.ts";
import { textsOf } from "../../src/domain/sale.ts";
import type { NewBatch } from "../../src/store/batches.ts";
import type { Store } from "../../src/store/openStore.ts";
import { fill, freshStore, sale } from "./filledStore.ts";

const OPTIONS: ReadingOptions = {
  encoding: "utf-8",
  delimiter: ";",
  decimalMark: ",",
  thousandsMark: ".",
  dateOrder: "dmy",
  hasHeading: true,
};
const MATCH: ColumnMatch = {
  columns: [{ heading: "Price", target: { to: "price" } }],
  fixed: {
    soldOn: "2025-01-01",
    currencyCode: "EUR",
    channel: "auction",
    source: "list",
    priceBasis: { premium: "in", tax: "out" },
  },
};
const HELD: HeldBackRow = {
  row: 4,
  cells: { Price: "free" },
  reasons: [{ column: "Price", value: "free", reason: "No number.", suggestion: null }],
};
const TWIN: DuplicateRow = { row: 5, sameAs: { row: 2 }, why: "same day, price and values", cells: { Price: "1.000" } };

function batch(classId: number, change: Partial<NewBatch> = {}): NewBatch {
  return {
    assetClassId: classId,
    fileName: "spring.csv",
    fileDigest: "d".repeat(64),
    importedAtUtc: "2026-01-01T00:00:00Z",
    importedBy: "A. Valuer",
    options: OPTIONS,
    match: MATCH,
    headings: ["Price"],
    read: 4,
    accepted: 2,
    heldBack: 1,
    duplicates: 1,
    blankRows: 1,
    ...change,
  };
}

/** Two sales, one held-back row and one duplicate. */
function importFour(store: Store, classId: number) {
  return store.transaction(() => {
    const made = store.batches.insert(batch(classId), [TWIN]);
    store.sales.insertSales(classId, made.id, [
      { row: 2, sale: sale({ title: "two", values: { make: "Brannock", built: "2019-05-06" } }), cells: ["1.000"] },
      { row: 3, sale: sale({ title: "three" }), cells: [" 2.000 "] },
    ]);
    store.heldBack.insert(made.id, [HELD]);
    return made;
  });
}

describe("an import batch", () => {
  it("comes back with its counts, how it was read, its duplicates and the verbatim cells of every row", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const made = importFour(store, classId);
    expect(store.batches.list(classId)).toEqual([made]);
    expect(made).toMatchObject({ read: 4, accepted: 2, heldBack: 1, duplicates: 1, undone: false });
    expect(store.batches.reading(made.id)).toEqual({ options: OPTIONS, match: MATCH, headings: ["Price"] });
    expect(store.batches.duplicates(made.id)).toEqual([TWIN]);
    expect(store.heldBack.list(classId)).toEqual([{ ...HELD, id: 1, batchId: made.id, fileName: "spring.csv" }]);
    expect(store.sales.cells(2)).toEqual([" 2.000 "]);
    expect(store.sales.findSales(classId, [2])[0]).toMatchObject({ batchId: made.id, fileRow: 3 });
    expect(store.assetClasses.summary(classId).heldBackCount).toBe(1);
  });

  it("can't be written when rows read do not add up", () => {
    const store = freshStore();
    const classId = fill(store, []);
    expect(() => store.batches.insert(batch(classId, { read: 5 }), [])).toThrow();
    expect(store.batches.list(classId)).toEqual([]);
  });

  it("still adds up after a held-back row is mended", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const made = importFour(store, classId);
    store.batches.countMended(made.id);
    store.heldBack.closeMended(1, 3);
    const { read, accepted, heldBack, duplicates } = store.batches.get(classId, made.id);
    expect([read, accepted, heldBack, duplicates]).toEqual([4, 3, 0, 1]);
    expect(store.heldBack.list(classId)).toEqual([]);
    expect(() => store.heldBack.get(classId, 1)).toThrow("not held back");
  });

  it("is another class's business there only", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const made = importFour(store, classId);
    expect(() => store.batches.get(classId + 1, made.id)).toThrow("no such import");
    expect(() => store.heldBack.get(classId + 1, 1)).toThrow("not held back");
  });

  it("leaves the register whole when it is undone, and its sales can still be read by number", () => {
    const store = freshStore();
    const classId = fill(store, [sale({ title: "one" })]);
    const made = importFour(store, classId);
    store.sales.setAside(classId, [2], "A", "2026-01-01", "burnt");
    const [before] = store.sales.findSales(classId, [2]);
    const removed = store.transaction(() => store.sales.removeBatch(classId, made.id, "2026-01-02T00:00:00Z"));
    expect(removed).toBe(2);
    expect(textsOf(store.sales.readColumns(classId).titles)).toEqual(["one"]);
    expect(store.assetClasses.summary(classId).saleCount).toBe(1);
    expect(store.sales.findSales(classId, [2, 1]).map(({ title }) => title)).toEqual(["one", "two"]);
    expect(store.sales.findSales(classId, [2])).toEqual([before]);
    expect(store.sales.cells(2)).toEqual(["1.000"]);
  });

  it("never gives the number of a sale that was taken out to another sale", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const made = importFour(store, classId);
    store.sales.removeBatch(classId, made.id, "2026-01-02T00:00:00Z");
    expect(store.sales.insertSales(classId, null, [{ row: null, sale: sale(), cells: null }])).toEqual([3]);
  });

  it("leaves no dangling reference behind", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const made = importFour(store, classId);
    store.sales.removeBatch(classId, made.id, "2026-01-02T00:00:00Z");
    store.heldBack.closeBatch(made.id);
    store.batches.markUndone(made.id);
    expect(store.batches.get(classId, made.id).undone).toBe(true);
    expect(store.heldBack.list(classId)).toEqual([]);
    const db = new BetterSqlite3(store.path, { readonly: true });
    expect(db.pragma("foreign_key_check")).toEqual([]);
    expect(db.pragma("integrity_check", { simple: true })).toBe("ok");
    db.close();
  });
});

describe("a column match", () => {
  it("is remembered per class for files with the same headings, whatever their case", () => {
    const store = freshStore();
    const classId = fill(store, []);
    expect(store.columnMatches.recall(classId, ["Price"])).toBeNull();
    store.columnMatches.remember(classId, ["Price", " Sold on"], MATCH, "2026-01-01T00:00:00Z");
    expect(store.columnMatches.recall(classId, ["price ", "SOLD ON"])).toEqual(MATCH);
    expect(store.columnMatches.recall(classId, ["Sold on", "Price"])).toBeNull();
    expect(store.columnMatches.recall(classId + 1, ["Price", "Sold on"])).toBeNull();
  });
});
