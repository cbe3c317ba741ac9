/**
 * The sales used as a CSV table for people and other programs: one row a sale, in the order of the evidence; UTF-8, comma,
 * full digits, ISO days. A built day is followed by the age at sale in years, since that is what the model reads.
 * RFC 4180 quoting. A text that a spreadsheet would take for a formula gets an apostrophe before it.
 */
import type { AttributeValue } from "../domain/attribute.ts";
import type { EvidenceTable } from "../domain/evidenceTable.ts";
import { majorOf } from "../domain/format.ts";
import { numericValue } from "./parts/values.ts";

function cell(value: AttributeValue): string {
  if (value === null) return "";
  if (typeof value === "boolean") return value ? "yes" : "no";
  if (typeof value === "number") return String(value);
  const text = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) ? `"${text.replace(/"/g, '""')}"` : text;
}

export function evidenceCsv(table: EvidenceTable): string {
  const byKey = new Map(table.attributes.map((one) => [one.key, one]));
  const built = new Set(table.keys.filter((key) => byKey.get(key)?.kind === "built"));
  const heads = table.keys.flatMap((key) => (built.has(key) ? [key, `${key}_age_years`] : [key]));
  const lines = [
    ["id", "reference", "title", "sold_on", "price", "currency", "channel", "source", "verified", ...heads],
  ];
  for (const row of table.rows) {
    const values = table.keys.flatMap((key, at): AttributeValue[] => {
      const value = row.values[at] ?? null;
      return built.has(key) ? [value, numericValue(byKey.get(key)!, value, row.soldOn)] : [value];
    });
    const fixed: AttributeValue[] = [
      row.id,
      row.reference,
      row.title,
      row.soldOn,
      majorOf(row.priceMinor, row.currencyCode),
      row.currencyCode,
      row.channel,
      row.source,
      row.verified,
    ];
    lines.push([...fixed, ...values].map(cell));
  }
  return `${lines.map((line) => line.join(",")).join("\r\n")}\r\n`;
}
