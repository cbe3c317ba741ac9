/** Reading and writing the files that a command names, with refusals in sentences. */
import { readFileSync, writeFileSync } from "node:fs";
import { refuse } from "./verb.ts";

export function readBytes(path: string): Uint8Array {
  try {
    return new Uint8Array(readFileSync(path));
  } catch {
    throw refuse("no-such-file", "The file could not be read.", path, "Check its name and that you may read it.");
  }
}

export function readBase64(path: string): string {
  return Buffer.from(readBytes(path)).toString("base64");
}

export function writeBytes(path: string, bytesBase64: string): void {
  try {
    writeFileSync(path, Buffer.from(bytesBase64, "base64"));
  } catch {
    throw refuse(
      "not-written",
      "The file could not be written.",
      path,
      "Check that the folder exists and that you may write there.",
    );
  }
}

/** An object from a JSON file; refuses text that is not JSON, and JSON that is not an object. */
export function readJsonObject(path: string): Record<string, unknown> {
  let value: unknown;
  try {
    value = JSON.parse(
      Buffer.from(readBytes(path))
        .toString("utf8")
        .replace(/^\uFEFF/, ""),
    );
  } catch (cause) {
    if (!(cause instanceof SyntaxError)) throw cause;
    throw refuse("bad-json", "The file is not JSON.", path, `Correct it: ${cause.message}.`);
  }
  if (typeof value === "object" && value !== null && !Array.isArray(value)) return value as Record<string, unknown>;
  throw refuse("bad-json", "The file should hold one JSON object.", path, "Put everything inside { and }.");
}
