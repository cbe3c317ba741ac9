/** Previewing, issuing and verifying appraisal sheets. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { formatMoney } from "../domain/format.ts";
import type { SheetRequest } from "../domain/sheetRecord.ts";
import { DRAFT_NUMBER } from "../sheet/buildSheet.ts";
import { ruleRange } from "../sheet/concludePrice.ts";
import { renderSheet } from "../sheet/renderSheetPdf.ts";
import { readSeal } from "../sheet/sealPdf.ts";
import { verifyReport } from "../sheet/verifyReport.ts";
import { fromBase64, toBase64 } from "./base64.ts";
import { computeAppraisal } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import { personOf, recordAct } from "./recordAct.ts";
import { insertEdition } from "./saveEdition.ts";
import { composeSheetEvidence, recomputeFromSheet, refuseUnready } from "./sheetEvidence.ts";

function prepare(ports: Ports, classId: number, request: SheetRequest) {
  const assetClass = ports.store.assetClasses.get(classId);
  const sales = ports.store.sales.readColumns(classId);
  const { model, subject, levels } = request;
  return {
    assetClass,
    sales,
    computed: computeAppraisal({ assetClass, sales, model, subject, levels, withSets: true }),
  };
}

/** A draft: no number, nothing stored, nothing asked of the headline but a price. */
export async function previewSheet(
  ports: Ports,
  { classId, request }: RequestInput<"previewSheet">,
): Promise<RequestOutput<"previewSheet">> {
  const { assetClass, sales, computed } = prepare(ports, classId, request);
  const latest = ports.store.editions.latest(classId);
  const stamp = { sheetNumber: DRAFT_NUMBER, editionNumber: latest?.number ?? 0 };
  const evidence = composeSheetEvidence(ports, assetClass, request, sales, computed, stamp);
  const { bytes, pageCount } = await renderSheet(evidence, await ports.fonts);
  return { bytesBase64: toBase64(bytes), pageCount };
}

/**
 * Issues a sheet: the edition it rests on is saved with it when it is not there yet. Refuses (AppError) what refuseUnready
 * refuses, and "number-taken" when another window was quicker.
 */
export async function issueSheet(
  ports: Ports,
  { classId, request }: RequestInput<"issueSheet">,
): Promise<RequestOutput<"issueSheet">> {
  const { assetClass, sales, computed } = prepare(ports, classId, request);
  refuseUnready(request, computed.appraisal);
  // The edition is the model itself on this evidence; what the subject does not know is the sheet's matter.
  const { model, levels, subject } = request;
  const whole = computeAppraisal({ assetClass, sales, model, subject: null, levels, effectiveOn: subject.effectiveOn });
  const edition = ports.store.transaction(() => insertEdition(ports, assetClass, model, sales, whole));
  const sheetNumber = ports.store.sheets.nextNumber(Number(request.engagement.reportOn.slice(0, 4)));
  const stamp = { sheetNumber, editionNumber: edition.number };
  const evidence = composeSheetEvidence(ports, assetClass, request, sales, computed, stamp);
  const { bytes } = await renderSheet(evidence, await ports.fonts);
  const digest = readSeal(bytes).carried;
  const { amount, rangeForOneSale } = evidence.conclusion;
  const range = ruleRange(rangeForOneSale);
  const sheet = ports.store.transaction(() => {
    const inserted = ports.store.sheets.insert({
      assetClassId: classId,
      editionId: edition.id,
      number: sheetNumber,
      title: request.subject.title,
      amount,
      low: range?.low ?? amount,
      high: range?.high ?? amount,
      currencyCode: assetClass.currencyCode,
      effectiveOn: request.subject.effectiveOn,
      issuedAtUtc: ports.nowUtc(),
      issuedBy: personOf(ports),
      digest,
      bytes,
    });
    recordAct(ports, {
      act: "sheet-issued",
      assetClassId: classId,
      sentence: `Sheet ${sheetNumber} issued: ${request.subject.title} at ${formatMoney(amount, assetClass.currencyCode)}.`,
      facts: {
        number: sheetNumber,
        digest,
        edition: edition.number,
        amount,
        fingerprint: evidence.evidenceFingerprint,
      },
    });
    return inserted;
  });
  return { sheet, bytesBase64: toBase64(bytes) };
}

export async function verifySheet(
  ports: Ports,
  { bytesBase64 }: RequestInput<"verifySheet">,
): Promise<RequestOutput<"verifySheet">> {
  return verifyReport({
    bytes: fromBase64(bytesBase64),
    fonts: await ports.fonts,
    programVersion: ports.programVersion,
    recompute: recomputeFromSheet,
    // A store in which nothing was ever done has no say in which sheets there are.
    knowsDigest:
      ports.store.journal.count() === 0
        ? null
        : (_number, digest) => ports.store.journal.findSheetIssued(digest) !== null,
  });
}
