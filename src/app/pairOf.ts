/** Two attributes of the evidence in memory, how they move together, and where the item lies among them. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { attributePair } from "../explanation/attributePair.ts";
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
