/**
 * Moments of one block of rows by a kernel. Each column of numbers is shifted by a number near its mean with few digits (so
 * that shifting numbers of few digits rounds nothing), divided by a power of two, and multiplied with each other one:
 * Q_jk = Σ w z_j z_k, s_j = Σ w z_j, W = Σ w; then S_jk = Q_jk − s_j s_k/W. Levels of a choice have no columns: with W_l the
 * weight of level l and G_lj = Σ_{i in l} w z_ij, S_lj = G_lj − W_l s_j/W and S_lm = C_lm − W_l W_m/W, C counting both.
 */
import { twoSum } from "../doubleDouble.ts";
import { emptyMoments, type Moments, setBoth } from "../mergeMoments.ts";
import { powerOfTwoNear } from "../spread.ts";
import { type BlockLayout, COLUMN_BYTES, layOut } from "./blockLayout.ts";
import type { ColumnPlan } from "./columnPlan.ts";
import type { Kernel } from "./kernel.ts";
import { setLevels } from "./levelMoments.ts";
import { countOf, loadColumn, loadGroups, type Rows } from "./loadBlock.ts";

/** Shifts lie on a grid this much finer than the largest deviation. */
const SHIFT_STEPS = 65536;
/** A shift farther from the weighted mean than the spread is corrected, this often at most. */
const SHIFT_CORRECTIONS = 3;

interface Block {
  readonly kernel: Kernel;
  readonly plan: ColumnPlan;
  readonly layout: BlockLayout;
  readonly rows: Rows;
  /** Rows of the block. */
  readonly size: number;
  readonly isWeighted: boolean;
}

/** Per column of numbers how it was shifted and scaled, z = (x − shift)/scale, and s = Σ w z. */
interface Numbers {
  readonly shift: Float64Array;
  readonly scale: Float64Array;
  readonly sum: Float64Array;
}

/** Moments of up to BLOCK_ROWS rows, weights above 0, scales as they come; null when some value is not finite. */
export function blockMoments(
  kernel: Kernel,
  plan: ColumnPlan,
  rows: Rows,
  weights: Float64Array | undefined,
): Moments | null {
  if (countOf(rows) === 0) return emptyMoments(plan.columns.length);
  const start = kernel.reserve(0);
  const layout = layOut(plan, weights !== undefined, start);
  kernel.reserve(layout.end - start);
  const block: Block = { kernel, plan, layout, rows, size: countOf(rows), isWeighted: weights !== undefined };
  fillUp(block, weights);
  const numbers = firstShifts(block);
  if (numbers === null) return null;
  const weightSum = weights === undefined ? block.size : sumOfWeights(block);
  sumNumbers(block, numbers);
  for (let times = 0; times < SHIFT_CORRECTIONS && moveShifts(block, numbers, weightSum); times++) {
    reload(block, numbers);
    sumNumbers(block, numbers);
  }
  sumGroups(block);
  return momentsOfSums(block, numbers, weightSum);
}

/** The column of ones, the weights, and zeros up to the kernels' widths. */
function fillUp({ kernel: { f64 }, plan, layout, rows, size }: Block, weights: Float64Array | undefined): void {
  const setAt = (bytes: number, value: number): void => {
    f64.fill(value, bytes / 8, bytes / 8 + size);
    f64[bytes / 8 + size] = 0;
  };
  for (let j = plan.numbers.length; j < layout.filledColumns; j++) {
    setAt(layout.first + j * COLUMN_BYTES, j === plan.numbers.length ? 1 : 0);
    if (weights !== undefined) setAt(layout.weighted + j * COLUMN_BYTES, 0);
  }
  if (weights !== undefined) loadColumn(f64, layout.weights / 8, weights, rows);
}

function sumOfWeights({ kernel: { f64, operations }, layout, size }: Block): number {
  operations.rangeOfColumn(layout.weights, size, layout.range);
  return f64[layout.range / 8]!;
}

/** Loads, shifts and scales each column of numbers; null when one holds a value that is not finite. */
function firstShifts({ kernel: { f64, operations }, plan, layout, rows, size }: Block): Numbers | null {
  const width = plan.numbers.length;
  const shift = new Float64Array(width);
  const scale = new Float64Array(width);
  const sum = new Float64Array(width);
  const range = layout.range / 8;
  for (let d = 0; d < width; d++) {
    const column = layout.first + d * COLUMN_BYTES;
    loadColumn(f64, column / 8, plan.columns[plan.numbers[d]!]!, rows);
    operations.rangeOfColumn(column, size, layout.range);
    const least = f64[range + 1]!;
    const largest = f64[range + 2]!;
    const isSafe = Number.isFinite(f64[range]!);
    if (!isSafe && !allFinite(f64, column / 8, size)) return null;
    const near = isSafe ? f64[range]! / size : least / 2 + largest / 2;
    scale[d] = powerOfTwoNear(Math.max(largest - near, near - least));
    const grid = scale[d]! / SHIFT_STEPS;
    shift[d] = least === largest ? least : Math.round(near / grid) * grid;
    sum[d] = operations.shiftColumn(column, size, shift[d]!, 1 / scale[d]!);
  }
  return { shift, scale, sum };
}

/** Whether all of the column is finite although its sum is not. */
function allFinite(f64: Float64Array, at: number, size: number): boolean {
  return f64.subarray(at, at + size).every((value) => Number.isFinite(value));
}

function reload({ kernel: { f64, operations }, plan, layout, rows, size }: Block, numbers: Numbers): void {
  const { shift, scale, sum } = numbers;
  plan.numbers.forEach((j, d) => {
    const column = layout.first + d * COLUMN_BYTES;
    loadColumn(f64, column / 8, plan.columns[j]!, rows);
    sum[d] = operations.shiftColumn(column, size, shift[d]!, 1 / scale[d]!);
  });
}

/** Q, and s where there are weights. */
function sumNumbers({ kernel: { f64, operations }, layout, size, isWeighted }: Block, { sum }: Numbers): void {
  const { first, weighted, weights, crossColumns, high, low } = layout;
  if (isWeighted) {
    for (let d = 0; d < sum.length; d++) {
      const offset = d * COLUMN_BYTES;
      sum[d] = operations.weightColumn(first + offset, weights, size, weighted + offset);
    }
  }
  f64.fill(0, high / 8, high / 8 + crossColumns * crossColumns);
  f64.fill(0, low / 8, low / 8 + crossColumns * crossColumns);
  operations.crossProducts(first, weighted, crossColumns, size, high, low);
}

/** Moves each shift that is farther from the mean than the spread (s²/W > S); true when there was one. */
function moveShifts({ kernel: { f64 }, layout }: Block, { shift, scale, sum }: Numbers, weightSum: number): boolean {
  let hasMoved = false;
  for (let d = 0; d < sum.length; d++) {
    const s = sum[d]!;
    const moved = shift[d]! + scale[d]! * (s / weightSum);
    if (2 * s * s > weightSum * productOf(f64, layout, d, d) && moved !== shift[d]) {
      shift[d] = moved;
      hasMoved = true;
    }
  }
  return hasMoved;
}

/** Q_jk of numbers j ≥ k. */
function productOf(f64: Float64Array, { high, low, crossColumns }: BlockLayout, j: number, k: number): number {
  const at = j * crossColumns + k;
  return f64[high / 8 + at]! + f64[low / 8 + at]!;
}

function sumGroups({ kernel: { f64, u16, operations }, plan, layout, rows, size }: Block): void {
  const { groupColumns, weighted, weights, codes } = layout;
  plan.choices.forEach((choice, c) => {
    loadGroups(u16, codes[c]! / 2, choice, rows);
    const out = layout.groupSums[c]! / 8;
    const half = choice.groups * groupColumns;
    f64.fill(0, out, out + 2 * half);
    operations.groupSums(codes[c]!, choice.groups, weighted, groupColumns, size, out * 8);
    for (let at = out; at < out + half; at++) f64[at] = f64[at]! + f64[at + half]!;
  });
  for (const { a, b, at } of layout.pairSums) {
    const groupsB = plan.choices[b]!.groups;
    f64.fill(0, at / 8, at / 8 + plan.choices[a]!.groups * groupsB);
    operations.pairSums(codes[a]!, codes[b]!, groupsB, weights, size, at);
  }
}

function momentsOfSums(block: Block, { shift, scale, sum }: Numbers, weightSum: number): Moments {
  const { plan, layout, kernel } = block;
  const q = plan.columns.length;
  const moments = { ...emptyMoments(q), rowCount: block.size, weightSum };
  const { means, meanTails, scales, crossProducts } = moments;
  plan.numbers.forEach((j, d) => {
    const mean = twoSum(shift[d]!, scale[d]! * (sum[d]! / weightSum));
    means[j] = mean.hi;
    meanTails[j] = mean.lo;
    scales[j] = scale[d]!;
    for (let e = 0; e <= d; e++) {
      const value = productOf(kernel.f64, layout, d, e) - sum[d]! * (sum[e]! / weightSum);
      setBoth(crossProducts, q, j, plan.numbers[e]!, e === d ? Math.max(0, value) : value);
    }
  });
  setLevels({ f64: kernel.f64, plan, layout, moments, sums: sum });
  return moments;
}
