/** SQLite's failures as the few kinds a person can act on. Anything else stays a bug and goes to the log as it is. */
import BetterSqlite3 from "better-sqlite3";
import { AppError } from "../domain/errors.ts";

const KINDS: readonly { starts: string; code: string; what: string; whatToDo: string }[] = [
  {
    starts: "SQLITE_BUSY",
    code: "store-busy",
    what: "The store is being written by another window or command, and did not become free in time.",
    whatToDo: "Wait until the other one is done, then try again; nothing was changed.",
  },
  {
    starts: "SQLITE_NOTADB",
    code: "not-a-database",
    what: "This file is not a store: it is no database at all.",
    whatToDo: "Choose another file, or give a new name to start a fresh store.",
  },
  {
    starts: "SQLITE_CORRUPT",
    code: "store-damaged",
    what: "The store file is damaged and can't be read safely.",
    whatToDo: "Put back the newest copy of the file; keep the damaged one, since parts of it may still be read.",
  },
  {
    starts: "SQLITE_FULL",
    code: "disk-full",
    what: "The disk is full, so the change was not saved.",
    whatToDo: "Free some space and try again; what was saved before is intact.",
  },
  {
    starts: "SQLITE_READONLY",
    code: "store-read-only",
    what: "The store file can't be written: it, or its folder, is read-only.",
    whatToDo: "Copy the store to a folder where you may write, or change the permission of the file.",
  },
  {
    starts: "SQLITE_CANTOPEN",
    code: "store-not-opened",
    what: "The store file could not be opened.",
    whatToDo: "Check that the folder is there and that you may write in it.",
  },
  {
    starts: "SQLITE_IOERR",
    code: "disk-failed",
    what: "The disk failed while the store was being read or written.",
    whatToDo: "Check the disk or the network drive; what was saved before is intact.",
  },
];

/** The AppError for a known SQLite failure; the cause itself otherwise. */
export function storeFailure(cause: unknown, path: string): unknown {
  if (!(cause instanceof BetterSqlite3.SqliteError)) return cause;
  const kind = KINDS.find((each) => cause.code.startsWith(each.starts));
  if (kind === undefined) return cause;
  return new AppError({
    family: "store",
    code: kind.code,
    what: kind.what,
    where: path,
    whatToDo: kind.whatToDo,
    cause,
  });
}
