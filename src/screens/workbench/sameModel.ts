/** Whether two price models say the same, whatever the order of their keys. */
import type { PriceModel } from "../../domain/priceModel.ts";

function canonical(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(canonical);
  if (value === null || typeof value !== "object") return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return entries.map(([key, inner]) => [key, canonical(inner)]);
}

export function sameModel(a: PriceModel, b: PriceModel): boolean {
  const plain = (model: PriceModel): string =>
    JSON.stringify(canonical({ ...model, leftOut: [...model.leftOut].sort() }));
  return plain(a) === plain(b);
}
