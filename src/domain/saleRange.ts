/** Ranges for one sale as plain data: made by valuation/ranges, one member per kind, shown as they are. */
import type { Range } from "./appraisal.ts";
import type { RangeKind } from "./priceModel.ts";

export interface SaleRanges {
  readonly kind: RangeKind;
  /** In major units, after ln taken back by exp. Levels that these sales cannot give are left out; empty: see `sentence`. */
  readonly ranges: readonly Range[];
  /** How the range is found, or why there is none. */
  readonly sentence: string;
  /** How often a range holds the next sale, and what that supposes; null where nothing can be promised. */
  readonly guarantee: string | null;
}
