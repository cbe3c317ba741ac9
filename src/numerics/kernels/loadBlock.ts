/** Rows of a design copied into a kernel's memory, a column at a time. */
import { type Column, isIndicator } from "../column.ts";
import type { GroupedChoice } from "./columnPlan.ts";

/** Neighbouring rows, or chosen rows in ascending order. */
export type Rows = { readonly start: number; readonly end: number } | Uint32Array;

export function countOf(rows: Rows): number {
  return rows instanceof Uint32Array ? rows.length : rows.end - rows.start;
}

/** Writes the numbers of the rows from f64[at] on. */
export function loadColumn(f64: Float64Array, at: number, column: Column, rows: Rows): void {
  if (isIndicator(column)) loadLevel(f64, at, column.codes, column.level, rows);
  else if (!(rows instanceof Uint32Array)) f64.set(column.subarray(rows.start, rows.end), at);
  else for (let i = 0; i < rows.length; i++) f64[at + i] = column[rows[i]!]!;
}

function loadLevel(f64: Float64Array, at: number, codes: Uint16Array, level: number, rows: Rows): void {
  if (rows instanceof Uint32Array) {
    for (let i = 0; i < rows.length; i++) f64[at + i] = codes[rows[i]!] === level ? 1 : 0;
    return;
  }
  const { start, end } = rows;
  for (let i = start; i < end; i++) f64[at + i - start] = codes[i] === level ? 1 : 0;
}

/** Writes the group of each row from u16[at] on. */
export function loadGroups(u16: Uint16Array, at: number, { codes, groupOf }: GroupedChoice, rows: Rows): void {
  const known = groupOf.length;
  if (rows instanceof Uint32Array) {
    for (let i = 0; i < rows.length; i++) {
      const code = codes[rows[i]!]!;
      u16[at + i] = code < known ? groupOf[code]! : 0;
    }
    return;
  }
  const { start, end } = rows;
  const offset = at - start;
  for (let i = start; i < end; i++) {
    const code = codes[i]!;
    u16[offset + i] = code < known ? groupOf[code]! : 0;
  }
}
