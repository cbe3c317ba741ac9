/** Requests about sales that are in the register: list, set aside, put back, verify. */
import type { RequestInput, SalesPage } from "../contract/requests.ts";
import type { Ports } from "./ports.ts";
import { counted, personOf, recordAct } from "./recordAct.ts";

/** Journal facts name the sales; beyond this many only their number is kept. */
const NAMED = 1000;

function saleFacts(saleIds: readonly number[], changed: number): Record<string, unknown> {
  return saleIds.length <= NAMED ? { changed, saleIds } : { changed, asked: saleIds.length };
}

export function listSales(ports: Ports, query: RequestInput<"listSales">): SalesPage {
  return ports.store.sales.listSales(query);
}

export function setAsideSales(ports: Ports, input: RequestInput<"setAsideSales">): { changed: number } {
  const { classId, saleIds, reason } = input;
  return ports.store.transaction(() => {
    const changed = ports.store.sales.setAside(classId, saleIds, personOf(ports), ports.today(), reason);
    if (changed > 0) {
      recordAct(ports, {
        act: "sales-set-aside",
        assetClassId: classId,
        sentence: `${counted(changed, "sale")} set aside: ${reason}`,
        facts: { ...saleFacts(saleIds, changed), reason },
      });
    }
    return { changed };
  });
}

export function putBackSales(ports: Ports, { classId, saleIds }: RequestInput<"putBackSales">): { changed: number } {
  return ports.store.transaction(() => {
    const changed = ports.store.sales.putBack(classId, saleIds);
    if (changed > 0) {
      recordAct(ports, {
        act: "sales-put-back",
        assetClassId: classId,
        sentence: `${counted(changed, "sale")} put back.`,
        facts: saleFacts(saleIds, changed),
      });
    }
    return { changed };
  });
}

export function verifySales(ports: Ports, { classId, saleIds, how }: RequestInput<"verifySales">): { changed: number } {
  return ports.store.transaction(() => {
    const changed = ports.store.sales.verify(classId, saleIds, personOf(ports), ports.today(), how);
    if (changed > 0) {
      recordAct(ports, {
        act: "sales-verified",
        assetClassId: classId,
        sentence: `${counted(changed, "sale")} verified: ${how}`,
        facts: { ...saleFacts(saleIds, changed), how },
      });
    }
    return { changed };
  });
}
