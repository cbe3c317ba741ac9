/**
 * A column of a design: n numbers, or one level of a choice held as codes, so that a choice never becomes a matrix of
 * zeros and ones. Neighbouring levels of one choice share the same `codes` array; kernels sum them in one go.
 */
export type Column = Float64Array | Indicator;

/** 1 where codes[i] === level, else 0. */
export interface Indicator {
  readonly codes: Uint16Array;
  readonly level: number;
  /** n, as of codes. */
  readonly length: number;
}

export function indicator(codes: Uint16Array, level: number): Indicator {
  return { codes, level, length: codes.length };
}

export function isIndicator(column: Column): column is Indicator {
  return !(column instanceof Float64Array);
}

/** Value in row i. */
export function valueAt(column: Column, i: number): number {
  return column instanceof Float64Array ? column[i]! : column.codes[i] === column.level ? 1 : 0;
}

/** The numbers of a column; a Float64Array comes back as it is. For short or rare work only: it takes 8 bytes a row. */
export function numbersOf(column: Column): Float64Array {
  if (column instanceof Float64Array) return column;
  const { codes, level } = column;
  const values = new Float64Array(codes.length);
  for (let i = 0; i < codes.length; i++) if (codes[i] === level) values[i] = 1;
  return values;
}

/** Rows from `start` up to `end`, on the same memory. */
export function rowsOf(column: Column, start: number, end: number): Column {
  if (column instanceof Float64Array) return column.subarray(start, end);
  return indicator(column.codes.subarray(start, end), column.level);
}
