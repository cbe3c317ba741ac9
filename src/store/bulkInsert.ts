/**
 * Many rows at once: indexes are dropped and built again after the rows are in, which sorts once instead of once per row.
 * Worth it only when the rows that come are more than those that are there; inside the caller's transaction, so that a
 * failure puts everything back. The planner's statistics are brought up to date afterwards.
 */
import type { Database } from "better-sqlite3";

/** Below this many rows the indexes are simply kept up as rows arrive. */
const MANY = 20_000;

interface IndexRow {
  name: string;
  sql: string;
}

export function withIndexesRebuilt<T>(db: Database, tables: readonly string[], incoming: number, insert: () => T): T {
  if (incoming < MANY) return insert();
  const indexes = tables.flatMap((table) => {
    const rowCount = db.prepare<[], number>(`SELECT coalesce(max(rowid), 0) FROM ${table}`).pluck().get()!;
    if (rowCount > incoming) return [];
    return db
      .prepare<[string], IndexRow>(
        "SELECT name, sql FROM sqlite_schema WHERE type = 'index' AND tbl_name = ? AND sql IS NOT NULL",
      )
      .all(table);
  });
  for (const { name } of indexes) db.exec(`DROP INDEX ${name}`);
  const result = insert();
  for (const { sql } of indexes) db.exec(sql);
  db.pragma("analysis_limit = 1000");
  for (const table of tables) db.exec(`ANALYZE ${table}`);
  return result;
}
