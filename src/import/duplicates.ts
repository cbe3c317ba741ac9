/** When two rows, or a row and a sale, are the same sale. */
import type { AttributeValue } from "../domain/attribute.ts";
import type { NewSale } from "../domain/sale.ts";

/** The sale that has a key already. */
export interface KnownSale {
  readonly saleId: number;
  readonly reference: string | null;
  readonly source: string;
}

/** Asked by key; a Map will do, and so will a look-up in the store. */
export interface DuplicateIndex {
  get(key: string): KnownSale | undefined;
}

export interface DuplicateKeys {
  /** Reference and day; null without a reference. */
  readonly byReference: string | null;
  /** Day, price, title and all values that are known. */
  readonly byValues: string;
}

function plain(text: string): string {
  return text.trim().toLowerCase().replace(/\s+/g, " ");
}

function valueWords([key, value]: [string, AttributeValue]): string {
  return `${key}=${typeof value === "string" ? plain(value) : String(value)}`;
}

/** Title of a row that names no item; it says nothing about the item, so it is no part of a key. */
export function rowTitle(row: number): string {
  return `row ${row}`;
}

export function duplicateKeys(sale: NewSale): DuplicateKeys {
  const known = Object.entries(sale.values).filter(([, value]) => value !== null);
  known.sort(([a], [b]) => (a < b ? -1 : 1));
  const title = /^row \d+$/.test(sale.title) ? "" : plain(sale.title);
  const values = known.map(valueWords).join("|");
  return {
    byReference: sale.reference === null ? null : `r|${plain(sale.reference)}|${sale.soldOn}`,
    byValues: `v|${sale.soldOn}|${sale.priceMinor}${sale.currencyCode}|${title}|${values}`,
  };
}

/** Two references of one source name two sales, however alike they are; across sources the values decide. */
export function mayBeTheSame(
  a: { readonly reference: string | null; readonly source: string },
  b: { readonly reference: string | null; readonly source: string },
): boolean {
  return (
    a.reference === null || b.reference === null || a.source !== b.source || plain(a.reference) === plain(b.reference)
  );
}

/** Of two sales with one key the first keeps it. */
export function indexOfSales(sales: Iterable<NewSale & { readonly id: number }>): DuplicateIndex {
  const index = new Map<string, KnownSale>();
  for (const sale of sales) {
    const { byReference, byValues } = duplicateKeys(sale);
    const known = { saleId: sale.id, reference: sale.reference, source: sale.source };
    if (byReference !== null && !index.has(byReference)) index.set(byReference, known);
    if (!index.has(byValues)) index.set(byValues, known);
  }
  return index;
}
