/**
 * What numerics refuses, as a code and the column numbers it concerns.
 * Column numbers count from 0 in the order the columns were handed in; whoever knows the attribute names adds them.
 */

/** shape: lengths disagree or nothing was handed in; tooFewRows: n ≤ p; rankDeficient: dependent columns. */
export type NumericsErrorCode = "shape" | "notFinite" | "tooFewRows" | "rankDeficient";

/** A refusal of the numbers themselves. `columns` is empty when no single column is to blame; the response is −1. */
export class NumericsError extends Error {
  readonly code: NumericsErrorCode;
  readonly columns: number[];

  constructor(code: NumericsErrorCode, message: string, columns: number[] = []) {
    super(message);
    this.name = "NumericsError";
    this.code = code;
    this.columns = columns;
  }
}

/** Refuses unequal lengths, no rows, and values that are not finite numbers; gives back the row count. */
export function checkColumns(columns: readonly Float64Array[], response?: Float64Array): number {
  const rowCount = response?.length ?? columns[0]?.length ?? 0;
  const uneven = columns.flatMap((column, j) => (column.length === rowCount ? [] : [j]));
  if (uneven.length > 0) {
    const lengths = uneven.map((j) => columns[j]!.length).join(", ");
    throw new NumericsError("shape", `columns have ${lengths} rows where ${rowCount} were expected`, uneven);
  }
  if (rowCount === 0) throw new NumericsError("shape", "there are no rows");
  const bad = columns.flatMap((column, j) => (isAllFinite(column) ? [] : [j]));
  if (response !== undefined && !isAllFinite(response)) bad.push(-1);
  if (bad.length > 0) throw new NumericsError("notFinite", "some values are not finite numbers", bad);
  return rowCount;
}

function isAllFinite(values: Float64Array): boolean {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(values[i]!)) return false;
  return true;
}
