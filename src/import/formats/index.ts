/** Kinds of files that can be read, in the order they are asked. A new kind is one file and one line here. */
import type { TableFormat } from "../rawTable.ts";
import { csv } from "./csv.ts";

const FORMATS: readonly TableFormat[] = [csv];

export function formatOf(bytes: Uint8Array, fileName: string): TableFormat | null {
  return FORMATS.find((format) => format.recognises(bytes, fileName)) ?? null;
}
