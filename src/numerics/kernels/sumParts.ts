/**
 * Moments of many rows as parts of a fixed number of rows, each part blocks of a fixed number, all merged in a fixed order:
 * whoever computes a part, the bits are the same.
 */
import type { Column } from "../column.ts";
import { type Moments, mergeParts } from "../mergeMoments.ts";
import { blockMoments } from "./blockMoments.ts";
import type { ColumnPlan } from "./columnPlan.ts";
import type { Kernel } from "./kernel.ts";
import { BLOCK_ROWS } from "./layout.ts";
import { countOf, type Rows } from "./loadBlock.ts";

/** Rows of a part, the unit handed to a thread. */
const PART_ROWS = 4 * BLOCK_ROWS;

/** Rows to sum: all columns share their length, weights are above 0 for these rows. */
export interface RowSums {
  readonly columns: readonly Column[];
  readonly weights: Float64Array | undefined;
  readonly rows: Rows;
}

export function partCount(rows: Rows): number {
  return Math.max(1, Math.ceil(countOf(rows) / PART_ROWS));
}

/** Moments of one part, scales as they come; null when some value is not finite. */
export function partMoments(
  kernel: Kernel,
  plan: ColumnPlan,
  { rows, weights }: RowSums,
  part: number,
): Moments | null {
  const blocks: Moments[] = [];
  const end = Math.min(countOf(rows), (part + 1) * PART_ROWS);
  for (let start = part * PART_ROWS; start < end || blocks.length === 0; start += BLOCK_ROWS) {
    const moments = blockMoments(kernel, plan, slice(rows, start, Math.min(end, start + BLOCK_ROWS)), weights);
    if (moments === null) return null;
    blocks.push(moments);
  }
  return mergeParts(blocks, true);
}

function slice(rows: Rows, start: number, end: number): Rows {
  return rows instanceof Uint32Array ? rows.subarray(start, end) : { start: rows.start + start, end: rows.start + end };
}
