/**
 * A file of sales read, matched and converted for a class: what the preview shows and the import then writes. Pure but for the
 * sales that are there already, which are read to find duplicates.
 */
import type { AssetClass } from "../domain/assetClass.ts";
import type { Attribute } from "../domain/attribute.ts";
import type { ColumnMatch, ImportResult, ReadingOptions } from "../domain/importRecord.ts";
import { convertRows } from "../import/convertRows.ts";
import { type ClassDefaults, matchColumns, USUAL_DEFAULTS } from "../import/matchColumns.ts";
import { type RawTable, readSalesFile } from "../import/readSalesFile.ts";
import { duplicateIndexOf } from "./duplicateIndexOf.ts";
import { attributesOfMatch } from "./newAttributes.ts";
import type { Ports } from "./ports.ts";

export interface ConvertedFile {
  readonly table: RawTable;
  /** As proposed or chosen: new attributes still by their label. */
  readonly match: ColumnMatch;
  /** The same with every new attribute under its key. */
  readonly keyedMatch: ColumnMatch;
  /** Attributes that the match names for the first time. */
  readonly fresh: readonly Attribute[];
  readonly result: ImportResult;
}

/** Stands for the class that a file is about to make. */
export const NO_CLASS: AssetClass = {
  id: 0,
  name: "",
  itemWord: "item",
  currencyCode: "EUR",
  priceBasis: { premium: "none", tax: "out" },
  invented: false,
  dataVersion: 0,
  attributes: [],
};

export interface FileToConvert {
  readonly fileName: string;
  readonly bytes: Uint8Array;
  /** Null: detected. */
  readonly options: ReadingOptions | null;
  /** Null: what was used last for these headings, else by name. */
  readonly match: ColumnMatch | null;
}

/** What a file that is silent about them is taken to say. */
function defaultsOf({ currencyCode, priceBasis }: AssetClass): ClassDefaults {
  return { ...USUAL_DEFAULTS, currencyCode, priceBasis };
}

/** Refuses (AppError) a file that can't be read as a table of sales. */
export function convertFile(ports: Ports, assetClass: AssetClass, file: FileToConvert): ConvertedFile {
  const { columnMatches } = ports.store;
  const table = readSalesFile(file.bytes, file.fileName, file.options);
  const previous = assetClass.id === 0 ? null : columnMatches.recall(assetClass.id, table.headings);
  const match = file.match ?? matchColumns(table, assetClass.attributes, previous, defaultsOf(assetClass));
  const { match: keyedMatch, fresh } = attributesOfMatch(match, assetClass);
  // A choice without levels takes them from its first file; where levels are listed, an unknown one is more likely a slip.
  const { currencyCode, priceBasis } = assetClass.id === 0 ? match.fixed : assetClass;
  const widened = { currencyCode, priceBasis, attributes: [...assetClass.attributes, ...fresh] };
  const result = convertRows(table, keyedMatch, widened, duplicateIndexOf(ports, assetClass));
  return { table, match, keyedMatch, fresh, result };
}
