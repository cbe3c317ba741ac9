/**
 * A strict reader of the files that renderSheetPdf writes, and of no others: header, objects one after the other, one
 * cross-reference table whose offsets are those of the objects, one trailer, the end. Every byte must belong to one of these, so
 * that nothing can be put before, between or after them unseen. Input is taken to be hostile: sizes are capped.
 */
import { inflateSync } from "node:zlib";
import { AppError } from "../../domain/errors.ts";

const MEGABYTE = 2 ** 20;
/** Largest file, and largest single stream when unpacked. */
export const LARGEST_FILE = 128 * MEGABYTE;
const LARGEST_STREAM = 256 * MEGABYTE;
const MOST_OBJECTS = 100_000;

const HEADER = "%PDF-1.7\n%\xff\xff\xff\xff\n";

export interface PdfObject {
  readonly id: number;
  /** The text between "obj" and the stream or "endobj", one character a byte. */
  readonly body: string;
  /** Unpacked bytes of its stream, or null. */
  stream(): Uint8Array | null;
}

export interface PdfFile {
  readonly objects: ReadonlyMap<number, PdfObject>;
  readonly trailer: string;
}

export function unreadable(what: string, cause?: unknown): AppError {
  return new AppError({
    family: "sheet",
    code: "unreadable",
    what,
    whatToDo: "Choose a sheet as this program wrote it: not printed again, not saved by another program.",
    ...(cause === undefined ? {} : { cause }),
  });
}

class Reader {
  readonly text: string;
  readonly bytes: Uint8Array;
  at = 0;

  constructor(bytes: Uint8Array) {
    this.bytes = bytes;
    this.text = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).toString("latin1");
  }

  takes(words: string): boolean {
    if (!this.text.startsWith(words, this.at)) return false;
    this.at += words.length;
    return true;
  }

  expect(words: string, what: string): void {
    if (!this.takes(words)) throw unreadable(`This is not a whole sheet: ${what} at byte ${this.at}.`);
  }

  match(pattern: RegExp): RegExpExecArray | null {
    const sticky = new RegExp(pattern.source, "y");
    sticky.lastIndex = this.at;
    const found = sticky.exec(this.text);
    if (found !== null) this.at = sticky.lastIndex;
    return found;
  }

  /** The text up to `end`, which is taken too. */
  upTo(end: string, what: string): string {
    const to = this.text.indexOf(end, this.at);
    if (to < 0) throw unreadable(`This is not a whole sheet: ${what} at byte ${this.at}.`);
    const text = this.text.slice(this.at, to);
    this.at = to + end.length;
    return text;
  }
}

function readObject(reader: Reader, id: number): PdfObject {
  const toEnd = reader.text.indexOf("\nendobj\n", reader.at);
  const toStream = reader.text.indexOf("\nstream\n", reader.at);
  if (toEnd < 0) throw unreadable(`This is not a whole sheet: object ${id} has no end.`);
  if (toStream < 0 || toStream > toEnd) {
    return { id, body: reader.upTo("\nendobj\n", `object ${id} has no end`), stream: () => null };
  }
  const body = reader.upTo("\nstream\n", `object ${id} has no stream`);
  const length = Number(/\/Length (\d{1,9})\b/.exec(body)?.[1] ?? Number.NaN);
  const packed = reader.bytes.subarray(reader.at, reader.at + length);
  if (!(length >= 0) || packed.length !== length)
    throw unreadable(`This is not a whole sheet: object ${id} is cut off.`);
  reader.at += length;
  reader.expect("\nendstream\nendobj\n", `object ${id} is longer or shorter than it says`);
  return { id, body, stream: () => unpack(id, body, packed) };
}

function unpack(id: number, body: string, packed: Uint8Array): Uint8Array {
  if (!body.includes("/Filter /FlateDecode")) return packed;
  try {
    return inflateSync(packed, { maxOutputLength: LARGEST_STREAM });
  } catch (cause) {
    throw unreadable(`Part ${id} of this sheet cannot be unpacked.`, cause);
  }
}

function readTable(reader: Reader, start: number, offsets: ReadonlyMap<number, number>): string {
  reader.expect(`0 ${offsets.size + 1}\n`, "the table of contents counts other objects");
  reader.expect("0000000000 65535 f \n", "the table of contents is damaged");
  for (let id = 1; id <= offsets.size; id++) {
    const offset = offsets.get(id);
    if (offset === undefined) throw unreadable(`This is not a whole sheet: object ${id} is missing.`);
    reader.expect(
      `${String(offset).padStart(10, "0")} 00000 n \n`,
      `the table of contents does not lead to object ${id}`,
    );
  }
  reader.expect("trailer\n", "the trailer is missing");
  const trailer = reader.upTo("\nstartxref\n", "the trailer has no end");
  reader.expect(`${start}\n%%EOF\n`, "the file does not end as it should");
  if (reader.at !== reader.bytes.length) {
    throw unreadable(`Something was put after the end of this sheet: ${reader.bytes.length - reader.at} bytes.`);
  }
  return trailer;
}

/** Errors: AppError sheet/unreadable with the byte where the file stops being one of ours; sheet/too-large. */
export function readPdf(bytes: Uint8Array): PdfFile {
  if (bytes.length > LARGEST_FILE) {
    throw new AppError({
      family: "sheet",
      code: "too-large",
      what: `This file is too large for a sheet: ${Math.round(bytes.length / MEGABYTE)} MB.`,
      whatToDo: "Choose a sheet that this program wrote.",
    });
  }
  const reader = new Reader(bytes);
  reader.expect(HEADER, "it does not begin as one");
  const objects = new Map<number, PdfObject>();
  const offsets = new Map<number, number>();
  for (;;) {
    const start = reader.at;
    if (reader.takes("xref\n")) return { objects, trailer: readTable(reader, start, offsets) };
    const id = Number(reader.match(/(\d{1,7}) 0 obj\n/)?.[1] ?? 0);
    if (id === 0 || objects.has(id) || objects.size >= MOST_OBJECTS) {
      throw unreadable(`This is not a whole sheet: no part of one begins at byte ${start}.`);
    }
    objects.set(id, readObject(reader, id));
    offsets.set(id, start);
  }
}

/** The object that `/Name 12 0 R` in `body` leads to, or null. */
export function follow(file: PdfFile, body: string, name: string): PdfObject | null {
  const id = new RegExp(`/${name} (\\d{1,7}) 0 R`).exec(body)?.[1];
  return id === undefined ? null : (file.objects.get(Number(id)) ?? null);
}
