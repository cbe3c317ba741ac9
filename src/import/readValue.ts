/** Attribute values of cells: numbers with or without a unit of their own, and levels of a choice. */
import { unitName, unitRatio } from "./conversions/unit.ts";
import { nearest } from "./editDistance.ts";
import type { AttributeColumn } from "./planColumns.ts";
import { type Reading, read, unread } from "./reading.ts";
import { type Marks, readNumber } from "./readNumber.ts";
import { splitUnit } from "./splitUnit.ts";

interface QuantityContext {
  readonly options: Marks;
  readonly doubts: boolean;
  readonly convertedCells: Map<string, number>;
}

function scaled(value: number, ratio: number): number {
  return ratio === 1 ? value : value * ratio;
}

function withUnit(cell: string, column: AttributeColumn, context: QuantityContext): Reading<number> | null {
  const parts = splitUnit(cell);
  if (parts === null) return null;
  const { attribute, heading } = column;
  const name = unitName(parts.unit);
  if (name === null && parts.unit.toLowerCase() !== attribute.unit?.toLowerCase()) return null;
  const number = readNumber(parts.number, context.options);
  if (!number.ok) return number;
  if (name === null) return number;
  const ratio = attribute.unit === null ? null : unitRatio(name, attribute.unit);
  if (ratio === null) return null;
  if (ratio === 1) return number;
  if (context.doubts) {
    const what = `${heading}: ${name} converted to ${attribute.unit}`;
    context.convertedCells.set(what, (context.convertedCells.get(what) ?? 0) + 1);
  }
  return read(number.value * ratio);
}

function orList(words: readonly string[]): string {
  return words.length < 2 ? words.join("") : `${words.slice(0, -1).join(", ")} or ${words.at(-1)}`;
}

/** The unit that brings the value nearest to the middle of those that name theirs. An offer, never taken unasked. */
function likeliestUnit(value: number, { mixedUnits, attribute }: AttributeColumn): string {
  const off = (unit: string) =>
    Math.abs(Math.log(Math.abs(value * unitRatio(unit, attribute.unit!)!) / Math.abs(mixedUnits!.middle)));
  return mixedUnits!.units.reduce((best, unit) => (off(unit) < off(best) ? unit : best));
}

/** A number in the attribute's unit. A unit written in the cell counts before that of the heading. */
export function readQuantity(cell: string, column: AttributeColumn, context: QuantityContext): Reading<number> {
  const plain = readNumber(cell, context.options);
  if (plain.ok) {
    if (column.mixedUnits !== null && context.doubts) {
      const { units } = column.mixedUnits;
      const all = units.length === 2 ? "both" : "all of them";
      return unread(
        `No unit: ${orList(units)}? The column has ${all}.`,
        `${cell} ${likeliestUnit(plain.value, column)}`,
      );
    }
    return read(scaled(plain.value, column.ratio));
  }
  const known = withUnit(cell, column, context);
  if (known !== null) return known;
  const parts = splitUnit(cell);
  if (plain.suggestion === null && parts !== null && readNumber(parts.number, context.options).ok) {
    const wanted = column.attribute.unit;
    return unread(
      wanted === null ? `A unit where none is expected: ${parts.unit}.` : `The unit ${parts.unit} is not ${wanted}.`,
    );
  }
  return plain;
}

/** A level that is not in the list: new where the list is open, else held back with the nearest spelling. */
export function readChoice(cell: string, column: AttributeColumn): Reading<string> {
  const level = cell.replace(/\s+/g, " ");
  const lower = level.toLowerCase();
  const known = column.levels.get(lower);
  if (known !== undefined) return read(known);
  if (column.levelsOpen) {
    if (level.length > 120) return unread("A text too long for a choice.");
    column.levels.set(lower, level);
    return read(level);
  }
  const label = column.attribute.label.toLowerCase();
  const list = label.endsWith("s") ? label : `${label}s`;
  return unread(`Not in the list of ${list}.`, nearest(level, column.attribute.levels));
}
