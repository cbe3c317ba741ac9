/** Two attributes of the evidence in memory: how they move together, where the item lies; what left-out ones would do. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { attributePair } from "../explanation/attributePair.ts";
import { puttingIn } from "../explanation/puttingIn.ts";
import { fitInUse } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** Null where there is no picture of the two; refuses what `appraise` refuses. */
export function pairOf(ports: Ports, memory: EvidenceMemory, input: RequestInput<"pairOf">): RequestOutput<"pairOf"> {
  const { classId, model, subject, a, b } = input;
  const assetClass = ports.store.assetClasses.get(classId);
  const asked = { assetClass, model, subject, levels: [] };
  const { sales, prepared } = memory.recall(assetClass, asked, () => ports.store.sales.readColumns(classId));
  const { fit, row } = fitInUse({ ...asked, sales }, prepared);
  const rawOf = (key: string): number | null => {
    const group = fit.design.groups.find((one) => one.key === key);
    if (group === undefined || group.form !== "line" || row === null) return null;
    const value = row.x[group.columns[0]!]!;
    return Number.isFinite(value) ? value : null;
  };
  return attributePair({ fit, a, b, subject: [rawOf(a), rawOf(b)] });
}

/** What each left-out attribute would do if it came in; refuses what `appraise` refuses. */
export function ifPutIn(
  ports: Ports,
  memory: EvidenceMemory,
  { classId, model, subject, averagePrice }: RequestInput<"ifPutIn">,
): RequestOutput<"ifPutIn"> {
  const assetClass = ports.store.assetClasses.get(classId);
  const asked = { assetClass, model, subject, levels: [] };
  const { sales, prepared } = memory.recall(assetClass, asked, () => ports.store.sales.readColumns(classId));
  return puttingIn({ ...fitInUse({ ...asked, sales }, prepared), averagePrice });
}
