/** A real store in a temporary folder with one invented class; used by the store and app tests. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach } from "vitest";
import type { NewAssetClass } from "../../src/domain/assetClass.ts";
import { type Attribute, plainAttribute } from "../../src/domain/attribute.ts";
import type { NewSale } from "../../src/domain/sale.ts";
import { type OpenOptions, openStore, type Store } from "../../src/store/openStore.ts";

const folders: string[] = [];
const stores: Store[] = [];

afterEach(() => {
  for (const store of stores.splice(0)) store.close();
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true });
});

export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), "lotwright-test-"));
  folders.push(folder);
  return folder;
}

export function freshStore(path = join(temporaryFolder(), "sales.sqlite"), options: OpenOptions = {}): Store {
  const store = openStore(path, options);
  stores.push(store);
  return store;
}

export function attribute(key: string, change: Partial<Attribute> = {}): Attribute {
  return plainAttribute({
    key,
    label: key,
    kind: "number",
    unit: null,
    ...change,
  });
}

export const HOISTS: NewAssetClass = {
  name: "Hoists (invented)",
  itemWord: "hoist",
  currencyCode: "EUR",
  priceBasis: { premium: "in", tax: "out" },
  invented: true,
  attributes: [
    attribute("hours", { label: "Hours", unit: "h", step: 1000 }),
    attribute("make", { label: "Make", kind: "choice", levels: ["Brannock", "Corvane"] }),
    attribute("cabin", { label: "Cabin", kind: "yesNo" }),
    attribute("built", { label: "Built", kind: "built", unit: "years" }),
  ],
};

export function sale(change: Partial<NewSale> = {}): NewSale {
  return {
    reference: null,
    title: "Brannock H2",
    soldOn: "2025-03-01",
    priceMinor: 1_234_500,
    currencyCode: "EUR",
    priceBasis: { premium: "in", tax: "out" },
    channel: "auction",
    source: "spring list",
    notes: "",
    values: {},
    ...change,
  };
}

/** Makes the class and brings the sales in; returns the class's number. */
export function fill(store: Store, sales: readonly NewSale[]): number {
  return store.transaction(() => {
    const { id } = store.assetClasses.insert(HOISTS);
    store.sales.insertSales(
      id,
      null,
      sales.map((each) => ({ row: null, sale: each, cells: null })),
    );
    return id;
  });
}
