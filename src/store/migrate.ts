/**
 * Brings a store file to the newest layout: numbered SQL files, each in its own transaction that raises user_version.
 * A file that already holds data is copied beside itself first; a file from a newer program is refused with a sentence.
 */
import { existsSync } from "node:fs";
import type { Database } from "better-sqlite3";
import { AppError } from "../domain/errors.ts";

/** "LTWR" as a big-endian number: marks a SQLite file as one of ours (PRAGMA application_id). */
export const APPLICATION_ID = 0x4c545752;

export interface Migration {
  readonly number: number;
  readonly name: string;
  readonly sql: string;
}

const files: Record<string, string> = import.meta.glob("./migrations/*.sql", {
  query: "?raw",
  import: "default",
  eager: true,
});

/** All migrations in order, 1, 2, 3 … without gaps. */
export const MIGRATIONS: readonly Migration[] = Object.entries(files)
  .map(([path, sql]) => {
    const name = path.slice(path.lastIndexOf("/") + 1, -".sql".length);
    return { number: Number(name.slice(0, 4)), name, sql };
  })
  .sort((a, b) => a.number - b.number);

/** Where the copy made before a migration goes: "sales.sqlite" → "sales.before-0002.sqlite", never over an older copy. */
export function backupPath(path: string, firstNumber: number): string {
  const dot = path.lastIndexOf(".");
  const cut = dot > Math.max(path.lastIndexOf("/"), path.lastIndexOf("\\")) ? dot : path.length;
  const base = `${path.slice(0, cut)}.before-${String(firstNumber).padStart(4, "0")}`;
  let candidate = `${base}${path.slice(cut)}`;
  for (let k = 2; existsSync(candidate); k++) candidate = `${base}-${k}${path.slice(cut)}`;
  return candidate;
}

function refuseForeign(db: Database, path: string, newest: number): number {
  const version = db.pragma("user_version", { simple: true }) as number;
  const mark = db.pragma("application_id", { simple: true }) as number;
  const tables = db.prepare("SELECT count(*) FROM sqlite_schema").pluck().get() as number;
  if (mark !== APPLICATION_ID && (mark !== 0 || version !== 0 || tables !== 0)) {
    throw new AppError({
      family: "store",
      code: "not-a-store",
      what: "This file is a database, but not a store of this program.",
      where: path,
      whatToDo: "Choose another file, or give a new name to start a fresh store.",
    });
  }
  if (version > newest) {
    throw new AppError({
      family: "store",
      code: "newer-store",
      what: `This store was written by a newer version of the program (layout ${version}; this one knows ${newest}).`,
      where: path,
      whatToDo: "Open it with the newer version; nothing was changed.",
    });
  }
  return version;
}

/**
 * Runs what is missing and returns the path of the copy made first, or null when none was needed.
 * Refuses (AppError) a foreign database and a newer store.
 */
export function migrate(db: Database, path: string, migrations: readonly Migration[] = MIGRATIONS): string | null {
  const version = refuseForeign(db, path, migrations.at(-1)?.number ?? 0);
  const pending = migrations.filter((migration) => migration.number > version);
  if (pending.length === 0) return null;
  const copy = version > 0 && path !== ":memory:" ? backupPath(path, pending[0]!.number) : null;
  if (copy !== null) db.prepare("VACUUM INTO ?").run(copy);
  for (const migration of pending) {
    db.transaction(() => {
      // Another process may have brought the file up to date while this one waited for the lock.
      if ((db.pragma("user_version", { simple: true }) as number) >= migration.number) return;
      db.exec(migration.sql);
      db.pragma(`application_id = ${APPLICATION_ID}`);
      db.pragma(`user_version = ${migration.number}`);
    }).immediate();
  }
  return copy;
}
