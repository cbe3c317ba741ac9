/**
 * The evidence as it travels: into the sheet, into a fingerprint and back. Plain values in a fixed column order, so that the
 * same evidence always gives the same text and the same text always gives the same fit.
 */
import type { Attribute, AttributeValue } from "./attribute.ts";
import type { Day } from "./day.ts";

export interface EvidenceRow {
  readonly id: number;
  readonly reference: string | null;
  readonly title: string;
  readonly soldOn: Day;
  readonly priceMinor: number;
  readonly currencyCode: string;
  readonly channel: string;
  readonly source: string;
  readonly verified: boolean;
  /** In the order of EvidenceTable.keys. */
  readonly values: readonly AttributeValue[];
}

export interface EvidenceTable {
  readonly keys: readonly string[];
  readonly attributes: readonly Attribute[];
  readonly rows: readonly EvidenceRow[];
}

/** Canonical text whose SHA-256 is the evidence fingerprint: JSON of keys and rows, nothing else, no spaces. */
export function canonicalEvidence(table: EvidenceTable): string {
  const rows = table.rows.map((row) => [
    row.id,
    row.reference,
    row.title,
    row.soldOn,
    row.priceMinor,
    row.currencyCode,
    row.channel,
    row.source,
    row.verified,
    ...row.values,
  ]);
  return JSON.stringify([table.keys, rows]);
}
