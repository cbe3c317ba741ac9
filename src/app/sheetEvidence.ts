/** Everything a sheet shows and needs to be worked out again, from one request; and working it out again. */
import type { Appraisal } from "../domain/appraisal.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import { AppError } from "../domain/errors.ts";
import { canonicalEvidence } from "../domain/evidenceTable.ts";
import { listWords } from "../domain/format.ts";
import type { SheetEvidence, SheetRequest } from "../domain/sheetRecord.ts";
import { fromEvidenceTable, toEvidenceTable } from "../evidence/evidenceTable.ts";
import { concludePrice } from "../sheet/concludePrice.ts";
import { type ComputedAppraisal, recomputeAppraisal } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";

/** What a headline price may not be without, with the words a person knows it by. */
const HEADLINE_NEEDS = {
  basisOfValue: "basis of value",
  premise: "premise of value",
  marketLevel: "market level",
  priceBasisWords: "price basis",
} as const;

/** Names of what is missing before a price may stand on a sheet. */
export function missingForHeadline(request: SheetRequest): string[] {
  return Object.entries(HEADLINE_NEEDS)
    .filter(([field]) => request.engagement[field as keyof typeof HEADLINE_NEEDS].trim() === "")
    .map(([, words]) => words);
}

/** Refuses a sheet that may not be issued: no headline terms, beyond the evidence without a reason, an adjustment without one. */
export function refuseUnready(request: SheetRequest, appraisal: Appraisal): void {
  const missing = missingForHeadline(request);
  if (missing.length > 0) {
    throw new AppError({
      family: "sheet",
      code: "headline-incomplete",
      what: `A price may not stand on a sheet without its ${listWords(missing)}.`,
      where: "Sheets, draft",
      whatToDo: "Fill these in on the Appraise screen.",
    });
  }
  const unreasoned = request.adjustments.filter((one) => one.reason.trim() === "").map((one) => one.label);
  if (unreasoned.length > 0) {
    throw new AppError({
      family: "sheet",
      code: "adjustment-without-reason",
      what: `The adjustment ${listWords(unreasoned)} has no reason.`,
      where: "Sheets, draft",
      whatToDo: "Write the reason; it prints on the sheet.",
    });
  }
  if (appraisal.priced?.reach.verdict === "beyond" && (request.overrideReason ?? "").trim() === "") {
    throw new AppError({
      family: "sheet",
      code: "beyond-evidence",
      what: appraisal.priced.reach.sentence,
      where: "Appraise, reach",
      whatToDo: "Price it only with a written reason, which prints on the sheet.",
    });
  }
}

export interface SheetStamp {
  readonly sheetNumber: string;
  readonly editionNumber: number;
}

export function composeSheetEvidence(
  ports: Ports,
  assetClass: NewAssetClass,
  request: SheetRequest,
  sales: Parameters<typeof toEvidenceTable>[0],
  computed: ComputedAppraisal,
  stamp: SheetStamp,
): SheetEvidence {
  const { name, itemWord, currencyCode, priceBasis, invented, attributes } = assetClass;
  const table = toEvidenceTable(sales, computed.used, assetClass, request.model);
  if (computed.appraisal.priced === null) throw new Error("a sheet needs a subject");
  return {
    schema: "lotwright-sheet/1",
    program: "Lotwright",
    programVersion: ports.programVersion,
    sheetNumber: stamp.sheetNumber,
    issuedOn: request.engagement.reportOn,
    editionNumber: stamp.editionNumber,
    assetClass: { name, itemWord, currencyCode, priceBasis, invented, attributes },
    request,
    evidence: table,
    evidenceFingerprint: ports.sha256(canonicalEvidence(table)),
    appraisal: computed.appraisal,
    conclusion: concludePrice(computed.appraisal.priced, request.adjustments),
  };
}

/** Refit and price from what a sheet embeds; nothing else is read. */
export function recomputeFromSheet(evidence: SheetEvidence): Appraisal {
  const { assetClass, request } = evidence;
  return recomputeAppraisal(
    {
      assetClass,
      sales: fromEvidenceTable(evidence.evidence, assetClass),
      model: request.model,
      subject: request.subject,
      levels: request.levels,
    },
    evidence.appraisal,
  );
}
