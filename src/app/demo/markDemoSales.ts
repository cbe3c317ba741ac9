/** What the demo's invented people did once their file was in: sales set aside with a reason, sales verified, an item begun. */

import { textsOf } from "../../domain/sale.ts";
import type { Ports } from "../ports.ts";
import { counted } from "../recordAct.ts";
import type { DemoClass } from "./demoClasses.ts";

export type DemoMarks = Pick<DemoClass, "setAside" | "verify" | "subject" | "engagement">;

interface Mark {
  readonly reference: string;
  readonly by: string;
  readonly on: string;
}

interface MarkGroup {
  readonly by: string;
  readonly on: string;
  readonly words: string;
  readonly ids: number[];
}

/** Marks that are alike but for the sale become one act. References that the class has not are a fault of the demo. */
function grouped<M extends Mark>(marks: readonly M[], words: (mark: M) => string, idOf: ReadonlyMap<string, number>) {
  const groups = new Map<string, MarkGroup>();
  for (const mark of marks) {
    const id = idOf.get(mark.reference);
    if (id === undefined) throw new Error(`the demo has no sale ${mark.reference}`);
    const key = JSON.stringify([mark.by, mark.on, words(mark)]);
    const group = groups.get(key) ?? { by: mark.by, on: mark.on, words: words(mark), ids: [] };
    group.ids.push(id);
    groups.set(key, group);
  }
  return [...groups.values()];
}

/** Call it inside the transaction that brings the demo in. */
export function markDemoSales(
  ports: Ports,
  classId: number,
  { setAside, verify, subject, engagement }: DemoMarks,
): void {
  const { sales, journal, drafts } = ports.store;
  const columns = sales.readColumns(classId);
  const idOf = new Map<string, number>();
  textsOf(columns.references).forEach((reference, k) => {
    if (reference !== null) idOf.set(reference, columns.ids[k]!);
  });
  const atUtc = ports.nowUtc();
  for (const { ids, by, on, words: reason } of grouped(setAside, (mark) => mark.reason, idOf)) {
    const changed = sales.setAside(classId, ids, by, on, reason);
    const sentence = `${counted(changed, "sale")} set aside: ${reason}`;
    journal.append({
      act: "sales-set-aside",
      assetClassId: classId,
      sentence,
      facts: { changed, saleIds: ids, reason },
      atUtc,
      by,
    });
  }
  for (const { ids, by, on, words: how } of grouped(verify, (mark) => mark.how, idOf)) {
    const changed = sales.verify(classId, ids, by, on, how);
    const sentence = `${counted(changed, "sale")} verified: ${how}`;
    journal.append({
      act: "sales-verified",
      assetClassId: classId,
      sentence,
      facts: { changed, saleIds: ids, how },
      atUtc,
      by,
    });
  }
  drafts.write(classId, { subject, engagement, savedAtUtc: atUtc });
}
