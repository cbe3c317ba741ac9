/**
 * Held-back rows: listed, mended (converted again with the corrected cells, the way their file was read) or left out with a
 * reason. A row that is left out stays counted as held back, so that rows read still add up.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { AppError } from "../domain/errors.ts";
import type { DuplicateRow, HeldBackReason, ImportResult, StoredHeldBackRow } from "../domain/importRecord.ts";
import { convertOneRow } from "../import/convertRows.ts";
import { duplicateIndexOf } from "./duplicateIndexOf.ts";
import { unlistedLevels } from "./newAttributes.ts";
import type { Ports } from "./ports.ts";
import { recordAct } from "./recordAct.ts";

export function listHeldBack(ports: Ports, { classId }: RequestInput<"listHeldBack">): readonly StoredHeldBackRow[] {
  return ports.store.heldBack.list(classId);
}

function refuseUnknownColumns(
  cells: Readonly<Record<string, string>>,
  headings: readonly string[],
  fileName: string,
): void {
  const unknown = Object.keys(cells).find((heading) => !headings.includes(heading));
  if (unknown === undefined) return;
  throw new AppError({
    family: "request",
    code: "no-such-column",
    what: `The file has no column "${unknown}".`,
    where: fileName,
    whatToDo: "Give cells under the headings of the file.",
  });
}

function duplicateReason({ sameAs }: DuplicateRow): HeldBackReason {
  const other = "saleId" in sameAs ? `sale ${sameAs.reference ?? sameAs.saleId}` : `row ${sameAs.row}`;
  return {
    column: null,
    value: null,
    reason: `This row is the same sale as ${other}, which is in the register already.`,
    suggestion: null,
  };
}

function remainingReasons(result: ImportResult): readonly HeldBackReason[] {
  const [held] = result.heldBack;
  if (held !== undefined) return held.reasons;
  const [duplicate] = result.duplicates;
  return duplicate === undefined ? [] : [duplicateReason(duplicate)];
}

/** Refuses (AppError) a row that is not held back, and cells under headings that the file has not. */
export function mendHeldBack(ports: Ports, input: RequestInput<"mendHeldBack">): RequestOutput<"mendHeldBack"> {
  const { classId, heldBackId } = input;
  const { assetClasses, attributes, batches, heldBack, sales } = ports.store;
  return ports.store.transaction(() => {
    const assetClass = assetClasses.get(classId);
    const before = heldBack.get(classId, heldBackId);
    const reading = batches.reading(before.batchId);
    refuseUnknownColumns(input.cells, [...reading.headings, ...Object.keys(before.cells)], before.fileName);
    const cells = { ...before.cells, ...input.cells };
    const result = convertOneRow(before.row, cells, reading, assetClass, duplicateIndexOf(ports, assetClass));
    const [accepted] = result.accepted;
    if (accepted === undefined) {
      heldBack.changeCells(heldBackId, cells, remainingReasons(result));
      return { accepted: false, row: heldBack.get(classId, heldBackId), saleId: null };
    }
    for (const attribute of assetClass.attributes) {
      if (attribute.kind !== "choice") continue;
      attributes.addLevels(classId, attribute.key, unlistedLevels(attribute, [accepted.sale]));
    }
    const [saleId] = sales.insertSales(classId, before.batchId, [
      { ...accepted, cells: reading.headings.map((heading) => cells[heading] ?? "") },
    ]);
    heldBack.closeMended(heldBackId, saleId!);
    batches.countMended(before.batchId);
    recordAct(ports, {
      act: "row-mended",
      assetClassId: classId,
      sentence: `Row ${before.row} of ${before.fileName} mended and brought in.`,
      facts: { batchId: before.batchId, row: before.row, saleId, before: before.cells, changed: input.cells },
    });
    return { accepted: true, row: null, saleId: saleId! };
  });
}

export function leaveOutHeldBack(ports: Ports, input: RequestInput<"leaveOutHeldBack">): { left: number } {
  const { classId, heldBackId } = input;
  const reason = input.reason.trim() === "" ? "no reason given" : input.reason.trim();
  const { heldBack } = ports.store;
  return ports.store.transaction(() => {
    const row = heldBack.get(classId, heldBackId);
    heldBack.closeLeftOut(heldBackId, reason);
    recordAct(ports, {
      act: "row-left-out",
      assetClassId: classId,
      sentence: `Row ${row.row} of ${row.fileName} left out: ${reason}`,
      facts: { batchId: row.batchId, row: row.row, cells: row.cells, reason },
    });
    return { left: heldBack.list(classId).length };
  });
}
