/**
 * Moments of columns in one pass over the rows (`mergeMoments.ts` says what they are): block by block on the kernel of this
 * thread, and on a pool of threads where one is handed in or in use (`kernels/sharedPool.ts`). Summation order depends on the rows alone.
 */
import type { Column } from "./column.ts";
import type { BlockPool } from "./kernels/blockPool.ts";
import { SHARED_ROWS, sumOnPool } from "./kernels/blockPool.ts";
import { planColumns } from "./kernels/columnPlan.ts";
import { currentKernel } from "./kernels/currentKernel.ts";
import type { Rows } from "./kernels/loadBlock.ts";
import { sharedPool } from "./kernels/sharedPool.ts";
import { partCount, partMoments, type RowSums } from "./kernels/sumParts.ts";
import { emptyMoments, type Moments, mergeMoments } from "./mergeMoments.ts";
import { NumericsError } from "./numericsError.ts";
import { groupRows, rowsOfWeight } from "./rowsOfWeight.ts";

export { addRow, type Moments, mergeMoments, removeRow } from "./mergeMoments.ts";
export { powerOfTwoNear, rootMeanSquare } from "./spread.ts";

export interface MomentOptions {
  /** One weight per row, n, ≥ 0 and not all zero. Rows of weight zero do not count, whatever they hold. */
  readonly weights?: Float64Array | undefined;
  /** Threads that help from a hundred thousand rows on, when all columns lie on shared memory. */
  readonly pool?: BlockPool | undefined;
}

/**
 * Moments of the columns. Refuses (shape) no columns, unequal lengths, no rows; (notFinite) values or weights that are not
 * finite and weights below 0; (tooFewRows) weights that are all zero.
 */
export function accumulateMoments(columns: readonly Column[], { weights, ...given }: MomentOptions = {}): Moments {
  const rowCount = checkLengths(columns, weights);
  const rows = weights === undefined ? { start: 0, end: rowCount } : rowsOfWeight(weights);
  const pool = given.pool ?? (rowCount < SHARED_ROWS ? undefined : sharedPool());
  return sumRows({ columns, weights, rows }, pool);
}

/**
 * Moments of each group of rows, in the order of the group numbers 0 … groupCount − 1: folds, months or channels, whose sum by
 * `mergeMoments` are the moments of all. A group without rows has `rowCount` 0. Rows with a number from groupCount up are left
 * out. Refuses as `accumulateMoments`.
 */
export function partsBy(
  columns: readonly Column[],
  groupCodes: Uint16Array,
  groupCount: number,
  weights?: Float64Array,
): Moments[] {
  const rowCount = checkLengths(columns, weights);
  if (groupCodes.length !== rowCount)
    throw new NumericsError("shape", `${groupCodes.length} group numbers for ${rowCount} rows`);
  const counted = weights === undefined ? { start: 0, end: rowCount } : rowsOfWeight(weights);
  return groupRows(groupCodes, groupCount, counted).map((rows) =>
    rows.length === 0 ? emptyMoments(columns.length) : sumRows({ columns, weights, rows }, undefined),
  );
}

function sumRows(task: RowSums, pool: BlockPool | undefined): Moments {
  const plan = planColumns(task.columns);
  const kernel = currentKernel();
  const compute = (part: number): Moments | null => partMoments(kernel, plan, task, part);
  const shared = pool === undefined ? null : sumOnPool(pool, task, compute);
  const parts = shared ?? Array.from({ length: partCount(task.rows) }, (_, part) => compute(part));
  const good = parts.filter((part) => part !== null);
  if (good.length < parts.length) refuseNotFinite(task.columns, task.rows);
  return mergeMoments(good);
}

function checkLengths(columns: readonly Column[], weights: Float64Array | undefined): number {
  const first = columns[0];
  if (first === undefined) throw new NumericsError("shape", "there are no columns");
  const rowCount = first.length;
  const uneven = columns.flatMap((column, j) => (column.length === rowCount ? [] : [j]));
  if (uneven.length > 0) {
    const lengths = uneven.map((j) => columns[j]!.length).join(", ");
    throw new NumericsError("shape", `columns have ${lengths} rows where ${rowCount} were expected`, uneven);
  }
  if (weights !== undefined && weights.length !== rowCount)
    throw new NumericsError("shape", `${weights.length} weights for ${rowCount} rows`);
  if (rowCount === 0) throw new NumericsError("shape", "there are no rows");
  return rowCount;
}

function refuseNotFinite(columns: readonly Column[], rows: Rows): never {
  const isBad = (column: Column): boolean => {
    if (!(column instanceof Float64Array)) return false;
    if (rows instanceof Uint32Array) return rows.some((i) => !Number.isFinite(column[i]!));
    return column.subarray(rows.start, rows.end).some((value) => !Number.isFinite(value));
  };
  const bad = columns.flatMap((column, j) => (isBad(column) ? [j] : []));
  throw new NumericsError("notFinite", "some values are not finite numbers", bad);
}
