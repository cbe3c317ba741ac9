import { spawn } from "node:child_process";
import { existsSync, readdirSync, readFileSync, truncateSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import BetterSqlite3 from "better-sqlite3";
import { describe, expect, it } from "vitest";
import { AppError } from "../../src/domain/errors.ts";
import { textsOf } from "../../src/domain/sale.ts";
import { APPLICATION_ID, MIGRATIONS } from "../../src/store/migrate.ts";
import { openStore } from "../../src/store/openStore.ts";
import { fill, freshStore, sale, temporaryFolder } from "./filledStore.ts";

function refusal(work: () => unknown): AppError {
  try {
    work();
  } catch (cause) {
    if (cause instanceof AppError) return cause;
    throw cause;
  }
  throw new Error("nothing was refused");
}

describe("opening a store", () => {
  it("makes a fresh file with the application's mark, the newest layout, write-ahead mode and foreign keys", () => {
    const store = freshStore();
    const db = new BetterSqlite3(store.path);
    expect(db.pragma("application_id", { simple: true })).toBe(APPLICATION_ID);
    expect(db.pragma("user_version", { simple: true })).toBe(MIGRATIONS.length);
    expect(db.pragma("journal_mode", { simple: true })).toBe("wal");
    db.close();
    expect(store.backupPath).toBeNull();
  });

  it("numbers the migrations 1, 2, 3 … without gaps", () => {
    expect(MIGRATIONS.map(({ number }) => number)).toEqual(MIGRATIONS.map((_, index) => index + 1));
  });

  it("makes every table STRICT", () => {
    const store = freshStore();
    fill(store, [sale()]);
    const db = new BetterSqlite3(store.path);
    const loose = db
      .prepare("SELECT name FROM pragma_table_list WHERE schema = 'main' AND strict = 0 AND name NOT LIKE 'sqlite%'")
      .pluck()
      .all();
    db.close();
    expect(loose).toEqual([]);
  });

  it("keeps what was there when it is opened again", () => {
    const path = join(temporaryFolder(), "again.sqlite");
    const first = openStore(path);
    const classId = fill(first, [sale({ values: { hours: 1200, make: "Corvane" } })]);
    first.close();
    const again = freshStore(path);
    expect(again.assetClasses.summary(classId).saleCount).toBe(1);
    expect(again.sales.findSales(classId, [1])[0]!.values).toEqual({
      hours: 1200,
      make: "Corvane",
      cabin: null,
      built: null,
    });
  });

  it("refuses a missing folder, and a missing file when it may not make one", () => {
    const folder = temporaryFolder();
    expect(refusal(() => openStore(join(folder, "nowhere", "a.sqlite"))).code).toBe("no-such-folder");
    expect(refusal(() => openStore(join(folder, "a.sqlite"), { create: false })).code).toBe("no-such-store");
    expect(readdirSync(folder)).toEqual([]);
  });

  it("refuses a file that is no database, and leaves it as it was", () => {
    const path = join(temporaryFolder(), "letter.sqlite");
    const text = "Dear sir or madam, ".repeat(500);
    writeFileSync(path, text);
    const error = refusal(() => openStore(path));
    expect(error.code).toBe("not-a-database");
    expect(error.where).toBe(path);
    expect(readFileSync(path, "utf8")).toBe(text);
  });

  it("refuses a database of another program, and leaves it as it was", () => {
    const path = join(temporaryFolder(), "other.sqlite");
    const other = new BetterSqlite3(path);
    other.exec("CREATE TABLE letters (body TEXT)");
    other.close();
    const before = readFileSync(path);
    expect(refusal(() => openStore(path)).code).toBe("not-a-store");
    expect(readFileSync(path).equals(before)).toBe(true);
  });

  it("refuses a store of a newer program with a sentence that names both layouts", () => {
    const path = join(temporaryFolder(), "newer.sqlite");
    openStore(path).close();
    const db = new BetterSqlite3(path);
    db.pragma("user_version = 99");
    db.close();
    const error = refusal(() => openStore(path));
    expect(error.code).toBe("newer-store");
    expect(error.what).toContain("layout 99");
  });

  it("refuses a file that is cut short", () => {
    const path = join(temporaryFolder(), "short.sqlite");
    const store = openStore(path);
    fill(
      store,
      Array.from({ length: 200 }, () => sale()),
    );
    store.close();
    truncateSync(path, 20_000);
    expect(refusal(() => openStore(path)).code).toBe("store-damaged");
  });
});

describe("a store that is damaged inside", () => {
  it("says so when the damaged part is read, and still opens", () => {
    const path = join(temporaryFolder(), "damaged.sqlite");
    const store = openStore(path);
    const classId = fill(
      store,
      Array.from({ length: 3000 }, (_, i) => sale({ title: `title ${i}`.padEnd(200, ".") })),
    );
    store.close();
    const bytes = readFileSync(path);
    bytes.fill(0xa5, Math.floor(bytes.length / 8 / 4096) * 4096, Math.floor(bytes.length / 4096) * 4096);
    writeFileSync(path, bytes);
    const damaged = freshStore(path);
    const error = refusal(() => damaged.sales.readColumns(classId));
    expect(error.code).toBe("store-damaged");
    expect(error.where).toBe(path);
  });
});

describe("bringing an older store up to date", () => {
  const second = { number: MIGRATIONS.length + 1, name: "later", sql: "ALTER TABLE sales ADD COLUMN later TEXT" };

  it("copies the filled file first, then adds the layout, and keeps every sale", () => {
    const path = join(temporaryFolder(), "older.sqlite");
    const older = openStore(path);
    const classId = fill(older, [sale({ title: "kept" })]);
    older.close();
    const store = freshStore(path, { migrations: [...MIGRATIONS, second] });
    expect(store.sales.findSales(classId, [1])[0]!.title).toBe("kept");
    expect(store.backupPath).not.toBeNull();
    const copy = new BetterSqlite3(store.backupPath!, { readonly: true });
    expect(copy.pragma("user_version", { simple: true })).toBe(MIGRATIONS.length);
    expect(copy.prepare("SELECT title FROM sales").pluck().all()).toEqual(["kept"]);
    copy.close();
  });

  it("changes nothing when a migration fails half way", () => {
    const path = join(temporaryFolder(), "failing.sqlite");
    openStore(path).close();
    const broken = { ...second, sql: "CREATE TABLE half (a TEXT) STRICT; CREATE TABLE sales (a TEXT) STRICT;" };
    expect(() => openStore(path, { migrations: [...MIGRATIONS, broken] })).toThrow();
    const db = new BetterSqlite3(path);
    expect(db.pragma("user_version", { simple: true })).toBe(MIGRATIONS.length);
    expect(db.prepare("SELECT count(*) FROM sqlite_schema WHERE name = 'half'").pluck().get()).toBe(0);
    db.close();
  });

  it("makes no copy when there is nothing to bring up to date", () => {
    const folder = temporaryFolder();
    openStore(join(folder, "a.sqlite")).close();
    openStore(join(folder, "a.sqlite")).close();
    expect(readdirSync(folder)).toEqual(["a.sqlite"]);
  });
});

describe("a transaction", () => {
  it("leaves nothing behind when it fails", () => {
    const store = freshStore();
    const classId = fill(store, []);
    expect(() =>
      store.transaction(() => {
        store.sales.insertSales(classId, null, [{ row: null, sale: sale({ source: "new list" }), cells: null }]);
        throw new Error("stopped");
      }),
    ).toThrow("stopped");
    expect(store.assetClasses.summary(classId).saleCount).toBe(0);
    store.transaction(() =>
      store.sales.insertSales(classId, null, [{ row: null, sale: sale({ source: "new list" }), cells: null }]),
    );
    expect(store.assetClasses.summary(classId).saleCount).toBe(1);
  });

  it("is seen by another window at once, and waits its turn with a sentence", () => {
    const first = freshStore();
    const classId = fill(first, [sale()]);
    const second = freshStore(first.path, { busyTimeoutMs: 20 });
    expect(second.sales.readColumns(classId).count).toBe(1);
    first.transaction(() => {
      first.sales.insertSales(classId, null, [{ row: null, sale: sale(), cells: null }]);
      const error = refusal(() =>
        second.transaction(() => second.sales.setAside(classId, [1], "B", "2026-01-01", "burnt")),
      );
      expect(error.code).toBe("store-busy");
      expect(second.sales.readColumns(classId).count).toBe(1);
    });
    expect(second.sales.readColumns(classId).count).toBe(2);
    expect(second.transaction(() => second.sales.setAside(classId, [1], "B", "2026-01-01", "burnt"))).toBe(1);
    expect(textsOf(first.sales.readColumns(classId).setAsideReasons)).toEqual(["burnt", null]);
  });

  it("loses nothing committed when the process is killed while it writes", async () => {
    const path = join(temporaryFolder(), "killed.sqlite");
    const store = openStore(path);
    const classId = fill(store, []);
    store.close();
    const script = fileURLToPath(new URL("writeUntilKilled.mjs", import.meta.url));
    const child = spawn(process.execPath, [script, path, String(classId)], { stdio: ["ignore", "pipe", "inherit"] });
    let acknowledged = 0;
    await new Promise<void>((resolve) => {
      child.stdout.on("data", (chunk: Buffer) => {
        for (const line of chunk.toString().trim().split("\n")) acknowledged = Math.max(acknowledged, Number(line));
        if (acknowledged >= 40) child.kill("SIGKILL");
      });
      child.on("close", () => resolve());
    });
    expect(child.signalCode).toBe("SIGKILL");
    expect(acknowledged).toBeGreaterThanOrEqual(40);
    const after = freshStore(path);
    const kept = after.assetClasses.summary(classId).saleCount;
    expect(kept).toBeGreaterThanOrEqual(acknowledged * 10);
    expect(kept % 10).toBe(0);
    expect(after.journal.count()).toBe(kept / 10);
    expect(after.journal.verifyChain().intact).toBe(true);
    const check = new BetterSqlite3(path);
    expect(check.pragma("integrity_check", { simple: true })).toBe("ok");
    expect(check.pragma("foreign_key_check")).toEqual([]);
    check.close();
    expect(existsSync(path)).toBe(true);
  });
});
