/**
 * Verifying a sheet from its PDF alone. Four tests: the file's bytes against the digest it carries; the embedded sales against
 * their fingerprint; every figure of the embedded result against the one worked out again from those sales; and the pages
 * against the sheet drawn anew from the embedded evidence. The first catches a changed byte, the others a file that was rebuilt.
 */
import { createHash } from "node:crypto";
import type { Appraisal } from "../domain/appraisal.ts";
import { AppError, sentenceOf } from "../domain/errors.ts";
import { canonicalEvidence } from "../domain/evidenceTable.ts";
import { formatNumber } from "../domain/format.ts";
import type { SheetEvidence, VerificationReport, VerifiedFigure } from "../domain/sheetRecord.ts";
import { compareSheet } from "./compareSheet.ts";
import { concludePrice } from "./concludePrice.ts";
import { plural } from "./figures.ts";
import { comparePages } from "./read/comparePages.ts";
import { readPdf } from "./read/pdfObjects.ts";
import { type ReadSheet, readSheetEvidence } from "./readSheetEvidence.ts";
import { renderSheetPdf } from "./renderSheetPdf.ts";
import { readSeal } from "./sealPdf.ts";
import type { SheetFonts } from "./sheetFonts.ts";

export interface VerifyInput {
  readonly bytes: Uint8Array;
  readonly fonts: SheetFonts;
  /** Version of the program that verifies. */
  readonly programVersion: string;
  /** Fits and prices again from the embedded sales, model and subject; may throw AppError. */
  readonly recompute: (evidence: SheetEvidence) => Appraisal;
  /** Whether the journal knows this sheet with this digest; null where no store is asked. */
  readonly knowsDigest: ((sheetNumber: string, digest: string) => boolean) | null;
}

/** Never throws for a bad file: the verdict and the problems say what is wrong with it. */
export async function verifyReport(input: VerifyInput): Promise<VerificationReport> {
  let sheet: ReadSheet;
  try {
    sheet = readSheetEvidence(input.bytes);
  } catch (cause) {
    if (cause instanceof AppError) return unreadableReport(input.bytes, sentenceOf(cause.toPlain()));
    throw cause;
  }
  const { evidence } = sheet;
  const sameProgramVersion = evidence.programVersion === input.programVersion;
  const problems = sealProblems(sheet);
  const fingerprintEqual = fingerprintOf(evidence) === evidence.evidenceFingerprint;
  if (!fingerprintEqual) problems.push("The sales in the file are not those that its fingerprint was taken of.");
  const figures = figuresOf(input, evidence, sameProgramVersion, problems);
  const textEqual = await pagesProblems(input, sheet, sameProgramVersion, problems);
  const differentCount = figures.filter(({ equal }) => !equal).length;
  if (differentCount > 0) problems.push(differentWords(figures, differentCount));
  const equalCount = figures.length - differentCount;
  const stands = problems.length === 0;
  const knownToJournal = input.knowsDigest === null ? null : input.knowsDigest(evidence.sheetNumber, sheet.digest);
  return {
    verdict: stands ? "stands" : "altered",
    sentence: sentence(stands, equalCount, problems, knownToJournal, sameProgramVersion),
    bytesIntact: sheet.sealIntact,
    fingerprintEqual,
    textEqual,
    figures,
    equalCount,
    differentCount,
    programVersion: evidence.programVersion,
    sameProgramVersion,
    knownToJournal,
    sheetNumber: evidence.sheetNumber,
    title: evidence.request.subject.title,
    problems,
  };
}

function sealProblems({ sealFound, sealIntact }: ReadSheet): string[] {
  if (!sealFound) return ["The file carries no digest of itself, or more than one."];
  return sealIntact
    ? []
    : ["The file’s bytes are not those that its digest was taken of: something in it was changed."];
}

function fingerprintOf(evidence: SheetEvidence): string {
  return createHash("sha256").update(canonicalEvidence(evidence.evidence)).digest("hex");
}

function figuresOf(
  { recompute }: VerifyInput,
  evidence: SheetEvidence,
  sameVersion: boolean,
  problems: string[],
): VerifiedFigure[] {
  try {
    const again = recompute(evidence);
    if (again.priced === null) {
      problems.push("Worked out again, the embedded evidence gives no price.");
      return [];
    }
    const conclusion = concludePrice(again.priced, evidence.request.adjustments);
    return compareSheet(evidence, again, conclusion, { otherVersion: !sameVersion });
  } catch (cause) {
    const why = cause instanceof AppError ? ` ${sentenceOf(cause.toPlain())}` : "";
    problems.push(`The price could not be worked out again from what the file embeds.${why}`);
    return [];
  }
}

/** Draws the sheet anew and lays its pages beside the file's; gives whether their text is equal. */
async function pagesProblems(
  { fonts }: VerifyInput,
  { evidence, file }: ReadSheet,
  sameVersion: boolean,
  problems: string[],
): Promise<boolean> {
  try {
    const pages = comparePages(file, readPdf(await renderSheetPdf(evidence, fonts)), sameVersion);
    problems.push(...pages.problems);
    return pages.textEqual;
  } catch (cause) {
    const why = cause instanceof AppError ? ` ${sentenceOf(cause.toPlain())}` : "";
    problems.push(`The pages could not be drawn again from what the file embeds.${why}`);
    return false;
  }
}

function differentWords(figures: readonly VerifiedFigure[], count: number): string {
  const first = figures.find(({ equal }) => !equal)!;
  return `${formatNumber(count)} of ${formatNumber(figures.length)} figures ${plural(count, "is", "are")} not what the embedded sales give; the first is ${first.name}: ${first.printed} in the file, ${first.recomputed} worked out again.`;
}

function sentence(
  stands: boolean,
  equalCount: number,
  problems: readonly string[],
  known: boolean | null,
  sameVersion: boolean,
): string {
  if (!stands) return `The sheet does not stand: ${problems[0]!.charAt(0).toLowerCase()}${problems[0]!.slice(1)}`;
  const journal = known === null ? "" : known ? " The journal knows it." : " The journal here does not know it.";
  const how = sameVersion ? "to the last bit" : "to nine digits, in another version of the program than made it";
  return `The sheet stands: no byte was changed, and all ${formatNumber(equalCount)} figures came out again ${how}.${journal}`;
}

/** A file that cannot be read but carries a seal was a sheet once: it was altered. Without a seal it may be anything. */
function unreadableReport(bytes: Uint8Array, problem: string): VerificationReport {
  const seal = readSeal(bytes);
  const wasSheet = seal.at !== null;
  const changed = "The file’s bytes are not those that its digest was taken of: something in it was changed.";
  const problems = wasSheet && !seal.intact ? [changed, problem] : [problem];
  return {
    verdict: wasSheet ? "altered" : "unreadable",
    sentence: wasSheet
      ? `The sheet does not stand, and cannot be read any more. ${problem}`
      : `The sheet could not be read. ${problem}`,
    bytesIntact: seal.intact,
    fingerprintEqual: false,
    textEqual: false,
    figures: [],
    equalCount: 0,
    differentCount: 0,
    programVersion: null,
    sameProgramVersion: false,
    knownToJournal: null,
    sheetNumber: null,
    title: null,
    problems,
  };
}
