/** The sheet's fonts, read from resources as a shell does. */
import { readFileSync } from "node:fs";
import { SHEET_FONT_FILES, type SheetFonts } from "../../src/sheet/sheetFonts.ts";

export const FONTS: SheetFonts = Object.fromEntries(
  SHEET_FONT_FILES.map((name) => [
    name,
    new Uint8Array(readFileSync(new URL(`../../resources/fonts/${name}.woff`, import.meta.url))),
  ]),
);
