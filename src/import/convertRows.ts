/**
 * Rows of a matched table → sales, held-back rows and duplicates. Every filled row ends in exactly one of the three:
 * read = accepted + held back + duplicates. Faults come first, then doubts about the price, then duplicates, in row order.
 */
import type { Attribute } from "../domain/attribute.ts";
import type {
  ColumnMatch,
  DuplicateRow,
  HeldBackReason,
  HeldBackRow,
  ImportResult,
  ReadingOptions,
} from "../domain/importRecord.ts";
import type { NewSale, PriceBasis } from "../domain/sale.ts";
import { convertRow, type RowContext } from "./convertRow.ts";
import { type DuplicateIndex, type DuplicateKeys, duplicateKeys, type KnownSale, mayBeTheSame } from "./duplicates.ts";
import { planColumns } from "./planColumns.ts";
import { priceSlips } from "./priceSlips.ts";
import type { RawRow, RawTable } from "./rawTable.ts";

export type { DuplicateIndex } from "./duplicates.ts";

/** What the rows are converted for. */
export interface ClassOfRows {
  readonly attributes: readonly Attribute[];
  readonly currencyCode: string;
  readonly priceBasis: PriceBasis;
  /** True: a choice may gain levels from this file. A choice without any level is always open. */
  readonly levelsOpen?: boolean;
}

interface Draft {
  readonly raw: RawRow;
  readonly sale: NewSale;
}

/** Cells by heading; cells beyond the last heading are kept under their number. */
function cellsByHeading(headings: readonly string[], cells: readonly string[]): Record<string, string> {
  const named: Record<string, string> = {};
  const width = Math.max(headings.length, cells.length);
  for (let k = 0; k < width; k++) named[headings[k] ?? `cell ${k + 1}, beyond the headings`] = cells[k] ?? "";
  return named;
}

/** Keys of the rows accepted so far, asked beside the register's. */
class RowKeys {
  readonly #rows = new Map<string, { row: number; sale: NewSale }>();
  readonly #existing: DuplicateIndex;
  /** Rows that state no day of their own are not alike because all were given the same one. */
  readonly #ownDays: boolean;

  constructor(existing: DuplicateIndex, ownDays: boolean) {
    this.#existing = existing;
    this.#ownDays = ownDays;
  }

  find(sale: NewSale, { byReference, byValues }: DuplicateKeys): Pick<DuplicateRow, "sameAs" | "why"> | null {
    const byReferenceWhy = "same reference and day" as const;
    if (byReference !== null) {
      const row = this.#rows.get(byReference);
      if (row !== undefined) return { sameAs: { row: row.row }, why: byReferenceWhy };
      const known = this.#existing.get(byReference);
      if (known !== undefined) return { sameAs: saleOf(known), why: byReferenceWhy };
    }
    const byValuesWhy = "same day, price and values" as const;
    const row = this.#ownDays ? this.#rows.get(byValues) : undefined;
    if (row !== undefined && mayBeTheSame(row.sale, sale)) return { sameAs: { row: row.row }, why: byValuesWhy };
    const known = this.#existing.get(byValues);
    if (known !== undefined && mayBeTheSame(known, sale)) return { sameAs: saleOf(known), why: byValuesWhy };
    return null;
  }

  add(row: number, sale: NewSale, { byReference, byValues }: DuplicateKeys): void {
    if (byReference !== null && !this.#rows.has(byReference)) this.#rows.set(byReference, { row, sale });
    if (!this.#rows.has(byValues)) this.#rows.set(byValues, { row, sale });
  }
}

function saleOf({ saleId, reference }: KnownSale): { saleId: number; reference: string | null } {
  return { saleId, reference };
}

interface Sorted {
  readonly drafts: Draft[];
  readonly held: Map<number, { raw: RawRow; reasons: readonly HeldBackReason[] }>;
}

function readAll(table: RawTable, context: RowContext): Sorted {
  const drafts: Draft[] = [];
  const held: Sorted["held"] = new Map();
  for (const raw of table.rows) {
    const result = convertRow(raw, context);
    if ("sale" in result) drafts.push({ raw, sale: result.sale });
    else held.set(raw.row, { raw, reasons: result.reasons });
  }
  return { drafts, held };
}

/**
 * What came of every row. Missing attribute values are fine (null); a missing day or price, a value that cannot be read, a
 * value outside the allowed range, another currency and a price that looks ten or a hundred times off hold the row back.
 * Refuses (AppError) a match that does not belong to the table or the class.
 */
export function convertRows(
  table: RawTable,
  match: ColumnMatch,
  assetClass: ClassOfRows,
  existing: DuplicateIndex,
): ImportResult {
  const plan = planColumns(table, match, assetClass);
  const context = contextOf(table.headings, table.options, match, assetClass, plan, true);
  const { drafts, held } = readAll(table, context);
  for (const [draft, reason] of priceSlips(drafts, plan.plain.price?.[0]?.heading ?? null, table.options)) {
    held.set(draft.raw.row, { raw: draft.raw, reasons: [reason] });
  }
  const keys = new RowKeys(existing, plan.plain.soldOn !== undefined);
  const accepted: { row: number; sale: NewSale }[] = [];
  const duplicates: DuplicateRow[] = [];
  for (const { raw, sale } of drafts) {
    if (held.has(raw.row)) continue;
    const own = duplicateKeys(sale);
    const twin = keys.find(sale, own);
    if (twin === null) {
      keys.add(raw.row, sale, own);
      accepted.push({ row: raw.row, sale });
    } else duplicates.push({ row: raw.row, ...twin, cells: cellsByHeading(table.headings, raw.cells) });
  }
  const heldBack: HeldBackRow[] = [...held.values()]
    .sort((a, b) => a.raw.row - b.raw.row)
    .map(({ raw, reasons }) => ({ row: raw.row, cells: cellsByHeading(table.headings, raw.cells), reasons }));
  const notes = [...plan.notes, ...conversionNotes(context)];
  return { read: table.rows.length, accepted, heldBack, duplicates, blankRows: table.blankRows, notes };
}

function conversionNotes({ convertedCells }: RowContext): string[] {
  return [...convertedCells].map(
    ([what, count]) => `${what} in ${count.toLocaleString("en-GB")} ${count === 1 ? "cell" : "cells"}.`,
  );
}

function contextOf(
  headings: readonly string[],
  options: ReadingOptions,
  match: ColumnMatch,
  { currencyCode, priceBasis }: ClassOfRows,
  plan: RowContext["plan"],
  doubts: boolean,
): RowContext {
  return {
    headings,
    options,
    plan,
    fixed: match.fixed,
    currencyCode,
    priceBasis,
    doubts,
    convertedCells: new Map(),
  };
}

/**
 * One row that a person has corrected: `cells` by heading, read by the options and match of its file. Doubts (a price ten times
 * off, two units under one price, a value without its unit) are not raised again: the person has looked. Faults and duplicates are.
 */
export function convertOneRow(
  row: number,
  cells: Readonly<Record<string, string>>,
  file: { readonly headings: readonly string[]; readonly options: ReadingOptions; readonly match: ColumnMatch },
  assetClass: ClassOfRows,
  existing: DuplicateIndex,
): ImportResult {
  const { headings, options, match } = file;
  const raw = { row, cells: headings.map((heading) => cells[heading] ?? "") };
  const table = { options, detected: [], headings, rows: [raw], blankRows: 0 };
  const plan = planColumns(table, match, assetClass);
  const result = convertRow(raw, contextOf(headings, options, match, assetClass, plan, false));
  const none = { read: 1, accepted: [], heldBack: [], duplicates: [], blankRows: 0, notes: plan.notes };
  const named = cellsByHeading(headings, raw.cells);
  if ("reasons" in result) return { ...none, heldBack: [{ row, cells: named, reasons: result.reasons }] };
  const twin = new RowKeys(existing, false).find(result.sale, duplicateKeys(result.sale));
  if (twin !== null) return { ...none, duplicates: [{ row, ...twin, cells: named }] };
  return { ...none, accepted: [{ row, sale: result.sale }] };
}
