/**
 * Opens a store: one SQLite file in write-ahead mode, every commit on disk before it returns (synchronous = FULL), brought to
 * the newest layout first. Other windows and commands may have the same file open.
 */
import { existsSync } from "node:fs";
import { dirname } from "node:path";
import BetterSqlite3, { type Database } from "better-sqlite3";
import { AppError } from "../domain/errors.ts";
import { type AssetClasses, assetClassesOf } from "./assetClasses.ts";
import { type Attributes, attributesOf } from "./attributes.ts";
import { type Batches, batchesOf } from "./batches.ts";
import { type ColumnMatches, columnMatchesOf } from "./columnMatches.ts";
import { type Drafts, draftsOf } from "./drafts.ts";
import { type Editions, editionsOf } from "./editions.ts";
import { type HeldBack, heldBackOf } from "./heldBack.ts";
import { type Journal, journalOf } from "./journal.ts";
import { MIGRATIONS, type Migration, migrate } from "./migrate.ts";
import { type Sales, salesOf } from "./sales.ts";
import { type SettingsTable, settingsOf } from "./settings.ts";
import { type Sheets, sheetsOf } from "./sheets.ts";
import { storeFailure } from "./storeErrors.ts";

export interface Store {
  readonly path: string;
  /** Copy that was made before the layout was brought up to date, or null. */
  readonly backupPath: string | null;
  readonly assetClasses: AssetClasses;
  readonly attributes: Attributes;
  readonly sales: Sales;
  readonly batches: Batches;
  readonly heldBack: HeldBack;
  readonly columnMatches: ColumnMatches;
  readonly editions: Editions;
  readonly drafts: Drafts;
  readonly sheets: Sheets;
  readonly journal: Journal;
  readonly settings: SettingsTable;
  /** Runs `work` (synchronous) whole or not at all. SQLite's own failures come out as AppErrors. */
  transaction<T>(work: () => T): T;
  close(): void;
}

export interface OpenOptions {
  /** False: refuse when there is no file at the path. */
  readonly create?: boolean;
  readonly migrations?: readonly Migration[];
  /** How long to wait for another window or command that is writing. */
  readonly busyTimeoutMs?: number;
}

const BUSY_TIMEOUT_MS = 5000;
/** Upper bound of the page cache: filters over a million sales look rows up all over the file. */
const CACHE_KIBIBYTES = 262_144;

function refuseMissing(path: string, create: boolean): void {
  if (path === ":memory:" || existsSync(path)) return;
  if (create && existsSync(dirname(path))) return;
  throw new AppError({
    family: "store",
    code: create ? "no-such-folder" : "no-such-store",
    what: create ? "The folder for the store does not exist." : "There is no store at this place.",
    where: path,
    whatToDo: create
      ? "Make the folder, or choose another one."
      : "Check the name, or import a file of sales to make a store.",
  });
}

function connect(path: string, timeoutMs: number): Database {
  const db = new BetterSqlite3(path, { timeout: timeoutMs });
  try {
    db.pragma("foreign_keys = ON");
    // Without it, INSERT OR REPLACE would delete rows past the triggers that guard them.
    db.pragma("recursive_triggers = ON");
    return db;
  } catch (cause) {
    db.close();
    throw cause;
  }
}

/** The same functions, whose SQLite failures come out as AppErrors. */
function guarded<T extends object>(aggregate: T, path: string): T {
  const guard =
    (work: (...args: unknown[]) => unknown) =>
    (...args: unknown[]) => {
      try {
        return work(...args);
      } catch (cause) {
        throw storeFailure(cause, path);
      }
    };
  return Object.fromEntries(Object.entries(aggregate).map(([name, work]) => [name, guard(work)])) as T;
}

function prepare(db: Database, path: string, migrations: readonly Migration[]): Store {
  // Refusals come before the first write, so that a foreign or newer file is left as it was.
  const backupPath = migrate(db, path, migrations);
  db.pragma("journal_mode = WAL");
  db.pragma("synchronous = FULL");
  db.pragma(`cache_size = -${CACHE_KIBIBYTES}`);
  const attributes = attributesOf(db);
  const assetClasses = assetClassesOf(db, attributes);
  return {
    path,
    backupPath,
    assetClasses: guarded(assetClasses, path),
    attributes: guarded(attributes, path),
    sales: guarded(salesOf(db, assetClasses, attributes), path),
    batches: guarded(batchesOf(db), path),
    heldBack: guarded(heldBackOf(db), path),
    columnMatches: guarded(columnMatchesOf(db), path),
    editions: guarded(editionsOf(db), path),
    drafts: guarded(draftsOf(db), path),
    sheets: guarded(sheetsOf(db), path),
    journal: guarded(journalOf(db), path),
    settings: guarded(settingsOf(db), path),
    transaction<T>(work: () => T): T {
      try {
        return db.transaction(work).immediate();
      } catch (cause) {
        throw storeFailure(cause, path);
      }
    },
    close: () => {
      db.close();
    },
  };
}

/**
 * Opens or makes the store at `path` (":memory:" for none on disk). Refuses (AppError) a missing folder, a file that is no
 * database, a database of another program, a damaged file and a store of a newer program.
 */
export function openStore(path: string, options: OpenOptions = {}): Store {
  refuseMissing(path, options.create ?? true);
  let db: Database | null = null;
  try {
    db = connect(path, options.busyTimeoutMs ?? BUSY_TIMEOUT_MS);
    return prepare(db, path, options.migrations ?? MIGRATIONS);
  } catch (cause) {
    db?.close();
    throw storeFailure(cause, path);
  }
}
