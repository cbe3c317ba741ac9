/**
 * Bytes and a file name in, a raw table out: picked, uploaded and piped files are one case. The kind of file is judged by its
 * bytes, never by its name alone; what is no table of sales is refused with a sentence.
 */
import { AppError } from "../domain/errors.ts";
import type { ReadingOptions } from "../domain/importRecord.ts";
import { kindOfForeignFile } from "./foreignFiles.ts";
import { formatOf } from "./formats/index.ts";
import type { RawTable } from "./rawTable.ts";

export type { RawRow, RawTable } from "./rawTable.ts";

/** Read whole into memory as text: about four times this is needed for a moment. */
export const MOST_BYTES = 200_000_000;

function refusal(code: string, what: string, fileName: string, whatToDo: string): AppError {
  return new AppError({ family: "import", code, what, where: fileName, whatToDo });
}

function refuseWrongSize(bytes: Uint8Array, fileName: string): void {
  if (bytes.length === 0) {
    throw refusal("empty-file", "The file is empty.", fileName, "Choose a file with a heading and rows of sales.");
  }
  if (bytes.length <= MOST_BYTES) return;
  const size = Math.ceil(bytes.length / 1e6).toLocaleString("en-GB");
  throw refusal(
    "file-too-large",
    `The file has ${size} MB; at most 200 MB can be read at once.`,
    fileName,
    "Split it into several files and bring them in one after the other.",
  );
}

/**
 * The table in the file. `chosen` options win over what is detected; null or missing ones are detected, each with a sentence
 * saying what and why. Refuses (AppError, family import): an empty file, more than 200 MB, a file that is no text table
 * (workbook, PDF, picture …), no rows under the heading, a quotation mark that is never closed.
 */
export function readSalesFile(bytes: Uint8Array, fileName: string, chosen: Partial<ReadingOptions> | null): RawTable {
  refuseWrongSize(bytes, fileName);
  const format = formatOf(bytes, fileName);
  if (format !== null) return format.read(bytes, fileName, chosen);
  const foreign = kindOfForeignFile(bytes);
  throw refusal("not-a-table", `This is ${foreign.what}, not a table of sales as text.`, fileName, foreign.whatToDo);
}
