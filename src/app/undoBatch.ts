/**
 * Takes one import out of the register whole. Allowed even when an edition rests on its sales: an edition keeps its own report
 * and the sales stay readable by number, so nothing that was saved or issued changes.
 */
import type { RequestInput } from "../contract/requests.ts";
import { AppError } from "../domain/errors.ts";
import type { ImportBatch } from "../domain/importRecord.ts";
import type { Ports } from "./ports.ts";
import { counted, recordAct } from "./recordAct.ts";

export function listBatches(ports: Ports, { classId }: RequestInput<"listBatches">): readonly ImportBatch[] {
  return ports.store.batches.list(classId);
}

/** Refuses (AppError) an import that is undone already. */
export function undoBatch(ports: Ports, { classId, batchId }: RequestInput<"undoBatch">): { removed: number } {
  const { batches, heldBack, sales } = ports.store;
  return ports.store.transaction(() => {
    const batch = batches.get(classId, batchId);
    if (batch.undone) {
      throw new AppError({
        family: "import",
        code: "undone-already",
        what: "This import has been undone already.",
        where: batch.fileName,
        whatToDo: "Import the file again if its sales are wanted after all.",
      });
    }
    const removed = sales.removeBatch(classId, batchId, ports.nowUtc());
    heldBack.closeBatch(batchId);
    batches.markUndone(batchId);
    recordAct(ports, {
      act: "import-undone",
      assetClassId: classId,
      sentence: `Import of ${batch.fileName} undone: ${counted(removed, "sale")} taken out of the register.`,
      facts: { batchId, removed, fileName: batch.fileName, fileDigest: batch.fileDigest },
    });
    return { removed };
  });
}
