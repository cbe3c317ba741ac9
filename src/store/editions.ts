/**
 * Editions: numbered within their class, written once, never changed (triggers). An edition keeps its model, the numbers of
 * its sales, their fingerprint and the whole model report, so it can be shown even when the register has moved on.
 */
import type { Database } from "better-sqlite3";
import type { ModelReport } from "../domain/appraisal.ts";
import type { Edition, EditionSummary, PriceModel } from "../domain/priceModel.ts";

export interface NewEdition {
  readonly assetClassId: number;
  readonly savedAtUtc: string;
  readonly savedBy: string;
  readonly model: PriceModel;
  readonly evidenceFingerprint: string;
  /** Numbers of the sales that are its evidence, in the order of the fit. */
  readonly saleIds: ArrayLike<number>;
  readonly summary: EditionSummary;
  readonly report: ModelReport;
}

interface EditionRow {
  id: number;
  class_id: number;
  number: number;
  saved_at_utc: string;
  saved_by: string;
  model_json: string;
  evidence_fingerprint: string;
  sale_count: number;
  summary_json: string;
}

const COLUMNS =
  "id, class_id, number, saved_at_utc, saved_by, model_json, evidence_fingerprint, sale_count, summary_json";

function rowToEdition(row: EditionRow): Edition {
  return {
    id: row.id,
    assetClassId: row.class_id,
    number: row.number,
    savedAtUtc: row.saved_at_utc,
    savedBy: row.saved_by,
    model: JSON.parse(row.model_json) as PriceModel,
    evidenceFingerprint: row.evidence_fingerprint,
    saleCount: row.sale_count,
    summary: JSON.parse(row.summary_json) as EditionSummary,
  };
}

/** Sale numbers as little-endian doubles, whatever the machine: 8 bytes each, exact to 2^53. */
function packIds(ids: ArrayLike<number>): Uint8Array {
  const view = new DataView(new ArrayBuffer(ids.length * 8));
  for (let i = 0; i < ids.length; i++) view.setFloat64(i * 8, ids[i]!, true);
  return new Uint8Array(view.buffer);
}

function unpackIds(bytes: Uint8Array): number[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  return Array.from({ length: bytes.byteLength / 8 }, (_, i) => view.getFloat64(i * 8, true));
}

export type Editions = ReturnType<typeof editionsOf>;

export function editionsOf(db: Database) {
  const selectAll = db.prepare<[number], EditionRow>(
    `SELECT ${COLUMNS} FROM editions WHERE class_id = ? ORDER BY number DESC`,
  );
  const selectLatest = db.prepare<[number], EditionRow>(
    `SELECT ${COLUMNS} FROM editions WHERE class_id = ? ORDER BY number DESC LIMIT 1`,
  );
  const selectOne = db.prepare<[number], EditionRow>(`SELECT ${COLUMNS} FROM editions WHERE id = ?`);
  const selectIds = db.prepare<[number], Uint8Array>("SELECT sale_ids FROM editions WHERE id = ?").pluck();
  const selectReport = db.prepare<[number], string>("SELECT report_json FROM editions WHERE id = ?").pluck();
  const insertRow = db.prepare(
    `INSERT INTO editions (class_id, number, saved_at_utc, saved_by, model_json, evidence_fingerprint, sale_count, sale_ids,
       summary_json, report_json)
     VALUES (@classId, (SELECT coalesce(max(number), 0) + 1 FROM editions WHERE class_id = @classId), @savedAtUtc, @savedBy,
       @model, @fingerprint, @saleCount, @saleIds, @summary, @report)`,
  );

  return {
    /** Newest first. */
    list: (classId: number): Edition[] => selectAll.all(classId).map(rowToEdition),
    latest(classId: number): Edition | null {
      const row = selectLatest.get(classId);
      return row === undefined ? null : rowToEdition(row);
    },
    find(id: number): Edition | null {
      const row = selectOne.get(id);
      return row === undefined ? null : rowToEdition(row);
    },
    /** Numbers of the sales it rests on, in the order of the fit; empty for an unknown edition. */
    saleIds(id: number): number[] {
      const bytes = selectIds.get(id);
      return bytes === undefined ? [] : unpackIds(bytes);
    },
    report(id: number): ModelReport | null {
      const json = selectReport.get(id);
      return json === undefined ? null : (JSON.parse(json) as ModelReport);
    },
    insert(edition: NewEdition): Edition {
      const id = insertRow.run({
        classId: edition.assetClassId,
        savedAtUtc: edition.savedAtUtc,
        savedBy: edition.savedBy,
        model: JSON.stringify(edition.model),
        fingerprint: edition.evidenceFingerprint,
        saleCount: edition.saleIds.length,
        saleIds: packIds(edition.saleIds),
        summary: JSON.stringify(edition.summary),
        report: JSON.stringify(edition.report),
      }).lastInsertRowid as number;
      return rowToEdition(selectOne.get(id)!);
    },
  };
}
