/** The font files of the sheet, as bytes by name: the core never learns where they lie. */
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import type { SheetFonts } from "../app/ports.ts";
import { programRoot } from "./programFiles.ts";

const ENDING = ".woff";

export function readFonts(): SheetFonts {
  const folder = join(programRoot(), "resources", "fonts");
  const names = readdirSync(folder).filter((name) => name.endsWith(ENDING));
  return Object.fromEntries(
    names.map((name) => [name.slice(0, -ENDING.length), new Uint8Array(readFileSync(join(folder, name)))]),
  );
}
