/** A file of sales as read: verbatim cells with the rows they stand in, and how it was read. No meaning yet. */
import type { ReadingOptions } from "../domain/importRecord.ts";

export interface RawRow {
  /** Row as a spreadsheet counts it: a heading is row 1. Line breaks inside a quoted cell do not count. */
  readonly row: number;
  /** As many as stood there, which may be fewer or more than there are headings. */
  readonly cells: readonly string[];
  /** Why the reader does not trust the cells of this row, as a sentence. */
  readonly fault?: string;
}

export interface RawTable {
  readonly options: ReadingOptions;
  /** What was detected and why, each a sentence. */
  readonly detected: readonly string[];
  /** Distinct and never empty. */
  readonly headings: readonly string[];
  readonly rows: readonly RawRow[];
  /** Rows without one filled cell; they are in no other count. */
  readonly blankRows: number;
}

/** One kind of file. `read` may refuse with an AppError of the family "import". */
export interface TableFormat {
  readonly name: string;
  recognises(bytes: Uint8Array, fileName: string): boolean;
  read(bytes: Uint8Array, fileName: string, chosen: Partial<ReadingOptions> | null): RawTable;
}
