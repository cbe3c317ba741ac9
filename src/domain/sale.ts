/** One observed sale, and the words around it. */
import type { AttributeValue } from "./attribute.ts";
import type { Day } from "./day.ts";

/** How the item changed hands; asking prices are not sales yet. */
export const CHANNELS = ["auction", "dealer", "private", "asking"] as const;
export type Channel = (typeof CHANNELS)[number];

export const CHANNEL_LABELS: Readonly<Record<Channel, string>> = {
  auction: "auction",
  dealer: "dealer",
  private: "private",
  asking: "asking",
};

/** What the number in "price" is. */
export interface PriceBasis {
  /** Buyer's premium inside the price? "none" where the channel has none. */
  readonly premium: "in" | "out" | "none";
  readonly tax: "in" | "out";
}

export interface Verification {
  readonly by: string;
  readonly on: Day;
  /** How it was verified: "hammer list", "invoice", "photos" … */
  readonly how: string;
}

export interface SetAside {
  readonly reason: string;
  readonly by: string;
  readonly on: Day;
}

/** A sale before the store has given it a number. */
export interface NewSale {
  readonly reference: string | null;
  /** Maker and model as typed: what a person recognises the item by. */
  readonly title: string;
  readonly soldOn: Day;
  /** Price in minor units of the currency (cents). Whole, positive. */
  readonly priceMinor: number;
  /** ISO 4217. */
  readonly currencyCode: string;
  readonly priceBasis: PriceBasis;
  readonly channel: Channel;
  /** Where the record comes from: an auction list, a file, a person. */
  readonly source: string;
  readonly notes: string;
  /** By attribute key; a missing key or null = not known. */
  readonly values: Readonly<Record<string, AttributeValue>>;
}

export interface Sale extends NewSale {
  readonly id: number;
  readonly batchId: number | null;
  /** Row in the file it came from (heading = row 1), null when typed. */
  readonly fileRow: number | null;
  readonly verification: Verification | null;
  readonly setAside: SetAside | null;
}

/** One text per sale. An array is one; so is what a store looks up only when it is asked. */
export interface TextColumn<Text extends string | null = string> {
  readonly length: number;
  at(index: number): Text | undefined;
}

/** All texts of a column. */
export function textsOf<Text extends string | null>(column: TextColumn<Text>): Text[] {
  return Array.from({ length: column.length }, (_, i) => column.at(i)!);
}

/**
 * Sales as columns, the way the computing rooms want them: never a million row objects.
 * Every array has `count` entries. NaN = not known. Choices hold the index of the level, yes/no 0 or 1, built the day number.
 */
export interface SaleColumns {
  readonly count: number;
  readonly ids: Float64Array;
  readonly references: TextColumn<string | null>;
  readonly titles: TextColumn;
  readonly soldOn: Float64Array;
  /** Major units (euro), exact division of minor units. */
  readonly price: Float64Array;
  readonly currencyCodes: TextColumn;
  readonly channels: TextColumn<Channel>;
  readonly sources: TextColumn;
  readonly verified: Uint8Array;
  readonly priceBases: TextColumn;
  readonly setAsideReasons: TextColumn<string | null>;
  readonly values: Readonly<Record<string, Float64Array>>;
}

/** "premium in, tax out" */
export function priceBasisWords(basis: PriceBasis): string {
  const premium = basis.premium === "none" ? "no premium" : `premium ${basis.premium}`;
  return `${premium}, tax ${basis.tax}`;
}
