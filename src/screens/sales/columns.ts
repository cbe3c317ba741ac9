/** The register's columns: what every sale has, and as many of the class's attributes as the width allows. */

import type { AssetClass } from "../../domain/assetClass.ts";
import type { Attribute, AttributeValue } from "../../domain/attribute.ts";
import { dayNumber, yearsBetween } from "../../domain/day.ts";
import { formatDay, formatNumber, lowerStart, majorOf, minorUnitDigits } from "../../domain/format.ts";
import { CHANNEL_LABELS, type Sale } from "../../domain/sale.ts";

export interface RegisterColumn {
  /** Sort key of the request. */
  readonly id: string;
  readonly heading: string;
  readonly width: number;
  readonly isNumber: boolean;
  readonly attribute: Attribute | null;
}

/** Title takes what is left, and never less than this. */
export const TITLE_LEAST = 116;

const PICK_WIDTH = 24;

/** Below this width in pixels the channel goes to the sale's own account and the way of verifying is cut short. */
const NARROW = 700;

/** Years at sale of a built day, or null. */
export function ageAtSale(built: AttributeValue | undefined, soldOn: string): number | null {
  const from = typeof built === "string" ? dayNumber(built) : null;
  const to = dayNumber(soldOn);
  return from === null || to === null ? null : yearsBetween(from, to);
}

/** A value as the register shows it; "" for not known. */
export function valueText(attribute: Attribute, value: AttributeValue | undefined, soldOn: string): string {
  if (value === null || value === undefined) return "";
  if (attribute.kind === "built") {
    const age = ageAtSale(value, soldOn);
    return age === null ? "" : formatNumber(age, 1);
  }
  if (typeof value === "number") return formatNumber(value, attribute.decimals);
  if (typeof value === "boolean") return value ? "yes" : "no";
  return value;
}

/** Price in whole units; cents only where the sale has them. */
export function priceText({ priceMinor, currencyCode }: Sale): string {
  const price = majorOf(priceMinor, currencyCode);
  return formatNumber(price, Number.isInteger(price) ? 0 : minorUnitDigits(currencyCode));
}

export function soldText(sale: Sale): string {
  return formatDay(sale.soldOn);
}

export function channelText(sale: Sale): string {
  return CHANNEL_LABELS[sale.channel];
}

function unitOf(attribute: Attribute): string {
  if (attribute.kind === "built") return ",\u00a0y";
  const isSaid = attribute.unit === null || attribute.label.includes(`(${attribute.unit})`) || attribute.unit === "h";
  return isSaid ? "" : `,\u00a0${attribute.unit}`;
}

/** "hours", "lift height, m", "age, y" */
function headingOf(attribute: Attribute): string {
  return `${lowerStart(attribute.label)}${unitOf(attribute)}`;
}

function attributeColumn(attribute: Attribute): RegisterColumn {
  const isNumber = attribute.kind === "number" || attribute.kind === "built";
  const heading = headingOf(attribute);
  const longestWord = Math.max(...heading.split(" ").map((word) => word.length));
  const longestLevel = Math.max(2, ...attribute.levels.map((level) => level.length));
  const content = isNumber ? 34 : Math.min(96, longestLevel * 6.2);
  return {
    id: attribute.key,
    heading,
    width: Math.ceil(Math.max(content, longestWord * 6) + 12),
    isNumber,
    attribute,
  };
}

const text = (id: string, heading: string, width: number): RegisterColumn => ({
  id,
  heading,
  width,
  isNumber: false,
  attribute: null,
});

/** Attributes that may stand in the register: numbers first, then choices, then yes/no. */
export function attributeColumns(attributes: readonly Attribute[]): readonly RegisterColumn[] {
  const rank = { built: 0, number: 1, choice: 2, yesNo: 3 } as const;
  return attributes
    .filter(({ archived }) => !archived)
    .map((attribute, at) => ({ attribute, at }))
    .sort((a, b) => rank[a.attribute.kind] - rank[b.attribute.kind] || a.at - b.at)
    .map(({ attribute }) => attributeColumn(attribute));
}

/**
 * Columns for a width in pixels. `hidden`: attribute keys that are not to be shown. Attributes that find no room are left to the sale's
 * own account beside the register.
 */
export function columnsFor(
  assetClass: Pick<AssetClass, "attributes" | "currencyCode" | "itemWord">,
  width: number,
  hidden: ReadonlySet<string> = new Set(),
): readonly RegisterColumn[] {
  const before = [
    text("reference", "sale", 62),
    text("soldOn", "sold on", 86),
    text("title", assetClass.itemWord, TITLE_LEAST),
  ];
  const isNarrow = width < NARROW;
  const after: RegisterColumn[] = [
    ...(isNarrow ? [] : [text("channel", "through", 56)]),
    { ...text("price", assetClass.currencyCode, 62), isNumber: true },
    text("verified", "verified", isNarrow ? 84 : 118),
    text("state", "state", 122),
  ];
  let left = width - widthOf([...before, ...after]);
  const own = attributeColumns(assetClass.attributes).filter(({ id, width: needed }) => {
    if (hidden.has(id) || needed > left) return false;
    left -= needed;
    return true;
  });
  return [...before, ...own, ...after];
}

/** What the columns need at least, the pick boxes included. */
export function widthOf(columns: readonly RegisterColumn[]): number {
  return columns.reduce((sum, { width }) => sum + width, PICK_WIDTH);
}
