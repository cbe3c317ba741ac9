/** What every part of the sheet's text is made from, worked out once. */
import type { Appraisal, PricePart } from "../../domain/appraisal.ts";
import { AppError } from "../../domain/errors.ts";
import { formatMoney } from "../../domain/format.ts";
import type { SheetEvidence } from "../../domain/sheetRecord.ts";
import { figureStep } from "../figures.ts";

export interface SheetContext {
  readonly sheet: SheetEvidence;
  readonly appraisal: Appraisal;
  readonly priced: PricePart;
  readonly itemWord: string;
  readonly currencyCode: string;
  /** "€" */
  readonly sign: string;
  /** Step of figures beside the price. */
  readonly step: number;
}

/** Errors: AppError sheet/no-price where the result has no price. */
export function contextOf(sheet: SheetEvidence): SheetContext {
  const { appraisal } = sheet;
  if (appraisal.priced === null) {
    throw new AppError({
      family: "sheet",
      code: "no-price",
      what: "A sheet cannot be made: nothing has been priced.",
      whatToDo: "Describe the item under Appraise first.",
    });
  }
  const { currencyCode, itemWord } = appraisal.assetClass;
  return {
    sheet,
    appraisal,
    priced: appraisal.priced,
    itemWord,
    currencyCode,
    sign: formatMoney(0, currencyCode).replace(/[\d.,\s]/g, ""),
    step: figureStep(sheet.conclusion.roundingStep),
  };
}

export function stated(text: string | null | undefined): string {
  return text == null || text.trim() === "" ? "not stated" : text.trim();
}

/** "edition 12"; a draft may rest on a fit that nobody has saved. */
export function editionWords(editionNumber: number): string {
  return editionNumber > 0 ? `edition ${editionNumber}` : "not saved as an edition";
}
