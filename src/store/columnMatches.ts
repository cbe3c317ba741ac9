/** The column match last used in a class for files with the same headings: asked once, remembered per kind of file. */
import type { Database } from "better-sqlite3";
import type { ColumnMatch } from "../domain/importRecord.ts";

function signatureOf(headings: readonly string[]): string {
  return JSON.stringify(headings.map((heading) => heading.trim().toLowerCase()));
}

export type ColumnMatches = ReturnType<typeof columnMatchesOf>;

export function columnMatchesOf(db: Database) {
  const select = db
    .prepare<[number, string], string>("SELECT match_json FROM column_matches WHERE class_id = ? AND headings_json = ?")
    .pluck();
  const upsert = db.prepare(
    `INSERT INTO column_matches (class_id, headings_json, match_json, used_at_utc) VALUES (?, ?, ?, ?)
     ON CONFLICT (class_id, headings_json) DO UPDATE SET match_json = excluded.match_json, used_at_utc = excluded.used_at_utc`,
  );
  return {
    recall(classId: number, headings: readonly string[]): ColumnMatch | null {
      const json = select.get(classId, signatureOf(headings));
      return json === undefined ? null : (JSON.parse(json) as ColumnMatch);
    },
    remember(classId: number, headings: readonly string[], match: ColumnMatch, atUtc: string): void {
      upsert.run(classId, signatureOf(headings), JSON.stringify(match), atUtc);
    },
  };
}
