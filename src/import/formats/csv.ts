/**
 * Tables as text: cells between separators, quoted where needed (RFC 4180 and its usual bends). Cells stay verbatim; a row is a
 * record, so a line break inside quotes does not shift the count.
 */
import Papa from "papaparse";
import { AppError } from "../../domain/errors.ts";
import type { ReadingOptions } from "../../domain/importRecord.ts";
import { decodeText } from "../decodeText.ts";
import { detectDateOrder } from "../detectDateOrder.ts";
import { detectDelimiter } from "../detectDelimiter.ts";
import { detectMarks } from "../detectMarks.ts";
import { startsLikeForeignFile } from "../foreignFiles.ts";
import { nameHeadings, rowLooksLikeHeading } from "../nameHeadings.ts";
import type { RawRow, RawTable, TableFormat } from "../rawTable.ts";

const STRAY_QUOTE = "A quotation mark stands in the middle of a quoted cell, so the cells cannot be told apart.";
const NUL = "A cell holds a NUL character.";

interface Parsed {
  readonly records: readonly RawRow[];
  readonly blankRows: number;
}

function isBlank(cells: readonly string[]): boolean {
  return cells.every((cell) => cell.trim() === "");
}

function unclosed(row: number, fileName: string): AppError {
  return new AppError({
    family: "import",
    code: "unclosed-quote",
    what: `A quotation mark that opens in row ${row} is never closed, so the rest of the file reads as one cell.`,
    where: `${fileName}, row ${row}`,
    whatToDo:
      "Close or remove the quotation mark in that row, or choose another separator, and bring the file in again.",
  });
}

function parse(text: string, delimiter: string, fileName: string): Parsed {
  const { data, errors } = Papa.parse<string[]>(text, { delimiter, newline: "\n", skipEmptyLines: false });
  const faults = new Map<number, string>();
  for (const { code, row } of errors) {
    if (code === "MissingQuotes") throw unclosed((row ?? 0) + 1, fileName);
    if (code === "InvalidQuotes") faults.set((row ?? 0) + 1, STRAY_QUOTE);
  }
  if (text.endsWith("\n")) data.pop();
  const records: RawRow[] = [];
  let blankRows = 0;
  for (let k = 0; k < data.length; k++) {
    const cells = data[k]!;
    if (isBlank(cells)) blankRows++;
    else records.push(recordOf(k + 1, cells, faults));
  }
  return { records, blankRows };
}

function recordOf(row: number, cells: readonly string[], faults: ReadonlyMap<number, string>): RawRow {
  const fault = faults.get(row) ?? (cells.some((cell) => cell.includes("\0")) ? NUL : undefined);
  return fault === undefined ? { row, cells } : { row, cells, fault };
}

/** When a separator ends every row alike, the heading too, it ends the row: it makes no further column. */
function withoutClosingSeparator(records: readonly RawRow[]): { records: readonly RawRow[]; closed: boolean } {
  const width = records[0]?.cells.length ?? 0;
  const closed = width > 1 && records.every(({ cells }) => cells.length === width && cells[width - 1]!.trim() === "");
  if (!closed) return { records, closed };
  return { records: records.map((record) => ({ ...record, cells: record.cells.slice(0, -1) })), closed };
}

function refuseNoRows(fileName: string, hasHeading: boolean): never {
  throw new AppError({
    family: "import",
    code: "no-rows",
    what: hasHeading ? "The file has a heading but no rows under it." : "The file has no filled rows.",
    where: fileName,
    whatToDo: "Choose a file with at least one sale in it.",
  });
}

/** Binary content has many NULs; a slip has few, and its rows are held back. */
function looksBinary(bytes: Uint8Array): boolean {
  const end = Math.min(bytes.length, 65_536);
  let nuls = 0;
  for (let k = 0; k < end; k++) if (bytes[k] === 0) nuls++;
  return nuls > 0 && nuls * 20 > end;
}

function read(bytes: Uint8Array, fileName: string, chosen: Partial<ReadingOptions> | null): RawTable {
  const { encoding, text: whole, sentences } = decodeText(bytes, chosen?.encoding);
  const announced = /^"?sep=([,;\t|])"?\n/.exec(whole);
  const guess = detectDelimiter(announced === null ? whole : whole.slice(announced[0].length));
  const announcedMark = announced?.[1] as ReadingOptions["delimiter"] | undefined;
  const delimiter = chosen?.delimiter ?? announcedMark ?? guess.delimiter;
  const said =
    chosen?.delimiter !== undefined
      ? "Cells are separated as chosen."
      : announced === null
        ? guess.sentence
        : "The first row of the file names the separator.";
  const parsed = parse(whole, delimiter, fileName);
  const { records: trimmed, closed } = withoutClosingSeparator(
    announced === null ? parsed.records : parsed.records.slice(1),
  );
  const hasHeading = chosen?.hasHeading ?? (trimmed[0] !== undefined && rowLooksLikeHeading(trimmed[0].cells));
  const rows = hasHeading ? trimmed.slice(1) : trimmed;
  if (rows.length === 0) refuseNoRows(fileName, hasHeading);
  const width = rows.reduce((most, { cells }) => Math.max(most, cells.length), 0);
  const named = nameHeadings(hasHeading ? trimmed[0]!.cells : null, width);
  const marks = detectMarks(rows, named.headings, delimiter, chosen);
  const dates = detectDateOrder(rows, named.headings, chosen?.dateOrder);
  const closing = closed ? ["A separator ends every row; it was not read as a column."] : [];
  return {
    options: { encoding, delimiter, hasHeading, dateOrder: dates.dateOrder, ...marks.marks },
    detected: [...sentences, said, ...closing, ...named.sentences, ...marks.sentences, dates.sentence],
    headings: named.headings,
    rows,
    blankRows: parsed.blankRows,
  };
}

export const csv: TableFormat = {
  name: "CSV",
  /** Any text will do; a name ending says nothing that the bytes do not. UTF-16 is full of NULs, and text. */
  recognises: (bytes) => !startsLikeForeignFile(bytes) && (isWideText(bytes) || !looksBinary(bytes)),
  read,
};

function isWideText(bytes: Uint8Array): boolean {
  const { encoding } = decodeText(bytes.subarray(0, 4096 + (bytes.length % 2)), undefined);
  return encoding === "utf-16le" || encoding === "utf-16be";
}
