/** One reason why a sale is not evidence. Filters are asked in the stated order; the first that answers wins. */
import type { OutReason } from "../../domain/appraisal.ts";
import type { NewAssetClass } from "../../domain/assetClass.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import type { SaleColumns } from "../../domain/sale.ts";

export interface FilterContext {
  readonly sales: SaleColumns;
  readonly assetClass: NewAssetClass;
  readonly model: PriceModel;
  /** Day number that bounds the evidence, or null. */
  readonly effectiveOn: number | null;
}

export interface EvidenceFilterRule {
  readonly reason: OutReason;
  /** For a sale that is out: the detail (an attribute, a person's reason, a channel); null = the sale stays. */
  readonly out: (context: FilterContext, at: number) => string | null;
  /** "14 set aside by a person: forced sale" */
  readonly sentence: (count: number, detail: string, context: FilterContext) => string;
}

/** "1 sale" / "11 sales" */
export function salesWords(count: number): string {
  return count === 1 ? "1 sale" : `${count} sales`;
}
