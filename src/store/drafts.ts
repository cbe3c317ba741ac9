/** The subject and engagement a person is working on: one draft per class, overwritten as they type. */
import type { Database } from "better-sqlite3";
import type { Engagement, Subject } from "../domain/subject.ts";

export interface StoredDraft {
  readonly subject: Subject;
  readonly engagement: Engagement | null;
  readonly savedAtUtc: string;
}

interface DraftRow {
  subject_json: string;
  engagement_json: string | null;
  saved_at_utc: string;
}

export type Drafts = ReturnType<typeof draftsOf>;

export function draftsOf(db: Database) {
  const select = db.prepare<[number], DraftRow>(
    "SELECT subject_json, engagement_json, saved_at_utc FROM drafts WHERE class_id = ?",
  );
  const upsert = db.prepare(
    `INSERT INTO drafts (class_id, subject_json, engagement_json, saved_at_utc) VALUES (?, ?, ?, ?)
     ON CONFLICT (class_id) DO UPDATE SET subject_json = excluded.subject_json,
       engagement_json = excluded.engagement_json, saved_at_utc = excluded.saved_at_utc`,
  );
  return {
    read(classId: number): StoredDraft | null {
      const row = select.get(classId);
      if (row === undefined) return null;
      return {
        subject: JSON.parse(row.subject_json) as Subject,
        engagement: row.engagement_json === null ? null : (JSON.parse(row.engagement_json) as Engagement),
        savedAtUtc: row.saved_at_utc,
      };
    },
    write(classId: number, draft: StoredDraft): void {
      const engagement = draft.engagement === null ? null : JSON.stringify(draft.engagement);
      upsert.run(classId, JSON.stringify(draft.subject), engagement, draft.savedAtUtc);
    },
  };
}
