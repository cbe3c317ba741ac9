/**
 * Addresses of one block in a kernel's memory, in bytes: the columns (a column of ones first, which brings sums and counts out
 * of the same products), with weights once more times the weights, the codes of the choices, then the sums.
 */
import type { ColumnPlan } from "./columnPlan.ts";
import { BLOCK_ROWS, COLUMN_STRIDE, CROSS_WIDTH, GROUP_WIDTH } from "./layout.ts";

export const COLUMN_BYTES = COLUMN_STRIDE * 8;

export interface BlockLayout {
  /** Columns of cross-products and of grouped sums: the numbers and the ones, filled up with zeros to the kernels' widths. */
  readonly crossColumns: number;
  readonly groupColumns: number;
  readonly filledColumns: number;
  readonly first: number;
  /** Columns times weights; `first` without weights. */
  readonly weighted: number;
  /** Per choice. */
  readonly codes: readonly number[];
  readonly range: number;
  readonly high: number;
  readonly low: number;
  /** Per choice: 2 · groups × groupColumns. */
  readonly groupSums: readonly number[];
  /** Per pair of choices a < b: groupsA × groupsB. */
  readonly pairSums: readonly { readonly a: number; readonly b: number; readonly at: number }[];
  readonly end: number;
}

/** Where everything lies when the first free byte is `start`. */
export function layOut({ numbers, choices }: ColumnPlan, isWeighted: boolean, start: number): BlockLayout {
  const used = numbers.length + 1;
  const crossColumns = Math.ceil(used / CROSS_WIDTH) * CROSS_WIDTH;
  const groupColumns = Math.ceil(used / GROUP_WIDTH) * GROUP_WIDTH;
  const filledColumns = Math.max(crossColumns, groupColumns);
  let free = start;
  const take = (bytes: number): number => {
    const at = free;
    free += Math.ceil(bytes / 64) * 64;
    return at;
  };
  const first = take(filledColumns * COLUMN_BYTES);
  return {
    crossColumns,
    groupColumns,
    filledColumns,
    first,
    weighted: isWeighted ? take(filledColumns * COLUMN_BYTES) : first,
    codes: choices.map(() => take(BLOCK_ROWS * 2)),
    range: take(24),
    high: take(crossColumns * crossColumns * 8),
    low: take(crossColumns * crossColumns * 8),
    groupSums: choices.map(({ groups }) => take(2 * groups * groupColumns * 8)),
    pairSums: choices.flatMap(({ groups }, a) =>
      choices.slice(a + 1).map((other, i) => ({ a, b: a + 1 + i, at: take(groups * other.groups * 8) })),
    ),
    end: free,
  };
}
