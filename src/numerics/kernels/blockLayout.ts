/**
 * Addresses of one block in a kernel's memory, in bytes: the numbers, a column of ones (which brings the weight of each group
 * out of the grouped sums), with weights all of it once more times the weights, the codes of the choices, then the sums.
 */
import type { ColumnPlan } from "./columnPlan.ts";
import { BLOCK_ROWS, COLUMN_STRIDE, CROSS_WIDTH, GROUP_WIDTH } from "./layout.ts";

export const COLUMN_BYTES = COLUMN_STRIDE * 8;

export interface BlockLayout {
  /** Columns of cross-products (the numbers) and of grouped sums (with the ones), filled up to the kernels' widths. */
  readonly crossColumns: number;
  readonly groupColumns: number;
  readonly filledColumns: number;
  readonly first: number;
  readonly ones: number;
  /** Columns times weights; `first` without weights. */
  readonly weighted: number;
  /** The weights; the ones without weights. */
  readonly weights: number;
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
  const crossColumns = Math.ceil(numbers.length / CROSS_WIDTH) * CROSS_WIDTH;
  const groupColumns = Math.ceil((numbers.length + 1) / GROUP_WIDTH) * GROUP_WIDTH;
  const filledColumns = Math.max(crossColumns, groupColumns);
  let free = start;
  const take = (bytes: number): number => {
    const at = free;
    free += Math.ceil(bytes / 64) * 64;
    return at;
  };
  const first = take(filledColumns * COLUMN_BYTES);
  const weighted = isWeighted ? take(filledColumns * COLUMN_BYTES) : first;
  return {
    crossColumns,
    groupColumns,
    filledColumns,
    first,
    ones: first + numbers.length * COLUMN_BYTES,
    weighted,
    weights: weighted + numbers.length * COLUMN_BYTES,
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
