/**
 * The sheet as PDF: A4, tagged, with bookmarks, the evidence attached, and sealed. Same evidence and same fonts give the same
 * bytes: every date in the file is the day of issue, nothing is drawn at random, and no clock is read.
 */
import { dayNumber } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { SheetEvidence } from "../domain/sheetRecord.ts";
import { buildSheet, pageWords, textsOf } from "./buildSheet.ts";
import { canonicalJson } from "./canonicalJson.ts";
import { caveatsBand } from "./draw/drawCaveats.ts";
import { drawFirstPage } from "./draw/drawFirstPage.ts";
import { ledgerBands } from "./draw/drawLedger.ts";
import { pullBand } from "./draw/drawPull.ts";
import { reachBands } from "./draw/drawReach.ts";
import { stepsBand } from "./draw/drawSteps.ts";
import { countsBand, noteBand, numberedBand, paragraphsBand, reworkBand } from "./draw/drawText.ts";
import { type Band, type Cursor, fitText, placeSection } from "./draw/flow.ts";
import { PAGE, Paper, type Placed } from "./draw/paper.ts";
import { STYLES } from "./draw/styles.ts";
import { MISSING_MARK } from "./draw/typeface.ts";
import { evidenceCsv } from "./evidenceCsv.ts";
import { EVIDENCE_FILE, TABLE_FILE } from "./parts/closing.ts";
import { sealPdf, UNSEALED } from "./sealPdf.ts";
import type { Fact, Part, Section, Sheet } from "./sheetContent.ts";
import { SHEET_FONT_FILES, type SheetFonts } from "./sheetFonts.ts";

const MS_PER_DAY = 86_400_000;

export interface RenderedSheet {
  /** The whole file, sealed. */
  readonly bytes: Uint8Array;
  readonly pageCount: number;
  /** Characters that no font of the sheet holds; each stands as U+FFFD and is named on the last page. */
  readonly missingCharacters: readonly string[];
  /** Every line of text as set, for measuring. */
  readonly placed: readonly Placed[];
}

/**
 * The sheet's bytes. A sheet number of "" makes a draft.
 * Errors: AppError sheet/no-price without a price; sheet/font-missing without a font file.
 */
export async function renderSheetPdf(evidence: SheetEvidence, fonts: SheetFonts): Promise<Uint8Array> {
  return (await renderSheet(evidence, fonts)).bytes;
}

export async function renderSheet(evidence: SheetEvidence, fonts: SheetFonts): Promise<RenderedSheet> {
  checkFonts(fonts);
  const plain = buildSheet(evidence);
  const issued = new Date((dayNumber(evidence.issuedOn) ?? 0) * MS_PER_DAY);
  const paper = new Paper(fonts, { lang: plain.lang, info: infoOf(evidence, plain, issued) });
  const missing = missingCharacters(paper, plain);
  const sheet = missing.length > 0 ? buildSheet(evidence, missing) : plain;
  const cut = drawFirstPage(paper, sheet);
  const cursor: Cursor = { top: PAGE.bottom, fresh: false };
  for (const section of withCutFacts(sheet.sections, cut)) {
    placeSection(paper, cursor, {
      heading: section.heading,
      lead: section.lead,
      bands: section.parts.flatMap((part) => bandsOf(paper, part)),
      freshPage: section.freshPage === true,
    });
  }
  const pageCount = runningHeads(paper, sheet);
  attach(paper, evidence, issued);
  const bytes = sealPdf(await paper.finish());
  return { bytes, pageCount, missingCharacters: missing, placed: paper.placed };
}

function checkFonts(fonts: SheetFonts): void {
  const lost = SHEET_FONT_FILES.filter((name) => fonts[name] === undefined);
  if (lost.length === 0) return;
  throw new AppError({
    family: "sheet",
    code: "font-missing",
    what: `The sheet could not be made: ${lost.length} of its font files are missing.`,
    where: lost[0]!,
    whatToDo: "Install the program again; its fonts come with it.",
  });
}

function infoOf(evidence: SheetEvidence, sheet: Sheet, issued: Date): Record<string, string | Date> {
  return {
    Title: sheet.documentTitle,
    Author: sheet.practice,
    Creator: `${evidence.program} ${evidence.programVersion}`,
    Producer: evidence.program,
    CreationDate: issued,
    ModDate: issued,
    Seal: UNSEALED,
  };
}

/** Characters of the sheet that no font holds, in order of first use. */
function missingCharacters(paper: Paper, sheet: Sheet): string[] {
  for (const text of textsOf(sheet)) paper.typeface.runs(text, "serif");
  return [...paper.typeface.missing].filter((character) => character !== MISSING_MARK);
}

/** What page 1 had no room for follows before the assumptions, whole. */
function withCutFacts(sections: readonly Section[], cut: readonly Fact[]): readonly Section[] {
  if (cut.length === 0) return sections;
  const whole: Section = {
    heading: "Page 1 in full",
    lead: null,
    parts: [
      {
        kind: "paragraphs",
        size: "usual",
        items: cut.map(({ label, words }) => [{ text: `${label}: `, bold: true }, { text: words }]),
      },
    ],
  };
  const at = sections.findIndex(({ heading }) => heading === "Assumptions and limiting conditions");
  return [...sections.slice(0, at), whole, ...sections.slice(at)];
}

function bandsOf(paper: Paper, part: Part): Band[] {
  switch (part.kind) {
    case "steps":
      return [stepsBand(paper, part.table)];
    case "ledger":
      return ledgerBands(paper, part.table);
    case "note":
      return [noteBand(paper, part.text)];
    case "paragraphs":
      return [paragraphsBand(paper, part.items, part.size)];
    case "numbered":
      return [numberedBand(paper, part.items)];
    case "counts":
      return [countsBand(paper, part.counts)];
    case "pull":
      return [pullBand(paper, part.table)];
    case "reach":
      return reachBands(paper, part.table);
    case "caveats":
      return [caveatsBand(paper, part.rows)];
    case "rework":
      return [reworkBand(paper, part.rows, part.aside)];
  }
}

const HEAD_BASELINE = 10.9;
const FOOT_BASELINE = 289.2;

/** Header from page 2, footer on every page; gives the number of pages. */
function runningHeads(paper: Paper, sheet: Sheet): number {
  const { count } = paper.doc.bufferedPageRange();
  for (let page = 0; page < count; page++) {
    paper.doc.switchToPage(page);
    paper.page = page;
    paper.artifact(() => {
      if (page > 0) {
        const title = fitText(paper, sheet.runningHead, STYLES.running, 105, 1).lines[0]!;
        const practice = fitText(paper, sheet.practice, STYLES.runningPractice, 62, 1).lines[0]!;
        paper.text(title, PAGE.left, HEAD_BASELINE, STYLES.running);
        paper.text(practice, PAGE.right, HEAD_BASELINE, STYLES.runningPractice, "right");
      }
      const footer = fitText(paper, sheet.footer, STYLES.running, 145, 1).lines[0]!;
      paper.text(footer, PAGE.left, FOOT_BASELINE, STYLES.running);
      paper.text(pageWords(page + 1, count), PAGE.right, FOOT_BASELINE, STYLES.running, "right");
    }, "Pagination");
  }
  return count;
}

function attach(paper: Paper, evidence: SheetEvidence, issued: Date): void {
  const dates = { creationDate: issued, modifiedDate: issued };
  const file = (text: string, name: string, type: string, description: string, relationship: string): void => {
    paper.doc.file(Buffer.from(text, "utf8"), { name, type, description, relationship, ...dates } as never);
  };
  file(
    canonicalJson(evidence),
    EVIDENCE_FILE,
    "application/json",
    "All that this sheet rests on and shows, at full precision",
    "Data",
  );
  file(evidenceCsv(evidence.evidence), TABLE_FILE, "text/csv", "The sales used, as a table", "Supplement");
}
