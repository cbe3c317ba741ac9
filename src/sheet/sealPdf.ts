/**
 * The digest that a sheet carries in itself: SHA-256 over every byte of the file but the 64 digits of the digest.
 * The field is a string of fixed width in the document's information, so the file's length and its offsets do not change.
 * Nothing outside the field is left out: bytes put before, inside or after the file change the digest.
 */
import { createHash } from "node:crypto";
import { AppError } from "../domain/errors.ts";

const PREFIX = "lotwright-seal/1 sha256 ";
const DIGITS = 64;

/** What the field holds until the sheet is sealed. */
export const UNSEALED = PREFIX + "0".repeat(DIGITS);

export interface Seal {
  /** Offset of the first of the 64 digits, or null when there is not exactly one field. */
  readonly at: number | null;
  /** The digits in the file; "" without a field. */
  readonly carried: string;
  /** The digits that the file's other bytes give; "" without a field. */
  readonly found: string;
  readonly intact: boolean;
}

/** Offsets of everything that looks like the field: "(" prefix, 64 characters, ")". */
function fields(bytes: Uint8Array): number[] {
  const view = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const head = Buffer.from(`(${PREFIX}`, "latin1");
  const offsets: number[] = [];
  for (let at = view.indexOf(head); at >= 0; at = view.indexOf(head, at + 1)) {
    const digits = at + head.length;
    if (view[digits + DIGITS] === 0x29) offsets.push(digits);
  }
  return offsets;
}

function digestAround(bytes: Uint8Array, at: number): string {
  return createHash("sha256")
    .update(bytes.subarray(0, at))
    .update(bytes.subarray(at + DIGITS))
    .digest("hex");
}

/** The seal of a file as it is. No field, or more than one, is no seal. */
export function readSeal(bytes: Uint8Array): Seal {
  const offsets = fields(bytes);
  const at = offsets.length === 1 ? offsets[0]! : null;
  if (at === null) return { at, carried: "", found: "", intact: false };
  const carried = Buffer.from(bytes.subarray(at, at + DIGITS)).toString("latin1");
  const found = digestAround(bytes, at);
  return { at, carried, found, intact: carried === found };
}

/**
 * A copy of the file with its digest written into the field; same length.
 * Errors: AppError sheet/no-seal-field when the file has no field, or more than one.
 */
export function sealPdf(bytes: Uint8Array): Uint8Array {
  const { at } = readSeal(bytes);
  if (at === null) {
    throw new AppError({
      family: "sheet",
      code: "no-seal-field",
      what: "The sheet could not be sealed: it has not exactly one place for its digest.",
      whatToDo: "Write the sheet again.",
    });
  }
  const sealed = Uint8Array.from(bytes);
  sealed.set(Buffer.from(digestAround(bytes, at), "latin1"), at);
  return sealed;
}
