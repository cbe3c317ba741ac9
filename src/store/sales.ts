/**
 * The sales of a class: brought in, listed, read as columns, set aside, put back, verified, and taken out again with their
 * batch. Nothing is deleted: sales of an undone batch move, whole, to removed_sales.
 */
import type { Database } from "better-sqlite3";
import type { Day } from "../domain/day.ts";
import type { NewSale, Sale, SaleColumns } from "../domain/sale.ts";
import type { AssetClasses } from "./assetClasses.ts";
import type { Attributes } from "./attributes.ts";
import { levelCodesOf, type StoredAttribute, valuesTable } from "./attributeTables.ts";
import { withIndexesRebuilt } from "./bulkInsert.ts";
import { withSnapshotEnded } from "./columnSnapshot.ts";
import { type RegisterQuery, registerOf } from "./register.ts";
import { readMarks, readSaleColumns } from "./saleColumns.ts";
import {
  channelCode,
  priceBasisCode,
  requireDay,
  rowToSale,
  SALE_SELECT,
  type SaleRow,
  valuesRow,
} from "./saleRows.ts";

/** A sale on its way in; `cells` are the verbatim cells of its row in the file, in the order of the batch's headings. */
export interface IncomingSale {
  readonly row: number | null;
  readonly sale: NewSale;
  readonly cells: readonly string[] | null;
}

export type Sales = ReturnType<typeof salesOf>;

export function salesOf(db: Database, classes: AssetClasses, attributes: Attributes) {
  const insertSource = db.prepare("INSERT INTO sources (name) VALUES (?) ON CONFLICT (name) DO NOTHING");
  const selectSource = db.prepare<[string], number>("SELECT id FROM sources WHERE name = ?").pluck();
  const insertSale = db.prepare(
    `INSERT INTO sales (class_id, sold_on, price_minor, currency_code, price_basis, channel, source_id, title, reference,
       notes, batch_id, file_row) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`,
  );
  const insertCells = db.prepare("INSERT INTO sale_cells (sale_id, cells_json) VALUES (?, ?)");
  const selectCells = db.prepare<[number], string>("SELECT cells_json FROM sale_cells WHERE sale_id = ?").pluck();
  const selectBatchIds = db.prepare<[number], number>("SELECT id FROM sales WHERE batch_id = ? ORDER BY id").pluck();
  const insertRemoved = db.prepare(
    "INSERT INTO removed_sales (id, class_id, batch_id, removed_at_utc, sale_json) VALUES (?, ?, ?, ?, ?)",
  );
  const selectRemoved = db
    .prepare<[string, number], string>(
      "SELECT sale_json FROM removed_sales WHERE id IN (SELECT value FROM json_each(?)) AND +class_id = ? ORDER BY id",
    )
    .pluck();
  const selectDayIds = db
    .prepare<[number, number], number>("SELECT id FROM sales WHERE class_id = ? AND sold_on = ? ORDER BY id")
    .pluck();
  const deleteSale = db.prepare("DELETE FROM sales WHERE id = ?");
  const setAsideRow = db.prepare(
    `UPDATE sales SET set_aside_on = ?, set_aside_by = ?, set_aside_reason = ?
     WHERE id = ? AND class_id = ? AND set_aside_on IS NULL`,
  );
  const putBackRow = db.prepare(
    `UPDATE sales SET set_aside_on = NULL, set_aside_by = NULL, set_aside_reason = NULL
     WHERE id = ? AND class_id = ? AND set_aside_on IS NOT NULL`,
  );
  const verifyRow = db.prepare(
    "UPDATE sales SET verified_on = ?, verified_by = ?, verified_how = ? WHERE id = ? AND class_id = ?",
  );
  const readPage = registerOf(db);
  const sourceIds = new Map<string, number>();
  let columnsCache: { classId: number; dataVersion: number; rowsVersion: number; columns: SaleColumns } | null = null;

  function sourceId(name: string): number {
    const known = selectSource.get(name);
    return known ?? (insertSource.run(name).lastInsertRowid as number);
  }

  /** Source numbers, looked up once per call (a rolled-back transaction may have taken older ones away). */
  function rememberedSource(name: string): number {
    let id = sourceIds.get(name);
    if (id === undefined) {
      id = sourceId(name);
      sourceIds.set(name, id);
    }
    return id;
  }

  function insertAll(classId: number, batchId: number | null, incoming: readonly IncomingSale[]): number[] {
    const stored = attributes.listStored(classId);
    const codes = levelCodesOf(stored);
    const names = stored.map(({ column }) => `, ${column}`).join("");
    const insertValues = db.prepare(
      `INSERT INTO ${valuesTable(classId)} (sale_id${names}) VALUES (?${", ?".repeat(stored.length)})`,
    );
    sourceIds.clear();
    return incoming.map(({ row, sale, cells }) => {
      const id = insertSale.run(
        classId,
        requireDay(sale.soldOn, row === null ? sale.title : `row ${row}`),
        sale.priceMinor,
        sale.currencyCode,
        priceBasisCode(sale.priceBasis),
        channelCode(sale.channel),
        rememberedSource(sale.source),
        sale.title,
        sale.reference,
        sale.notes,
        batchId,
        row,
      ).lastInsertRowid as number;
      insertValues.run(id, ...valuesRow(sale, stored, codes));
      if (cells !== null) insertCells.run(id, JSON.stringify(cells));
      return id;
    });
  }

  /** Sales of the class by number, in the order asked; numbers that are not in the register are left out. */
  function find(classId: number, ids: readonly number[], stored: readonly StoredAttribute[]): Sale[] {
    const names = stored.map(({ column }) => `, v.${column}`).join("");
    const rows = db
      .prepare<[string, number], SaleRow>(
        `SELECT ${SALE_SELECT}${names} FROM json_each(?) j JOIN sales s ON s.id = j.value
         JOIN ${valuesTable(classId)} v ON v.sale_id = s.id JOIN sources o ON o.id = s.source_id
         WHERE +s.class_id = ? ORDER BY j.key`,
      )
      .all(JSON.stringify(ids), classId);
    return rows.map((row) => rowToSale(row, stored));
  }

  function changeEach(classId: number, ids: readonly number[], change: (id: number) => number): number {
    let changed = 0;
    for (const id of ids) changed += change(id);
    if (changed > 0) classes.raiseDataVersion(classId);
    return changed;
  }

  return {
    /** Numbers of the new sales, in order. Refuses (AppError) values that the class can't hold. */
    insertSales(classId: number, batchId: number | null, incoming: readonly IncomingSale[]): number[] {
      if (incoming.length === 0) return [];
      const tables = ["sales", valuesTable(classId)];
      const ids = withSnapshotEnded(db, classId, incoming.length, () =>
        withIndexesRebuilt(db, tables, incoming.length, () => insertAll(classId, batchId, incoming)),
      );
      classes.raiseRowsVersion(classId);
      return ids;
    },
    /**
     * All sales of the class as typed arrays. The last class read is kept: only the marks are read again after sales were
     * set aside or verified, everything after sales came or went. Read-only for whoever gets them.
     */
    readColumns(classId: number): SaleColumns {
      const dataVersion = classes.dataVersion(classId);
      const rowsVersion = classes.rowsVersion(classId);
      const kept = columnsCache?.classId === classId && columnsCache.rowsVersion === rowsVersion ? columnsCache : null;
      if (kept?.dataVersion === dataVersion) return kept.columns;
      const columns =
        kept === null
          ? readSaleColumns(db, classId, rowsVersion, attributes.listStored(classId))
          : { ...kept.columns, ...readMarks(db, classId, kept.columns.ids) };
      // Inside a transaction the versions may still be rolled back and used again for other sales.
      if (!db.inTransaction) columnsCache = { classId, dataVersion, rowsVersion, columns };
      return columns;
    },
    /** One page of the register and the number of hits. */
    listSales(query: RegisterQuery): { total: number; rows: Sale[] } {
      const stored = attributes.listStored(query.classId);
      const { total, ids } = readPage(query, stored, classes.dataVersion(query.classId));
      return { total, rows: find(query.classId, ids, stored) };
    },
    /** By number, in the order asked, in the register or taken out with their batch (those come last). */
    findSales(classId: number, ids: readonly number[]): Sale[] {
      const live = find(classId, ids, attributes.listStored(classId));
      if (live.length === ids.length) return live;
      return [...live, ...selectRemoved.all(JSON.stringify(ids), classId).map((json) => JSON.parse(json) as Sale)];
    },
    /** Every sale of one day, set aside or not, by number. */
    soldOnDay(classId: number, day: Day): Sale[] {
      const ids = selectDayIds.all(classId, requireDay(day, "sold on"));
      return ids.length === 0 ? [] : find(classId, ids, attributes.listStored(classId));
    },
    /** Verbatim cells of the row the sale came from, or null when it was typed. */
    cells(saleId: number): string[] | null {
      const json = selectCells.get(saleId);
      return json === undefined ? null : (JSON.parse(json) as string[]);
    },
    /** Number of sales that changed; those set aside already keep their first reason. */
    setAside(classId: number, ids: readonly number[], by: string, on: Day, reason: string): number {
      const day = requireDay(on, "set aside");
      return changeEach(classId, ids, (id) => setAsideRow.run(day, by, reason, id, classId).changes);
    },
    putBack(classId: number, ids: readonly number[]): number {
      return changeEach(classId, ids, (id) => putBackRow.run(id, classId).changes);
    },
    /** The latest verification stands. */
    verify(classId: number, ids: readonly number[], by: string, on: Day, how: string): number {
      const day = requireDay(on, "verified");
      return changeEach(classId, ids, (id) => verifyRow.run(day, by, how, id, classId).changes);
    },
    /** Moves the batch's sales out of the register; returns how many. */
    removeBatch(classId: number, batchId: number, atUtc: string): number {
      const stored = attributes.listStored(classId);
      const ids = selectBatchIds.all(batchId);
      const deleteValues = db.prepare(`DELETE FROM ${valuesTable(classId)} WHERE sale_id = ?`);
      withSnapshotEnded(db, classId, ids.length, () => {
        for (let from = 0; from < ids.length; from += 1000) {
          for (const sale of find(classId, ids.slice(from, from + 1000), stored)) {
            insertRemoved.run(sale.id, classId, batchId, atUtc, JSON.stringify(sale));
            deleteValues.run(sale.id);
            deleteSale.run(sale.id);
          }
        }
      });
      classes.raiseRowsVersion(classId);
      return ids.length;
    },
  };
}
