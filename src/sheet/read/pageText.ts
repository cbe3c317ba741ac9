/**
 * The text of each page as a reader sees it: glyphs are turned back into characters by the table that each font carries.
 * Pieces stand in the order they were drawn in. Only for files that readPdf takes.
 */
import { follow, type PdfFile, type PdfObject, unreadable } from "./pdfObjects.ts";

type Glyphs = readonly string[];

function glyphsOf(file: PdfFile, font: PdfObject): Glyphs {
  const table = follow(file, font.body, "ToUnicode")?.stream();
  if (table == null) return [];
  const text = Buffer.from(table).toString("latin1");
  const glyphs: string[] = [];
  for (const range of text.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/g)) {
    let at = Number.parseInt(range[1]!, 16);
    for (const entry of range[2]!.matchAll(/<([0-9a-f ]*)>/g)) {
      const units = entry[1]!.split(" ").filter((unit) => unit !== "");
      glyphs[at] = String.fromCharCode(...units.map((unit) => Number.parseInt(unit, 16)));
      at += 1;
    }
  }
  return glyphs;
}

function fontsOf(file: PdfFile, page: PdfObject): Map<string, Glyphs> {
  const resources = follow(file, page.body, "Resources");
  const fonts = new Map<string, Glyphs>();
  for (const [, name, id] of (resources?.body ?? "").matchAll(/\/(F\d+) (\d+) 0 R/g)) {
    const font = file.objects.get(Number(id));
    if (font !== undefined) fonts.set(name!, glyphsOf(file, font));
  }
  return fonts;
}

/** Each shown piece of text of one page. */
function piecesOf(file: PdfFile, page: PdfObject): string[] {
  const content = follow(file, page.body, "Contents")?.stream();
  if (content == null) throw unreadable("A page of this sheet has no content.");
  const fonts = fontsOf(file, page);
  const pieces: string[] = [];
  let glyphs: Glyphs = [];
  for (const line of Buffer.from(content).toString("latin1").split("\n")) {
    const font = /^\/(F\d+) [\d.]+ Tf$/.exec(line);
    if (font !== null) glyphs = fonts.get(font[1]!) ?? [];
    if (!line.endsWith("] TJ")) continue;
    let piece = "";
    for (const [, hex] of line.matchAll(/<([0-9a-f]+)>/g)) {
      for (let k = 0; k < hex!.length; k += 4) piece += glyphs[Number.parseInt(hex!.slice(k, k + 4), 16)] ?? "\ufffd";
    }
    pieces.push(piece);
  }
  return pieces;
}

/** One list of pieces for each page, in page order. */
export function pageTexts(file: PdfFile): string[][] {
  const root = follow(file, file.trailer, "Root");
  const pages = root === null ? null : follow(file, root.body, "Pages");
  const kids = /\/Kids \[([^\]]*)\]/.exec(pages?.body ?? "")?.[1];
  if (kids === undefined) throw unreadable("The pages of this sheet cannot be found.");
  return [...kids.matchAll(/(\d+) 0 R/g)].map(([, id]) => {
    const page = file.objects.get(Number(id));
    if (page === undefined) throw unreadable("A page of this sheet is missing.");
    return piecesOf(file, page);
  });
}
