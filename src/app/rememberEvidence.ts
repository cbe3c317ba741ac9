/**
 * Columns and moments of the evidence last looked at, kept in memory: switching an attribute or changing the subject asks
 * for the same columns again. What is kept is named by everything it depends on, the class's data version first, so that a
 * sale brought in, set aside or mended can never be answered from it.
 */
import type { AssetClass } from "../domain/assetClass.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import { type AppraisalInput, type PreparedEvidence, prepareEvidence } from "./computeAppraisal.ts";

export interface RememberedEvidence {
  readonly sales: SaleColumns;
  readonly prepared: PreparedEvidence;
}

export interface EvidenceMemory {
  /** The evidence of the input, from memory where it is the one last asked for. `readSales` is called only when it is not. */
  recall(
    assetClass: AssetClass,
    input: Omit<AppraisalInput, "sales">,
    readSales: () => SaleColumns,
  ): RememberedEvidence;
  /** The same where it is in memory, else null: for answers that must not wait. */
  peek(assetClass: AssetClass, input: Omit<AppraisalInput, "sales">): RememberedEvidence | null;
}

/** Two are kept: the class looked at, and the one before an undo. */
const KEPT = 2;

export function rememberEvidence(): EvidenceMemory {
  const kept: { name: string; evidence: RememberedEvidence }[] = [];
  const peek: EvidenceMemory["peek"] = (assetClass, input) => {
    const name = nameOf(assetClass, input);
    return kept.find((one) => one.name === name)?.evidence ?? null;
  };
  return {
    peek,
    recall(assetClass, input, readSales) {
      const found = peek(assetClass, input);
      if (found !== null) return found;
      const sales = readSales();
      const evidence = { sales, prepared: prepareEvidence({ ...input, sales }) };
      kept.unshift({ name: nameOf(assetClass, input), evidence });
      kept.length = Math.min(kept.length, KEPT);
      return evidence;
    },
  };
}

/** Everything that columns depend on; what only the fit reads (left-out attributes, estimator, errors, range) is not in it. */
function nameOf(assetClass: AssetClass, { model, subject, effectiveOn }: Omit<AppraisalInput, "sales">): string {
  const columnsOnly: Partial<PriceModel> = { ...model };
  for (const key of ["leftOut", "estimator", "errors", "range"] as const) delete columnsOnly[key];
  const until = subject?.effectiveOn ?? effectiveOn ?? null;
  return JSON.stringify([assetClass.id, assetClass.dataVersion, until, columnsOnly]);
}
