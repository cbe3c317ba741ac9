/** What a sheet's PDF says about itself, read from its bytes alone. */
import { AppError } from "../domain/errors.ts";
import type { SheetEvidence } from "../domain/sheetRecord.ts";

export interface ReadSheet {
  readonly evidence: SheetEvidence;
  readonly sealFound: boolean;
  readonly sealIntact: boolean;
  readonly digest: string;
}

/** Errors: AppError of family "sheet" for anything that is not a sheet of this program. */
export function readSheetEvidence(bytes: Uint8Array): ReadSheet {
  throw new AppError({
    family: "sheet",
    code: "unreadable",
    what: `No sheet could be read from these ${bytes.length} bytes.`,
  });
}
