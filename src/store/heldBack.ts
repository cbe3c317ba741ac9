/** Rows that could not be read: kept verbatim with their reasons until someone mends them or leaves them out. */
import type { Database } from "better-sqlite3";
import { AppError } from "../domain/errors.ts";
import type { HeldBackReason, HeldBackRow, StoredHeldBackRow } from "../domain/importRecord.ts";

interface HeldBackDbRow {
  id: number;
  batch_id: number;
  file_name: string;
  file_row: number;
  cells_json: string;
  reasons_json: string;
}

const SELECT = `SELECT h.id, h.batch_id, b.file_name, h.file_row, h.cells_json, h.reasons_json
  FROM held_back_rows h JOIN import_batches b ON b.id = h.batch_id WHERE h.state = 'open'`;

function rowToHeldBack(row: HeldBackDbRow): StoredHeldBackRow {
  return {
    id: row.id,
    batchId: row.batch_id,
    fileName: row.file_name,
    row: row.file_row,
    cells: JSON.parse(row.cells_json) as Record<string, string>,
    reasons: JSON.parse(row.reasons_json) as HeldBackReason[],
  };
}

export type HeldBack = ReturnType<typeof heldBackOf>;

export function heldBackOf(db: Database) {
  const selectAll = db.prepare<[number], HeldBackDbRow>(`${SELECT} AND b.class_id = ? ORDER BY h.batch_id, h.file_row`);
  const selectOne = db.prepare<[number, number], HeldBackDbRow>(`${SELECT} AND h.id = ? AND b.class_id = ?`);
  const insertRow = db.prepare(
    "INSERT INTO held_back_rows (batch_id, file_row, cells_json, reasons_json) VALUES (?, ?, ?, ?)",
  );
  const updateReasons = db.prepare("UPDATE held_back_rows SET cells_json = ?, reasons_json = ? WHERE id = ?");
  const closeMended = db.prepare("UPDATE held_back_rows SET state = 'mended', sale_id = ? WHERE id = ?");
  const closeLeftOut = db.prepare("UPDATE held_back_rows SET state = 'leftOut', left_out_reason = ? WHERE id = ?");
  const closeUndone = db.prepare("UPDATE held_back_rows SET state = 'undone' WHERE batch_id = ? AND state = 'open'");

  return {
    /** Open rows of the class, in the order of import and file. */
    list: (classId: number): StoredHeldBackRow[] => selectAll.all(classId).map(rowToHeldBack),
    /** Refuses (AppError) a row that is not (or no longer) held back in this class. */
    get(classId: number, id: number): StoredHeldBackRow {
      const row = selectOne.get(id, classId);
      if (row !== undefined) return rowToHeldBack(row);
      throw new AppError({
        family: "store",
        code: "not-held-back",
        what: "This row is not held back any more.",
        where: `held-back row ${id}`,
        whatToDo: "Read the list again; it may have been mended or left out meanwhile.",
      });
    },
    insert(batchId: number, rows: readonly HeldBackRow[]): void {
      for (const row of rows) insertRow.run(batchId, row.row, JSON.stringify(row.cells), JSON.stringify(row.reasons));
    },
    /** Mended, but not well enough yet. */
    changeCells(id: number, cells: Readonly<Record<string, string>>, reasons: readonly HeldBackReason[]): void {
      updateReasons.run(JSON.stringify(cells), JSON.stringify(reasons), id);
    },
    closeMended: (id: number, saleId: number): void => {
      closeMended.run(saleId, id);
    },
    closeLeftOut: (id: number, reason: string): void => {
      closeLeftOut.run(reason, id);
    },
    /** The open rows of a batch that is undone. */
    closeBatch: (batchId: number): void => {
      closeUndone.run(batchId);
    },
  };
}
