/** The sheet as PDF bytes, sealed. */
import type { SheetEvidence } from "../domain/sheetRecord.ts";
import type { SheetFonts } from "./sheetFonts.ts";

/** A sheet number of "" prints as a draft. Same evidence, same fonts: same bytes. */
export async function renderSheetPdf(evidence: SheetEvidence, fonts: SheetFonts): Promise<Uint8Array> {
  throw new Error(`${evidence.sheetNumber} ${Object.keys(fonts).length}`);
}
