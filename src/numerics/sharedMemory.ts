/** Arrays of many rows on memory that threads share, so that a pool can help to sum them; of few rows on plain memory. */
import { type Column, indicator, isIndicator } from "./column.ts";
import { SHARED_ROWS } from "./kernels/blockPool.ts";

/** n zeros. */
export function doubles(n: number): Float64Array {
  return new Float64Array(n < SHARED_ROWS ? new ArrayBuffer(8 * n) : new SharedArrayBuffer(8 * n));
}

/** The same numbers; themselves where they are few or lie on shared memory already. */
export function sharedNumbers(values: Float64Array): Float64Array {
  if (values.length < SHARED_ROWS || values.buffer instanceof SharedArrayBuffer) return values;
  const shared = doubles(values.length);
  shared.set(values);
  return shared;
}

/** The same columns; levels of one choice go on sharing their codes. */
export function sharedColumns(columns: readonly Column[]): Column[] {
  const known = new Map<Uint16Array, Uint16Array>();
  return columns.map((column) => {
    if (!isIndicator(column)) return sharedNumbers(column);
    const codes = known.get(column.codes) ?? sharedCodes(column.codes);
    known.set(column.codes, codes);
    return indicator(codes, column.level);
  });
}

function sharedCodes(codes: Uint16Array): Uint16Array {
  if (codes.length < SHARED_ROWS || codes.buffer instanceof SharedArrayBuffer) return codes;
  const shared = new Uint16Array(new SharedArrayBuffer(2 * codes.length));
  shared.set(codes);
  return shared;
}
