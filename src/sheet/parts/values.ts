/** Attribute values of a sale or of the subject as numbers and as printed words; a built day is read as age at sale. */
import type { Attribute, AttributeValue } from "../../domain/attribute.ts";
import { type Day, dayNumber, yearsBetween } from "../../domain/day.ts";
import type { EvidenceRow, EvidenceTable } from "../../domain/evidenceTable.ts";
import { formatNumber } from "../../domain/format.ts";

/** The value as a number: a built day becomes years of age on `on`. Null where it is none. */
export function numericValue(attribute: Attribute, value: AttributeValue | undefined, on: Day): number | null {
  if (attribute.kind === "number") return typeof value === "number" ? value : null;
  if (attribute.kind !== "built" || typeof value !== "string") return null;
  const [built, sold] = [dayNumber(value), dayNumber(on)];
  return built === null || sold === null ? null : yearsBetween(built, sold);
}

export function isNumeric(attribute: Attribute): boolean {
  return attribute.kind === "number" || attribute.kind === "built";
}

export function decimalsOf(attribute: Attribute): number {
  return attribute.kind === "built" ? Math.max(1, attribute.decimals) : attribute.decimals;
}

export function numberText(attribute: Attribute, value: number | null): string {
  return value === null ? "not known" : formatNumber(value, decimalsOf(attribute));
}

/** "Age at sale, years"; the unit is left out where the label already says it. */
export function headOf(attribute: Attribute): string {
  const { label, unit } = attribute;
  const said = label.split(/[^\p{L}\p{N}%]+/u);
  return unit === null || said.includes(unit) ? label : `${label}, ${unit}`;
}

export function valueOfRow(table: EvidenceTable, row: EvidenceRow, key: string): AttributeValue {
  const at = table.keys.indexOf(key);
  return at < 0 ? null : (row.values[at] ?? null);
}
