/**
 * The wide table of one asset class: sale_values_<class id>, one row per sale, one generated column per attribute.
 * Numbers are REAL, choices the code of their level, yes/no 0 or 1, built a day number; NULL = not known. Every column has
 * an index, so that the register can be sorted and filtered by it.
 * Names are generated (never typed by a person), so they may stand in SQL text.
 */
import type { Database } from "better-sqlite3";
import type { Attribute, AttributeKind, AttributeValue } from "../domain/attribute.ts";
import { dayNumber, dayOf } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";

/** An attribute with the column that holds it. */
export interface StoredAttribute {
  readonly id: number;
  readonly column: string;
  readonly attribute: Attribute;
}

export function valuesTable(classId: number): string {
  return `sale_values_${classId}`;
}

export function valuesIndex(classId: number, column: string): string {
  return `sale_values_${classId}_by_${column}`;
}

export function createValuesTable(db: Database, classId: number): void {
  db.exec(`CREATE TABLE ${valuesTable(classId)} (sale_id INTEGER PRIMARY KEY REFERENCES sales (id)) STRICT`);
}

const COLUMN_TYPE: Readonly<Record<AttributeKind, string>> = {
  number: "REAL",
  choice: "INTEGER",
  yesNo: "INTEGER",
  built: "INTEGER",
};

export function addValuesColumn(db: Database, classId: number, column: string, kind: AttributeKind): void {
  db.exec(`ALTER TABLE ${valuesTable(classId)} ADD COLUMN ${column} ${COLUMN_TYPE[kind]}`);
  db.exec(`CREATE INDEX ${valuesIndex(classId, column)} ON ${valuesTable(classId)} (${column})`);
}

function unfit(attribute: Attribute, value: AttributeValue, whatToDo: string): AppError {
  return new AppError({
    family: "store",
    code: "unfit-value",
    what: `"${String(value)}" can't be stored as ${attribute.label}.`,
    where: attribute.label,
    whatToDo,
  });
}

/** What the wide table holds for a value. Refuses (AppError) a value of another kind or a level that is not in the list. */
export function encodeValue(
  attribute: Attribute,
  levelCodes: ReadonlyMap<string, number>,
  value: AttributeValue,
): number | null {
  if (value === null) return null;
  if (attribute.kind === "number") {
    if (typeof value === "number" && Number.isFinite(value)) return value;
    throw unfit(attribute, value, "Give a number, or leave it not known.");
  }
  if (attribute.kind === "yesNo") {
    if (typeof value === "boolean") return value ? 1 : 0;
    throw unfit(attribute, value, "Give yes or no, or leave it not known.");
  }
  if (attribute.kind === "built") {
    const day = typeof value === "string" ? dayNumber(value) : null;
    if (day !== null) return day;
    throw unfit(attribute, value, "Give a day as YYYY-MM-DD, or leave it not known.");
  }
  const code = typeof value === "string" ? levelCodes.get(value) : undefined;
  if (code !== undefined) return code;
  throw unfit(attribute, value, "Choose one of the list, or add it to the list first.");
}

/** The value as the rest of the program knows it. */
export function decodeValue(attribute: Attribute, stored: number | null): AttributeValue {
  if (stored === null) return null;
  if (attribute.kind === "number") return stored;
  if (attribute.kind === "yesNo") return stored === 1;
  return attribute.kind === "built" ? dayOf(stored) : attribute.levels[stored]!;
}

/** Level name → code, one map per attribute key. */
export function levelCodesOf(stored: readonly StoredAttribute[]): ReadonlyMap<string, ReadonlyMap<string, number>> {
  return new Map(
    stored.map(({ attribute }) => [attribute.key, new Map(attribute.levels.map((level, code) => [level, code]))]),
  );
}
