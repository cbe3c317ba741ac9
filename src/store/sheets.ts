/**
 * Issued sheets with their bytes. A sheet is never altered or deleted (triggers); it can be withdrawn or superseded, once,
 * with a reason. Numbers run within the year of issue: 2026-0001, 2026-0002 …
 */
import type { Database } from "better-sqlite3";
import { AppError } from "../domain/errors.ts";
import type { SheetRecord, SheetState } from "../domain/sheetRecord.ts";

export interface NewSheet extends Omit<SheetRecord, "id" | "state" | "stateReason" | "editionNumber"> {
  readonly editionId: number;
  readonly bytes: Uint8Array;
}

interface SheetRow {
  id: number;
  class_id: number;
  number: string;
  state: SheetState;
  state_reason: string | null;
  title: string;
  amount: number;
  low: number;
  high: number;
  currency_code: string;
  effective_on: string;
  issued_at_utc: string;
  issued_by: string;
  digest: string;
  edition_number: number;
}

const SELECT = `SELECT s.id, s.class_id, s.number, s.state, s.state_reason, s.title, s.amount, s.low, s.high,
  s.currency_code, s.effective_on, s.issued_at_utc, s.issued_by, s.digest, e.number AS edition_number
  FROM sheets s JOIN editions e ON e.id = s.edition_id`;

function rowToSheet(row: SheetRow): SheetRecord {
  return {
    id: row.id,
    assetClassId: row.class_id,
    number: row.number,
    state: row.state,
    title: row.title,
    amount: row.amount,
    low: row.low,
    high: row.high,
    currencyCode: row.currency_code,
    effectiveOn: row.effective_on,
    issuedAtUtc: row.issued_at_utc,
    issuedBy: row.issued_by,
    digest: row.digest,
    editionNumber: row.edition_number,
    stateReason: row.state_reason,
  };
}

export type Sheets = ReturnType<typeof sheetsOf>;

export function sheetsOf(db: Database) {
  const selectAll = db.prepare<[number], SheetRow>(`${SELECT} WHERE s.class_id = ? ORDER BY s.id DESC`);
  const selectOne = db.prepare<[number], SheetRow>(`${SELECT} WHERE s.id = ?`);
  const selectByDigest = db.prepare<[string], SheetRow>(`${SELECT} WHERE s.digest = ?`);
  const selectByNumber = db.prepare<[string], SheetRow>(`${SELECT} WHERE s.number = ?`);
  const selectBytes = db.prepare<[number], Uint8Array>("SELECT bytes FROM sheets WHERE id = ?").pluck();
  const selectLastNumber = db
    .prepare<[string], number | null>(
      "SELECT max(CAST(substr(number, 6) AS INTEGER)) FROM sheets WHERE substr(number, 1, 5) = ?",
    )
    .pluck();
  const insertRow = db.prepare(
    `INSERT INTO sheets (class_id, edition_id, number, state, title, amount, low, high, currency_code, effective_on,
       issued_at_utc, issued_by, digest, bytes)
     VALUES (@assetClassId, @editionId, @number, 'issued', @title, @amount, @low, @high, @currencyCode, @effectiveOn,
       @issuedAtUtc, @issuedBy, @digest, @bytes)`,
  );
  const updateState = db.prepare("UPDATE sheets SET state = ?, state_reason = ? WHERE id = ?");

  /** Refuses (AppError) an unknown sheet. */
  function get(id: number): SheetRecord {
    const row = selectOne.get(id);
    if (row !== undefined) return rowToSheet(row);
    throw new AppError({
      family: "store",
      code: "no-such-sheet",
      what: "There is no such sheet in this store.",
      where: `sheet ${id}`,
      whatToDo: "Choose one of the sheets that are listed.",
    });
  }

  function orNull(row: SheetRow | undefined): SheetRecord | null {
    return row === undefined ? null : rowToSheet(row);
  }

  return {
    get,
    /** Newest first. */
    list: (classId: number): SheetRecord[] => selectAll.all(classId).map(rowToSheet),
    findByDigest: (digest: string): SheetRecord | null => orNull(selectByDigest.get(digest)),
    findByNumber: (number: string): SheetRecord | null => orNull(selectByNumber.get(number)),
    bytes: (id: number): Uint8Array => selectBytes.get(get(id).id)!,
    /** The number the next sheet of that year gets. It is taken only by `insert`. */
    nextNumber(year: number): string {
      const last = selectLastNumber.get(`${year}-`) ?? 0;
      return `${year}-${String(last + 1).padStart(4, "0")}`;
    },
    /** Refuses (AppError "number-taken") when another window issued a sheet with this number meanwhile. */
    insert(sheet: NewSheet): SheetRecord {
      if (selectByNumber.get(sheet.number) !== undefined) {
        throw new AppError({
          family: "sheet",
          code: "number-taken",
          what: `Sheet ${sheet.number} was issued by another window a moment ago.`,
          where: sheet.number,
          whatToDo: "Issue again; the sheet then gets the next number.",
        });
      }
      return get(insertRow.run(sheet).lastInsertRowid as number);
    },
    /** Refuses (AppError) a sheet that is withdrawn or superseded already. */
    changeState(id: number, state: "withdrawn" | "superseded", reason: string): SheetRecord {
      const sheet = get(id);
      if (sheet.state !== "issued") {
        throw new AppError({
          family: "sheet",
          code: "sheet-closed",
          what: `Sheet ${sheet.number} is ${sheet.state} already.`,
          where: sheet.number,
          whatToDo: "Nothing more can be done to it; issue a new sheet if one is needed.",
        });
      }
      updateState.run(state, reason, id);
      return get(id);
    },
  };
}
