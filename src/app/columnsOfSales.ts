/** Sales as columns without a store: for a file that is only tried. */
import type { Attribute, AttributeValue } from "../domain/attribute.ts";
import { dayNumber } from "../domain/day.ts";
import { majorOf } from "../domain/format.ts";
import { type NewSale, priceBasisWords, type SaleColumns } from "../domain/sale.ts";

/** A sale with the number it is called by. */
export interface NumberedSale {
  readonly id: number;
  readonly sale: NewSale;
}

/** NaN = not known; choices by the index of their level, yes/no as 0 or 1, built as a day number. */
function numberOf(
  value: AttributeValue | undefined,
  levelIndex: ReadonlyMap<string, number>,
  attribute: Attribute,
): number {
  if (value === null || value === undefined) return Number.NaN;
  if (typeof value === "number") return value;
  if (typeof value === "boolean") return value ? 1 : 0;
  if (attribute.kind === "built") return dayNumber(value) ?? Number.NaN;
  return levelIndex.get(value) ?? Number.NaN;
}

function columnOf(sales: readonly NumberedSale[], attribute: Attribute): Float64Array {
  const levelIndex = new Map(attribute.levels.map((level, index) => [level, index]));
  return Float64Array.from(sales, ({ sale }) => numberOf(sale.values[attribute.key], levelIndex, attribute));
}

/** All arrays are in the order of `sales`; nothing is verified and nothing set aside. */
export function columnsOfSales(sales: readonly NumberedSale[], attributes: readonly Attribute[]): SaleColumns {
  return {
    count: sales.length,
    ids: Float64Array.from(sales, ({ id }) => id),
    references: sales.map(({ sale }) => sale.reference),
    titles: sales.map(({ sale }) => sale.title),
    soldOn: Float64Array.from(sales, ({ sale }) => dayNumber(sale.soldOn) ?? Number.NaN),
    price: Float64Array.from(sales, ({ sale }) => majorOf(sale.priceMinor, sale.currencyCode)),
    currencyCodes: sales.map(({ sale }) => sale.currencyCode),
    channels: sales.map(({ sale }) => sale.channel),
    sources: sales.map(({ sale }) => sale.source),
    verified: new Uint8Array(sales.length),
    priceBases: sales.map(({ sale }) => priceBasisWords(sale.priceBasis)),
    setAsideReasons: sales.map(() => null),
    values: Object.fromEntries(attributes.map((attribute) => [attribute.key, columnOf(sales, attribute)])),
  };
}
