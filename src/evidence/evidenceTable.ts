/**
 * Evidence to the plain table that travels in a sheet, and back. A fit of fromEvidenceTable(toEvidenceTable(x)) has the
 * same bits as a fit of x: values are exact doubles in JSON, and choices are named by level.
 */
import type { NewAssetClass } from "../domain/assetClass.ts";
import { type Attribute, type AttributeValue, CHANNEL_KEY } from "../domain/attribute.ts";
import { dayNumber, dayOf } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { EvidenceRow, EvidenceTable } from "../domain/evidenceTable.ts";
import { majorOf, minorOf } from "../domain/format.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import { CHANNELS, type Channel, priceBasisWords, type SaleColumns } from "../domain/sale.ts";

/** Rows by sold-on day, then id; values of the reference set only. */
export function toEvidenceTable(
  sales: SaleColumns,
  used: Int32Array,
  assetClass: NewAssetClass,
  model: PriceModel,
): EvidenceTable {
  const attributes = model.attributes
    .filter(({ key }) => key !== CHANNEL_KEY)
    .map(({ key }) => assetClass.attributes.find((attribute) => attribute.key === key)!);
  const order = Array.from(used).sort((a, b) => sales.soldOn[a]! - sales.soldOn[b]! || sales.ids[a]! - sales.ids[b]!);
  const rows = order.map(
    (at): EvidenceRow => ({
      id: sales.ids[at]!,
      reference: sales.references.at(at) ?? null,
      title: sales.titles.at(at)!,
      soldOn: dayOf(sales.soldOn[at]!),
      priceMinor: minorOf(sales.price[at]!, sales.currencyCodes.at(at)!),
      currencyCode: sales.currencyCodes.at(at)!,
      channel: sales.channels.at(at)!,
      source: sales.sources.at(at)!,
      verified: sales.verified[at] === 1,
      values: attributes.map((attribute) => namedValue(attribute, sales.values[attribute.key]![at]!)),
    }),
  );
  return { keys: attributes.map((attribute) => attribute.key), attributes, rows };
}

function namedValue(attribute: Attribute, stored: number): AttributeValue {
  if (!Number.isFinite(stored)) return null;
  if (attribute.kind === "choice") return attribute.levels[stored] ?? null;
  if (attribute.kind === "yesNo") return stored === 1;
  return attribute.kind === "built" ? dayOf(stored) : stored;
}

export function fromEvidenceTable(table: EvidenceTable, assetClass: NewAssetClass): SaleColumns {
  const { rows } = table;
  const values: Record<string, Float64Array> = {};
  table.attributes.forEach((attribute, column) => {
    values[attribute.key] = Float64Array.from(rows, (row) => storedOf(attribute, row.values[column] ?? null));
  });
  return {
    count: rows.length,
    ids: Float64Array.from(rows, (row) => row.id),
    references: rows.map((row) => row.reference),
    titles: rows.map((row) => row.title),
    soldOn: Float64Array.from(rows, (row) => dayNumber(row.soldOn) ?? Number.NaN),
    price: Float64Array.from(rows, (row) => majorOf(row.priceMinor, row.currencyCode)),
    currencyCodes: rows.map((row) => row.currencyCode),
    channels: rows.map((row) => channelOf(row.channel)),
    sources: rows.map((row) => row.source),
    verified: Uint8Array.from(rows, (row) => (row.verified ? 1 : 0)),
    priceBases: rows.map(() => priceBasisWords(assetClass.priceBasis)),
    setAsideReasons: rows.map(() => null),
    values,
  };
}

function channelOf(text: string): Channel {
  const found = CHANNELS.find((channel) => channel === text);
  if (found !== undefined) return found;
  throw new AppError({
    family: "sheet",
    code: "bad-channel",
    what: `The evidence names a channel that does not exist: ${text}.`,
  });
}

function storedOf(attribute: Attribute, value: AttributeValue): number {
  if (value === null) return Number.NaN;
  if (attribute.kind === "choice") {
    const at = attribute.levels.indexOf(String(value));
    return at < 0 ? Number.NaN : at;
  }
  if (attribute.kind === "yesNo") return value === true ? 1 : 0;
  if (attribute.kind === "built") return dayNumber(String(value)) ?? Number.NaN;
  return typeof value === "number" ? value : Number.NaN;
}
