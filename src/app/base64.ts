/** Bytes cross a shell as base64 text. */
import { AppError } from "../domain/errors.ts";

const BASE64 = /^[A-Za-z0-9+/]*={0,2}$/;

/** Refuses (AppError) text that is not base64, rather than reading part of it. */
export function fromBase64(text: string): Uint8Array {
  if (text.length % 4 !== 0 || !BASE64.test(text)) {
    throw new AppError({
      family: "request",
      code: "bad-input",
      what: "The file did not arrive whole.",
      where: "bytesBase64",
      whatToDo: "Choose the file again.",
    });
  }
  return new Uint8Array(Buffer.from(text, "base64"));
}

export function toBase64(bytes: Uint8Array): string {
  return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).toString("base64");
}
