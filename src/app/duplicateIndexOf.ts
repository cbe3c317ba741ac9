/**
 * Finds rows that are sales already by asking the register day by day: both keys of a sale name its day, so a file of one
 * week reads one week of a register of any size.
 */
import type { AssetClass } from "../domain/assetClass.ts";
import type { Day } from "../domain/day.ts";
import { type DuplicateIndex, indexOfSales } from "../import/duplicates.ts";
import type { Ports } from "./ports.ts";

/** Keys are "r|reference|day" and "v|day|…" (import/duplicates.ts). */
function dayOfKey(key: string): Day {
  return key.startsWith("v|") ? key.slice(2, 12) : key.slice(-10);
}

/** Empty for a class that is yet to be made. */
export function duplicateIndexOf(ports: Ports, assetClass: AssetClass): DuplicateIndex {
  if (assetClass.id === 0) return indexOfSales([]);
  const byDay = new Map<Day, DuplicateIndex>();
  return {
    get(key) {
      const day = dayOfKey(key);
      let index = byDay.get(day);
      if (index === undefined) {
        index = indexOfSales(ports.store.sales.soldOnDay(assetClass.id, day));
        byDay.set(day, index);
      }
      return index.get(key);
    },
  };
}
