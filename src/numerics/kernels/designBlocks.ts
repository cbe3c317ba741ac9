/**
 * A design laid out block by block for the kernels that pass over rows: columns of numbers, and each choice once as codes,
 * however many of its levels are columns.
 */
import { type Column, isIndicator } from "../column.ts";
import { BLOCK_ROWS, COLUMN_STRIDE } from "./layout.ts";

export const COLUMN_BYTES = COLUMN_STRIDE * 8;

export interface DesignChoice {
  readonly codes: Uint16Array;
  /** Column numbers and the codes they stand for. */
  readonly levels: readonly { readonly column: number; readonly code: number }[];
  /** Largest code that occurs or is asked for, plus one. */
  readonly size: number;
}

export interface DesignPlan {
  readonly rowCount: number;
  /** Column numbers of those that hold numbers. */
  readonly numbers: readonly number[];
  readonly choices: readonly DesignChoice[];
}

export function planDesign(columns: readonly Column[], rowCount: number): DesignPlan {
  const numbers: number[] = [];
  const choices = new Map<Uint16Array, { column: number; code: number }[]>();
  columns.forEach((column, j) => {
    if (!isIndicator(column)) numbers.push(j);
    else choices.set(column.codes, [...(choices.get(column.codes) ?? []), { column: j, code: column.level }]);
  });
  return {
    rowCount,
    numbers,
    choices: [...choices].map(([codes, levels]) => {
      const asked = levels.reduce((most, { code }) => Math.max(most, code), 0);
      return { codes, levels, size: Math.max(asked, largestOf(codes)) + 1 };
    }),
  };
}

function largestOf(codes: Uint16Array): number {
  let largest = 0;
  for (let i = 0; i < codes.length; i++) if (codes[i]! > largest) largest = codes[i]!;
  return largest;
}

/** Starts of the blocks of rows with their sizes. */
export function blocksOf(rowCount: number): { start: number; size: number }[] {
  return Array.from({ length: Math.ceil(rowCount / BLOCK_ROWS) }, (_, block) => {
    const start = block * BLOCK_ROWS;
    return { start, size: Math.min(BLOCK_ROWS, rowCount - start) };
  });
}

/** Copies a block of a column, zero after an odd last row. */
export function putBlock(f64: Float64Array, bytes: number, values: Float64Array, start: number, size: number): void {
  f64.set(values.subarray(start, start + size), bytes / 8);
  f64[bytes / 8 + size] = 0;
}

/** Copies a block of any column, a level of a choice as zeros and ones. */
export function putColumn(f64: Float64Array, bytes: number, column: Column, start: number, size: number): void {
  if (!isIndicator(column)) {
    putBlock(f64, bytes, column, start, size);
    return;
  }
  const { codes, level } = column;
  const at = bytes / 8;
  for (let i = 0; i < size; i++) f64[at + i] = codes[start + i] === level ? 1 : 0;
  f64[at + size] = 0;
}
