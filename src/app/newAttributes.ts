/**
 * Attributes that a column match names for the first time: made from the heading before the rows are converted, and settled
 * (levels, decimals, size of a step) from the values that came.
 */
import type { AssetClass } from "../domain/assetClass.ts";
import { type Attribute, type AttributeValue, keyOf, plainAttribute } from "../domain/attribute.ts";
import type { ColumnMatch, ColumnTarget } from "../domain/importRecord.ts";
import type { NewSale } from "../domain/sale.ts";

export interface MatchedAttributes {
  /** The match with every new attribute replaced by its key. */
  readonly match: ColumnMatch;
  readonly fresh: readonly Attribute[];
}

function freeKey(label: string, taken: ReadonlySet<string>): string {
  const base = keyOf(label);
  let key = base;
  for (let k = 2; taken.has(key); k++) key = `${base}_${k}`;
  return key;
}

function unsettled(key: string, target: Extract<ColumnTarget, { to: "newAttribute" }>): Attribute {
  return plainAttribute({
    key,
    label: target.label.trim(),
    kind: target.kind,
    unit: target.kind === "built" ? "years" : target.kind === "number" ? target.unit : null,
  });
}

/** The class's own attributes keep their keys; a label that the class has already is that attribute. */
export function attributesOfMatch(match: ColumnMatch, assetClass: AssetClass): MatchedAttributes {
  const taken = new Set(assetClass.attributes.map(({ key }) => key));
  const byLabel = new Map(assetClass.attributes.map(({ key, label }) => [label.trim().toLowerCase(), key]));
  const fresh: Attribute[] = [];
  const columns = match.columns.map(({ heading, target }) => {
    if (target.to !== "newAttribute") return { heading, target };
    const label = target.label.trim().toLowerCase();
    let key = byLabel.get(label);
    if (key === undefined) {
      key = freeKey(target.label, taken);
      taken.add(key);
      byLabel.set(label, key);
      fresh.push(unsettled(key, target));
    }
    return { heading, target: { to: "attribute", key } as const };
  });
  return { match: { ...match, columns }, fresh };
}

/** Decimals that the values are written with, at most 6. */
function decimalsOf(values: readonly number[]): number {
  let decimals = 0;
  for (const value of values) {
    while (decimals < 6 && Math.abs(Number(value.toFixed(decimals)) - value) > 1e-9 * Math.abs(value)) decimals++;
  }
  return decimals;
}

/** A power of ten near a sixth of the span of the middle nine tenths: 1,000 for hours, 10 for kW, 1 for metres of lift. */
function stepOf(values: readonly number[]): number {
  const sorted = Float64Array.from(values).sort();
  const at = (fraction: number) => sorted[Math.round(fraction * (sorted.length - 1))]!;
  const span = sorted.length === 0 ? 0 : at(0.95) - at(0.05);
  return span > 0 ? Number(`1e${Math.round(Math.log10(span / 6))}`) : 1;
}

function isNumber(value: AttributeValue | undefined): value is number {
  return typeof value === "number";
}

/** A new attribute as it is kept, after its first values are known. Levels stand in alphabetical order. */
export function settle(attribute: Attribute, sales: readonly NewSale[]): Attribute {
  if (attribute.kind === "choice") return { ...attribute, levels: unlistedLevels(attribute, sales) };
  if (attribute.kind !== "number") return attribute;
  const values = sales.map((sale) => sale.values[attribute.key]).filter(isNumber);
  const decimals = decimalsOf(values);
  // A step finer than the values are written would read as "0 more".
  return { ...attribute, decimals, step: Math.max(stepOf(values), Number(`1e-${decimals}`)) };
}

/** Levels that the sales have and the attribute's list has not, alphabetically. */
export function unlistedLevels(attribute: Attribute, sales: readonly NewSale[]): string[] {
  const listed = new Set(attribute.levels);
  const found = new Set<string>();
  for (const sale of sales) {
    const value = sale.values[attribute.key];
    if (typeof value === "string" && !listed.has(value)) found.add(value);
  }
  return [...found].sort((a, b) => a.localeCompare(b, "en"));
}
