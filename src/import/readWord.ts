/** Words that stand for something: yes and no, channels, price basis, currencies, levels of a choice. */
import type { Channel, PriceBasis } from "../domain/sale.ts";
import { nearest } from "./editDistance.ts";
import { type Reading, read, unread } from "./reading.ts";

function table<T>(entries: readonly (readonly [T, string])[]): ReadonlyMap<string, T> {
  return new Map(entries.flatMap(([value, words]) => words.split(",").map((word) => [word, value] as const)));
}

const YES_NO = table<boolean>([
  [true, "yes,y,true,1,ja,j,oui,o,si,s\u00ed,s\u00ec,x,wahr,vrai,with,fitted"],
  [false, "no,n,false,0,nein,non,falsch,faux,nee,without,not fitted"],
]);

/** Words that say yes or no without a doubt: digits and single letters could be anything. */
const PLAIN_YES_NO = new Set(["yes", "no", "true", "false", "ja", "nein", "oui", "non", "y", "n"]);

export function isPlainYesNo(cell: string): boolean {
  return PLAIN_YES_NO.has(cell.toLowerCase());
}

export function readYesNo(cell: string): Reading<boolean> {
  const value = YES_NO.get(cell.toLowerCase());
  return value === undefined ? unread("Neither yes nor no.") : read(value);
}

const CHANNEL_WORDS = table<Channel>([
  [
    "auction",
    "auction,auctions,auction sale,hammer,at auction,online auction,auktion,versteigerung,vente aux ench\u00e8res,veiling",
  ],
  ["dealer", "dealer,dealers,trade,dealership,broker,h\u00e4ndler,haendler,marchand,handelaar"],
  ["private", "private,privately,private sale,owner,privat,priv\u00e9,particulier"],
  ["asking", "asking,asking price,ask,advert,advertised,listing,listed,for sale,offer,offered,inserat,annonce"],
]);

export function readChannel(cell: string): Reading<Channel> {
  const word = cell.toLowerCase().replace(/\s+/g, " ");
  const value = CHANNEL_WORDS.get(word);
  if (value !== undefined) return read(value);
  const near = nearest(word, [...CHANNEL_WORDS.keys()]);
  return unread(
    "No channel: auction, dealer, private or asking.",
    near === null ? null : (CHANNEL_WORDS.get(near) ?? null),
  );
}

const PREMIUM = table<PriceBasis["premium"]>([
  ["in", "in,incl,incl.,included,including,with,yes,y,true,1,ja,oui"],
  ["out", "out,excl,excl.,excluded,excluding,without,hammer,plus,no,n,false,0,nein,non"],
  ["none", "none,no premium,not applicable"],
]);
const TAX = table<PriceBasis["tax"]>([
  ["in", "in,incl,incl.,included,including,with,gross,yes,y,true,1,ja,oui,brutto,ttc"],
  ["out", "out,excl,excl.,excluded,excluding,without,net,plus,no,n,false,0,nein,non,netto,ht,none"],
]);

export function readPremium(cell: string): Reading<PriceBasis["premium"]> {
  const value = PREMIUM.get(cell.toLowerCase());
  return value === undefined ? unread("Neither in, out nor none: is the premium inside the price?") : read(value);
}

export function readTax(cell: string): Reading<PriceBasis["tax"]> {
  const value = TAX.get(cell.toLowerCase());
  return value === undefined ? unread("Neither in nor out: is tax inside the price?") : read(value);
}

const SYMBOLS: Readonly<Record<string, readonly string[]>> = {
  "\u20ac": ["EUR"],
  "\u00a3": ["GBP"],
  $: ["USD", "CAD", "AUD", "NZD", "SGD", "HKD", "MXN"],
  "\u00a5": ["JPY", "CNY"],
  "fr.": ["CHF"],
  kr: ["SEK", "NOK", "DKK", "ISK"],
  "z\u0142": ["PLN"],
};
const CODES: ReadonlySet<string> = new Set(Intl.supportedValuesOf("currency"));

/** ISO 4217 code of a code or a symbol; a symbol of several currencies is the expected one if it may be. */
export function readCurrency(cell: string, expected: string): Reading<string> {
  const code = cell.toUpperCase();
  if (CODES.has(code)) return read(code);
  const candidates = SYMBOLS[cell.toLowerCase()];
  if (candidates?.includes(expected)) return read(expected);
  if (candidates?.length === 1) return read(candidates[0]!);
  return unread(candidates === undefined ? "No currency of that name." : "This sign stands for several currencies.");
}

/** A price cell apart into its amount and the currency written beside it, if any: "\u20ac 38,500", "38500 EUR". */
export function splitCurrency(cell: string): { amount: string; currency: string | null } {
  const before = /^([A-Za-z]{3}|[\p{Sc}]|[Ff]r\.)\s*([+\-\u2212]?[\d.,].*)$/u.exec(cell);
  if (before !== null) return { amount: before[2]!, currency: before[1]! };
  const after = /^(.*\d(?:[.,][-\u2013\u2014\u2212]+)?)\s*([A-Za-z]{3}|\p{Sc}|kr|z\u0142)$/u.exec(cell);
  return after === null ? { amount: cell, currency: null } : { amount: after[1]!, currency: after[2]! };
}
