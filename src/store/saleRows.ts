/** A sale between its rows (sales and the class's wide table) and the domain's object, in both directions. */
import { dayNumber, dayOf } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import { CHANNELS, type Channel, type NewSale, type PriceBasis, type Sale } from "../domain/sale.ts";
import { decodeValue, encodeValue, type StoredAttribute } from "./attributeTables.ts";

const PREMIUMS = ["in", "out", "none"] as const;
const TAXES = ["in", "out"] as const;

/** 2 × premium + tax, as the column price_basis holds it. */
export function priceBasisCode(basis: PriceBasis): number {
  return 2 * PREMIUMS.indexOf(basis.premium) + TAXES.indexOf(basis.tax);
}

export function priceBasisOf(code: number): PriceBasis {
  return { premium: PREMIUMS[code >> 1]!, tax: TAXES[code & 1]! };
}

export function channelCode(channel: Channel): number {
  return CHANNELS.indexOf(channel);
}

/** Built-in columns of a sale as the register reads them; sources joined as source_name. */
export interface SaleRow {
  id: number;
  batch_id: number | null;
  file_row: number | null;
  reference: string | null;
  title: string;
  sold_on: number;
  price_minor: number;
  currency_code: string;
  price_basis: number;
  channel: number;
  source_name: string;
  notes: string;
  verified_on: number | null;
  verified_by: string | null;
  verified_how: string | null;
  set_aside_on: number | null;
  set_aside_by: string | null;
  set_aside_reason: string | null;
}

export const SALE_SELECT = `s.id, s.batch_id, s.file_row, s.reference, s.title, s.sold_on, s.price_minor, s.currency_code,
  s.price_basis, s.channel, o.name AS source_name, s.notes, s.verified_on, s.verified_by, s.verified_how,
  s.set_aside_on, s.set_aside_by, s.set_aside_reason`;

/** `row` holds the wide table's columns under their generated names beside the built-in ones. */
export function rowToSale(row: SaleRow, attributes: readonly StoredAttribute[]): Sale {
  const cells = row as unknown as Record<string, number | null>;
  return {
    id: row.id,
    batchId: row.batch_id,
    fileRow: row.file_row,
    reference: row.reference,
    title: row.title,
    soldOn: dayOf(row.sold_on),
    priceMinor: row.price_minor,
    currencyCode: row.currency_code,
    priceBasis: priceBasisOf(row.price_basis),
    channel: CHANNELS[row.channel]!,
    source: row.source_name,
    notes: row.notes,
    values: Object.fromEntries(
      attributes.map(({ attribute, column }) => [attribute.key, decodeValue(attribute, cells[column] ?? null)]),
    ),
    verification:
      row.verified_on === null ? null : { by: row.verified_by!, on: dayOf(row.verified_on), how: row.verified_how! },
    setAside:
      row.set_aside_on === null
        ? null
        : { by: row.set_aside_by!, on: dayOf(row.set_aside_on), reason: row.set_aside_reason! },
  };
}

/** The wide table's row, in the order of `attributes`. Refuses (AppError) a value under a key that the class has not. */
export function valuesRow(
  sale: NewSale,
  attributes: readonly StoredAttribute[],
  levelCodes: ReadonlyMap<string, ReadonlyMap<string, number>>,
): (number | null)[] {
  for (const key in sale.values) {
    if (levelCodes.has(key) || sale.values[key] === null) continue;
    throw new AppError({
      family: "store",
      code: "no-such-attribute",
      what: `The class has no attribute "${key}", so its value can't be kept.`,
      where: key,
      whatToDo: "Add the attribute first.",
    });
  }
  return attributes.map(({ attribute }) =>
    encodeValue(attribute, levelCodes.get(attribute.key)!, sale.values[attribute.key] ?? null),
  );
}

/** Day number of a day that must be one. Refuses (AppError). */
export function requireDay(day: string, where: string): number {
  const number = dayNumber(day);
  if (number !== null) return number;
  throw new AppError({
    family: "store",
    code: "no-such-day",
    what: `"${day}" is no day of the calendar.`,
    where,
    whatToDo: "Give the day as YYYY-MM-DD.",
  });
}
