/** Bringing sales in: what was detected, what may be changed, and what came of every row. */
import type { AttributeKind } from "./attribute.ts";
import type { Day } from "./day.ts";
import type { Channel, NewSale, PriceBasis } from "./sale.ts";

/** Detected from the file, shown, and changeable by the person (a set value wins over detection). */
export interface ReadingOptions {
  readonly encoding: "utf-8" | "utf-16le" | "utf-16be" | "windows-1252";
  readonly delimiter: "," | ";" | "\t" | "|";
  readonly decimalMark: "." | ",";
  readonly thousandsMark: "" | "," | "." | " " | "'";
  readonly dateOrder: "ymd" | "dmy" | "mdy";
  readonly hasHeading: boolean;
}

/** What a column of the file is. */
export type ColumnTarget =
  | { readonly to: "attribute"; readonly key: string }
  | { readonly to: "newAttribute"; readonly label: string; readonly kind: AttributeKind; readonly unit: string | null }
  | {
      readonly to:
        | "price"
        | "soldOn"
        | "currency"
        | "channel"
        | "source"
        | "reference"
        | "title"
        | "notes"
        | "premium"
        | "tax";
    }
  | { readonly to: "nothing" };

/** Column match: one target per column of the file, and fixed values for what the file does not say. */
export interface ColumnMatch {
  readonly columns: readonly { readonly heading: string; readonly target: ColumnTarget }[];
  readonly fixed: {
    readonly soldOn: Day | null;
    readonly currencyCode: string;
    readonly channel: Channel;
    readonly source: string;
    readonly priceBasis: PriceBasis;
  };
}

export interface HeldBackReason {
  readonly column: string | null;
  readonly value: string | null;
  /** A sentence: "No such day." */
  readonly reason: string;
  /** A reading the program would accept, offered to the person: "38500". */
  readonly suggestion: string | null;
}

export interface HeldBackRow {
  /** Row as a spreadsheet counts it: the heading is row 1. */
  readonly row: number;
  /** Raw cells, verbatim, by heading. */
  readonly cells: Readonly<Record<string, string>>;
  readonly reasons: readonly HeldBackReason[];
}

export interface DuplicateRow {
  readonly row: number;
  readonly sameAs: { readonly row: number } | { readonly saleId: number; readonly reference: string | null };
  readonly why: "same reference and day" | "same day, price and values";
  readonly cells: Readonly<Record<string, string>>;
}

/** read = accepted.length + heldBack.length + duplicates.length, always. */
export interface ImportResult {
  readonly read: number;
  readonly accepted: readonly { readonly row: number; readonly sale: NewSale }[];
  readonly heldBack: readonly HeldBackRow[];
  readonly duplicates: readonly DuplicateRow[];
  /** Blank rows are no rows: counted apart. */
  readonly blankRows: number;
  /** What was converted on the way (units), each a sentence. */
  readonly notes: readonly string[];
}

export interface ImportBatch {
  readonly id: number;
  readonly assetClassId: number;
  readonly fileName: string;
  readonly fileDigest: string;
  readonly importedAtUtc: string;
  readonly importedBy: string;
  readonly read: number;
  readonly accepted: number;
  readonly heldBack: number;
  readonly duplicates: number;
  readonly undone: boolean;
}

/** A held-back row as the store keeps it. */
export interface StoredHeldBackRow extends HeldBackRow {
  readonly id: number;
  readonly batchId: number;
  readonly fileName: string;
}

export interface JournalEntry {
  readonly id: number;
  readonly atUtc: string;
  readonly by: string;
  /** Machine word of the act: "sales-imported", "sale-set-aside", "edition-saved", "sheet-issued" … */
  readonly act: string;
  readonly assetClassId: number | null;
  /** One plain sentence. */
  readonly sentence: string;
  /** Facts as JSON. */
  readonly facts: Readonly<Record<string, unknown>>;
  readonly previousDigest: string;
  readonly digest: string;
}
