/** What a column is by its values, where no attribute of the class has its name. */
import type { AttributeKind } from "../domain/attribute.ts";
import type { ReadingOptions } from "../domain/importRecord.ts";
import { unitName } from "./conversions/unit.ts";
import type { RawTable } from "./rawTable.ts";
import { looksLikeDay } from "./readDay.ts";
import { isNotStated } from "./reading.ts";
import { readNumber } from "./readNumber.ts";
import { isPlainYesNo } from "./readWord.ts";
import { splitUnit } from "./splitUnit.ts";

export interface ColumnLook {
  readonly filled: number;
  /** Shares of the filled cells. */
  readonly numbers: number;
  readonly days: number;
  readonly yesNo: number;
  readonly years: number;
  readonly distinct: number;
  /** Middle of the numbers, null without any. */
  readonly middle: number | null;
  readonly lowest: number | null;
  /** The one unit that most of the cells are written with; a unit in a few only is a slip, to be held back. */
  readonly unit: string | null;
}

/** Enough to know a column by; rows are taken evenly over the whole file. */
const SAMPLE_ROWS = 5000;

function numberIn(cell: string, options: ReadingOptions, units: string[]): number | null {
  const plain = readNumber(cell, options);
  if (plain.ok) return plain.value;
  const parts = splitUnit(cell);
  const name = parts === null ? null : unitName(parts.unit);
  const number = name === null ? null : readNumber(parts!.number, options);
  if (number === null || !number.ok) return null;
  units.push(name!);
  return number.value;
}

export function lookAtColumn(table: RawTable, index: number): ColumnLook {
  const numbers: number[] = [];
  const units: string[] = [];
  const distinct = new Set<string>();
  let [filled, days, yesNo, years] = [0, 0, 0, 0];
  const stride = Math.max(1, Math.floor(table.rows.length / SAMPLE_ROWS));
  for (let k = 0; k < table.rows.length; k += stride) {
    const cell = table.rows[k]!.cells[index]?.trim() ?? "";
    if (isNotStated(cell)) continue;
    filled++;
    distinct.add(cell.toLowerCase());
    if (isPlainYesNo(cell)) yesNo++;
    const number = numberIn(cell, table.options, units);
    if (number !== null) {
      numbers.push(number);
      if (/^(1[6-9]|20)\d{2}$/.test(cell)) years++;
    } else if (looksLikeDay(cell) || /^\d{4}-\d{2}$|^\d{2}[./]\d{4}$/.test(cell)) days++;
  }
  numbers.sort((a, b) => a - b);
  const share = (count: number) => (filled === 0 ? 0 : count / filled);
  return {
    filled,
    numbers: share(numbers.length),
    days: share(days),
    yesNo: share(yesNo),
    years: share(years),
    distinct: distinct.size,
    middle: numbers[numbers.length >> 1] ?? null,
    lowest: numbers[0] ?? null,
    unit: units.length * 2 > numbers.length && new Set(units).size === 1 ? units[0]! : null,
  };
}

/** Most filled cells must agree; a few slips among them are what held-back rows are for. */
const MOST = 0.8;

/** Kind of attribute a column would make, or null for text that is different in nearly every row. */
export function kindOf(look: ColumnLook, namedBuilt: boolean): AttributeKind | null {
  if (look.filled === 0) return null;
  if (namedBuilt && (look.days >= MOST || look.years >= MOST)) return "built";
  if (look.yesNo >= MOST) return "yesNo";
  if (look.numbers >= MOST) return "number";
  if (look.days >= MOST) return null;
  const fewEnough = look.distinct <= 12 || (look.distinct <= 60 && look.distinct * 4 <= look.filled);
  return fewEnough ? "choice" : null;
}
