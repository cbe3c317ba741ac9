/** Asset classes: made whole with their attributes, listed with their counts, and stamped with a data version. */
import type { Database } from "better-sqlite3";
import type { AssetClass, AssetClassSummary, NewAssetClass } from "../domain/assetClass.ts";
import { AppError } from "../domain/errors.ts";
import type { Attributes } from "./attributes.ts";
import { createValuesTable } from "./attributeTables.ts";

interface ClassRow {
  id: number;
  name: string;
  item_word: string;
  currency_code: string;
  premium: "in" | "out" | "none";
  tax: "in" | "out";
  invented: number;
  data_version: number;
}

type SummaryRow = Omit<AssetClassSummary, "invented"> & { invented: number };

const COLUMNS = "id, name, item_word, currency_code, premium, tax, invented, data_version";
const SUMMARY = `SELECT id, name, invented,
  (SELECT count(*) FROM sales WHERE class_id = c.id) AS saleCount,
  (SELECT count(*) FROM attributes WHERE class_id = c.id AND archived = 0) AS attributeCount,
  (SELECT count(*) FROM editions WHERE class_id = c.id) AS editionCount,
  (SELECT count(*) FROM sheets WHERE class_id = c.id) AS sheetCount,
  (SELECT count(*) FROM held_back_rows h JOIN import_batches b ON b.id = h.batch_id
    WHERE b.class_id = c.id AND h.state = 'open') AS heldBackCount
  FROM asset_classes c`;

export type AssetClasses = ReturnType<typeof assetClassesOf>;

export function assetClassesOf(db: Database, attributes: Attributes) {
  const selectOne = db.prepare<[number], ClassRow>(`SELECT ${COLUMNS} FROM asset_classes WHERE id = ?`);
  const selectId = db.prepare<[string], number>("SELECT id FROM asset_classes WHERE name = ?").pluck();
  const selectVersion = db.prepare<[number], number>("SELECT data_version FROM asset_classes WHERE id = ?").pluck();
  const selectSummaries = db.prepare<[], SummaryRow>(`${SUMMARY} ORDER BY name`);
  const selectSummary = db.prepare<[number], SummaryRow>(`${SUMMARY} WHERE id = ?`);
  const insertRow = db.prepare(
    `INSERT INTO asset_classes (name, item_word, currency_code, premium, tax, invented)
     VALUES (@name, @itemWord, @currencyCode, @premium, @tax, @invented)`,
  );
  const selectRowsVersion = db.prepare<[number], number>("SELECT rows_version FROM asset_classes WHERE id = ?").pluck();
  const raiseData = db.prepare("UPDATE asset_classes SET data_version = data_version + 1 WHERE id = ?");
  const raiseRows = db.prepare(
    "UPDATE asset_classes SET data_version = data_version + 1, rows_version = rows_version + 1 WHERE id = ?",
  );

  function noSuchClass(where: string): never {
    throw new AppError({
      family: "store",
      code: "no-such-class",
      what: "There is no such asset class in this store.",
      where,
      whatToDo: "Choose one of the classes that are listed.",
    });
  }

  /** The class with its attributes. Refuses (AppError) an unknown number. */
  function get(id: number): AssetClass {
    const row = selectOne.get(id) ?? noSuchClass(`class ${id}`);
    return {
      id: row.id,
      name: row.name,
      itemWord: row.item_word,
      currencyCode: row.currency_code,
      priceBasis: { premium: row.premium, tax: row.tax },
      invented: row.invented === 1,
      dataVersion: row.data_version,
      attributes: attributes.list(id),
    };
  }

  const toSummary = (row: SummaryRow): AssetClassSummary => ({ ...row, invented: row.invented === 1 });

  return {
    get,
    list: (): AssetClassSummary[] => selectSummaries.all().map(toSummary),
    summary: (id: number): AssetClassSummary => toSummary(selectSummary.get(id) ?? noSuchClass(`class ${id}`)),
    /** Number of the class with this name (case does not matter), or null. */
    findByName: (name: string): number | null => selectId.get(name.trim()) ?? null,
    dataVersion: (id: number): number => selectVersion.get(id) ?? noSuchClass(`class ${id}`),
    /** Rises only when sales come or go or an attribute changes, not when sales are set aside or verified. */
    rowsVersion: (id: number): number => selectRowsVersion.get(id) ?? noSuchClass(`class ${id}`),
    /** Says that sales were set aside, put back or verified: results that are on screen are stale. */
    raiseDataVersion: (id: number): void => {
      raiseData.run(id);
    },
    /** Says that sales came or went. */
    raiseRowsVersion: (id: number): void => {
      raiseRows.run(id);
    },
    /** Makes the class, its wide table and its attributes. Refuses (AppError) a name that is taken. */
    insert(assetClass: NewAssetClass): AssetClass {
      if (selectId.get(assetClass.name.trim()) !== undefined) {
        throw new AppError({
          family: "store",
          code: "class-exists",
          what: `There is an asset class "${assetClass.name.trim()}" already.`,
          where: assetClass.name,
          whatToDo: "Give another name, or open the class that is there.",
        });
      }
      const id = insertRow.run({
        name: assetClass.name.trim(),
        itemWord: assetClass.itemWord.trim(),
        currencyCode: assetClass.currencyCode,
        premium: assetClass.priceBasis.premium,
        tax: assetClass.priceBasis.tax,
        invented: assetClass.invented ? 1 : 0,
      }).lastInsertRowid as number;
      createValuesTable(db, id);
      for (const attribute of assetClass.attributes) attributes.insert(id, attribute);
      return get(id);
    },
  };
}
