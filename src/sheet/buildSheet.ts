/**
 * The sheet in words, figures and pictures, from the one result object. Nothing here computes a price: numbers are rounded by
 * domain/format.ts and put into sentences. Same evidence, same sheet.
 */
import { formatNumber } from "../domain/format.ts";
import type { SheetEvidence } from "../domain/sheetRecord.ts";
import { builtUpSection } from "./parts/builtUp.ts";
import {
  assumptionsSection,
  cautionsSection,
  furtherCaveatsSection,
  reworkSection,
  stateLine,
} from "./parts/closing.ts";
import { contextOf, type SheetContext, stated } from "./parts/context.ts";
import { evidenceSection } from "./parts/evidence.ts";
import { firstPage } from "./parts/firstPage.ts";
import { ledgerSection } from "./parts/ledger.ts";
import { pullSection } from "./parts/pull.ts";
import { reachSection } from "./parts/reach.ts";
import { setsSection } from "./parts/sets.ts";
import type { Sheet } from "./sheetContent.ts";

/** Number of a sheet that has not been issued. */
export const DRAFT_NUMBER = "";

/**
 * Every heading, sentence, cell and picture. `missing` are characters that the fonts lack, to be named on the sheet.
 * Errors: AppError sheet/no-price where nothing has been priced.
 */
export function buildSheet(evidence: SheetEvidence, missing: readonly string[] = []): Sheet {
  const context = contextOf(evidence);
  const { engagement } = evidence.request;
  const isDraft = evidence.sheetNumber === DRAFT_NUMBER;
  const numberLine = isDraft ? "Appraisal sheet" : `Appraisal sheet ${evidence.sheetNumber}`;
  const title = stated(context.priced.subject.title);
  const invented = evidence.appraisal.assetClass.invented;
  return {
    lang: "en-GB",
    documentTitle: `${numberLine}: ${title}${invented ? " (invented example)" : ""}`,
    practice: engagement.practice.trim() === "" ? "Practice not stated" : engagement.practice,
    practiceLine: engagement.practiceLine,
    numberLine,
    stateLine: stateLine(context),
    isDraft,
    exampleLabel: invented ? "Invented example" : null,
    footer: footer(context, invented, isDraft),
    runningHead: `${numberLine} · ${title}`,
    first: firstPage(context),
    sections: [
      builtUpSection(context),
      ledgerSection(context),
      setsSection(context),
      evidenceSection(context),
      pullSection(context),
      reachSection(context),
      furtherCaveatsSection(context),
      assumptionsSection(context),
      cautionsSection(context),
      reworkSection(context, missing),
    ].filter((section) => section !== null),
  };
}

function footer(context: SheetContext, invented: boolean, isDraft: boolean): string {
  const state = isDraft ? "Draft, not issued" : stateLine(context);
  const example = `Invented example: ${context.itemWord}s, makers, sales, client and practice do not exist`;
  return invented ? `${example}${isDraft ? ". Draft" : ""}` : state;
}

/** Every text of the sheet, for checking that the fonts can draw it. */
export function textsOf(value: unknown): string[] {
  if (typeof value === "string") return [value];
  if (Array.isArray(value)) return value.flatMap(textsOf);
  return value !== null && typeof value === "object" ? Object.values(value).flatMap(textsOf) : [];
}

/** "page 2 of 4" */
export function pageWords(page: number, pages: number): string {
  return `page ${formatNumber(page)} of ${formatNumber(pages)}`;
}
