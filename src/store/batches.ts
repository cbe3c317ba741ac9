/**
 * Import batches: one per file brought in, with the counts that must add up (rows read = accepted + held back + duplicates, a
 * CHECK of the table) and everything needed to convert a held-back row again later.
 */
import type { Database } from "better-sqlite3";
import { AppError } from "../domain/errors.ts";
import type { ColumnMatch, DuplicateRow, ImportBatch, ReadingOptions } from "../domain/importRecord.ts";

export interface NewBatch extends Omit<ImportBatch, "id" | "undone"> {
  readonly options: ReadingOptions;
  readonly match: ColumnMatch;
  readonly headings: readonly string[];
  readonly blankRows: number;
}

interface BatchRow {
  id: number;
  class_id: number;
  file_name: string;
  file_digest: string;
  imported_at_utc: string;
  imported_by: string;
  rows_read: number;
  accepted: number;
  held_back: number;
  duplicates: number;
  undone: number;
}

const COLUMNS =
  "id, class_id, file_name, file_digest, imported_at_utc, imported_by, rows_read, accepted, held_back, duplicates, undone";

function rowToBatch(row: BatchRow): ImportBatch {
  return {
    id: row.id,
    assetClassId: row.class_id,
    fileName: row.file_name,
    fileDigest: row.file_digest,
    importedAtUtc: row.imported_at_utc,
    importedBy: row.imported_by,
    read: row.rows_read,
    accepted: row.accepted,
    heldBack: row.held_back,
    duplicates: row.duplicates,
    undone: row.undone === 1,
  };
}

export type Batches = ReturnType<typeof batchesOf>;

export function batchesOf(db: Database) {
  const selectAll = db.prepare<[number], BatchRow>(
    `SELECT ${COLUMNS} FROM import_batches WHERE class_id = ? ORDER BY id DESC`,
  );
  const selectOne = db.prepare<[number], BatchRow>(`SELECT ${COLUMNS} FROM import_batches WHERE id = ?`);
  const selectReading = db.prepare<[number], { options_json: string; match_json: string; headings_json: string }>(
    "SELECT options_json, match_json, headings_json FROM import_batches WHERE id = ?",
  );
  const insertRow = db.prepare(
    `INSERT INTO import_batches (class_id, file_name, file_digest, imported_at_utc, imported_by, options_json, match_json,
       headings_json, rows_read, accepted, held_back, duplicates, blank_rows)
     VALUES (@assetClassId, @fileName, @fileDigest, @importedAtUtc, @importedBy, @options, @match, @headings, @read,
       @accepted, @heldBack, @duplicates, @blankRows)`,
  );
  const insertDuplicate = db.prepare(
    "INSERT INTO duplicate_rows (batch_id, file_row, same_as_json, why, cells_json) VALUES (?, ?, ?, ?, ?)",
  );
  const selectDuplicates = db.prepare<
    [number],
    { file_row: number; same_as_json: string; why: string; cells_json: string }
  >("SELECT file_row, same_as_json, why, cells_json FROM duplicate_rows WHERE batch_id = ? ORDER BY file_row");
  const countMended = db.prepare(
    "UPDATE import_batches SET accepted = accepted + 1, held_back = held_back - 1 WHERE id = ?",
  );
  const markUndone = db.prepare("UPDATE import_batches SET undone = 1 WHERE id = ?");

  /** Refuses (AppError) an unknown batch, or one of another class. */
  function get(classId: number, id: number): ImportBatch {
    const row = selectOne.get(id);
    if (row !== undefined && row.class_id === classId) return rowToBatch(row);
    throw new AppError({
      family: "store",
      code: "no-such-batch",
      what: "There is no such import in this class.",
      where: `import ${id}`,
      whatToDo: "Choose one of the imports that are listed.",
    });
  }

  return {
    get,
    /** Newest first. */
    list: (classId: number): ImportBatch[] => selectAll.all(classId).map(rowToBatch),
    insert(batch: NewBatch, duplicates: readonly DuplicateRow[]): ImportBatch {
      const id = insertRow.run({
        ...batch,
        options: JSON.stringify(batch.options),
        match: JSON.stringify(batch.match),
        headings: JSON.stringify(batch.headings),
      }).lastInsertRowid as number;
      for (const each of duplicates) {
        insertDuplicate.run(id, each.row, JSON.stringify(each.sameAs), each.why, JSON.stringify(each.cells));
      }
      return get(batch.assetClassId, id);
    },
    /** How the file of the batch was read. */
    reading(id: number): { options: ReadingOptions; match: ColumnMatch; headings: string[] } {
      const row = selectReading.get(id)!;
      return {
        options: JSON.parse(row.options_json) as ReadingOptions,
        match: JSON.parse(row.match_json) as ColumnMatch,
        headings: JSON.parse(row.headings_json) as string[],
      };
    },
    duplicates(id: number): DuplicateRow[] {
      return selectDuplicates.all(id).map((row) => ({
        row: row.file_row,
        sameAs: JSON.parse(row.same_as_json) as DuplicateRow["sameAs"],
        why: row.why as DuplicateRow["why"],
        cells: JSON.parse(row.cells_json) as Record<string, string>,
      }));
    },
    /** One held-back row of the batch has become a sale. */
    countMended: (id: number): void => {
      countMended.run(id);
    },
    markUndone: (id: number): void => {
      markUndone.run(id);
    },
  };
}
