/** One kind of item with its own attributes, sales and models. */
import type { Attribute } from "./attribute.ts";
import type { PriceBasis } from "./sale.ts";

export interface AssetClass {
  readonly id: number;
  readonly name: string;
  /** What one item is called in a sentence: "machine", "boat", "house". */
  readonly itemWord: string;
  readonly currencyCode: string;
  readonly priceBasis: PriceBasis;
  /** True for demo classes: everything in them is invented, and says so. */
  readonly invented: boolean;
  /** Raised by every change to its sales or attributes; a stale result is recognised by it. */
  readonly dataVersion: number;
  readonly attributes: readonly Attribute[];
}

export type NewAssetClass = Omit<AssetClass, "id" | "dataVersion">;

export interface AssetClassSummary {
  readonly id: number;
  readonly name: string;
  readonly invented: boolean;
  readonly saleCount: number;
  readonly attributeCount: number;
  readonly editionCount: number;
  readonly sheetCount: number;
  readonly heldBackCount: number;
}
