/**
 * Moments of one block of rows by a kernel. Each column of numbers is shifted by a number near its mean with few digits (so
 * that shifting numbers of few digits rounds nothing), divided by a power of two, and multiplied with each other one:
 * Q_jk = Σ w z_j z_k, s_j = Σ w z_j, W = Σ w; then S_jk = Q_jk − s_j s_k/W. Levels of a choice have no columns: with W_l the
 * weight of level l and G_lj = Σ_{i in l} w z_ij, S_lj = G_lj − W_l s_j/W and S_lm = C_lm − W_l W_m/W, C counting both.
 */
import { twoSum } from "../doubleDouble.ts";
import { emptyMoments, type Moments, rescaled } from "../mergeMoments.ts";
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

/** How numbers were shifted and scaled: z = (x − shift)/scale. */
interface Shifts {
  readonly shift: Float64Array;
  readonly scale: Float64Array;
}

/** Moments of up to BLOCK_ROWS rows, weights above 0; null when some value is not finite. */
export function blockMoments(
  kernel: Kernel,
  plan: ColumnPlan,
  rows: Rows,
  weights: Float64Array | undefined,
): Moments | null {
  const size = countOf(rows);
  if (size === 0) return emptyMoments(plan.columns.length);
  const start = kernel.reserve(0);
  const layout = layOut(plan, weights !== undefined, start);
  kernel.reserve(layout.end - start);
  fillUp(kernel, plan, layout, rows, weights);
  const counts = plan.choices.map((choice, c) => loadGroups(kernel.u16, layout.codes[c]! / 2, choice, rows));
  const shifts = firstShifts(kernel, plan, layout, rows);
  if (shifts === null) return null;
  sumNumbers(kernel, plan, layout, size, weights !== undefined);
  for (let times = 0; times < SHIFT_CORRECTIONS && moveShifts(kernel, plan, layout, shifts); times++) {
    reload(kernel, plan, layout, rows, shifts);
    sumNumbers(kernel, plan, layout, size, weights !== undefined);
  }
  sumGroups(kernel, plan, layout, size);
  return momentsOfSums(kernel, plan, layout, shifts, counts, size);
}

/** The column of ones, the weights, and zeros up to the kernels' widths. */
function fillUp(
  { f64 }: Kernel,
  plan: ColumnPlan,
  layout: BlockLayout,
  rows: Rows,
  weights: Float64Array | undefined,
): void {
  const size = countOf(rows);
  const ones = layout.first / 8;
  f64.fill(1, ones, ones + size);
  f64[ones + size] = 0;
  if (weights !== undefined) {
    loadColumn(f64, layout.weighted / 8, weights, rows);
    f64[layout.weighted / 8 + size] = 0;
  }
  for (let j = plan.numbers.length + 1; j < layout.filledColumns; j++) {
    for (const first of new Set([layout.first, layout.weighted])) {
      const at = (first + j * COLUMN_BYTES) / 8;
      f64.fill(0, at, at + size + 1);
    }
  }
}

/** Loads, shifts and scales each column of numbers; null when one holds a value that is not finite. */
function firstShifts(kernel: Kernel, plan: ColumnPlan, layout: BlockLayout, rows: Rows): Shifts | null {
  const { f64, operations } = kernel;
  const size = countOf(rows);
  const shift = new Float64Array(plan.numbers.length);
  const scale = new Float64Array(plan.numbers.length);
  for (let d = 0; d < plan.numbers.length; d++) {
    const column = layout.first + (d + 1) * COLUMN_BYTES;
    loadColumn(f64, column / 8, plan.columns[plan.numbers[d]!]!, rows);
    operations.rangeOfColumn(column, size, layout.range);
    const range = layout.range / 8;
    const least = f64[range + 1]!;
    const largest = f64[range + 2]!;
    if (!Number.isFinite(least) || !Number.isFinite(largest)) return null;
    const mean = f64[range]! / size;
    const near = Number.isFinite(mean) ? mean : least / 2 + largest / 2;
    scale[d] = powerOfTwoNear(Math.max(largest - near, near - least));
    const grid = scale[d]! / SHIFT_STEPS;
    shift[d] = least === largest ? least : Math.round(near / grid) * grid;
    operations.shiftColumn(column, size, shift[d]!, 1 / scale[d]!);
  }
  return { shift, scale };
}

function reload({ f64, operations }: Kernel, plan: ColumnPlan, layout: BlockLayout, rows: Rows, by: Shifts): void {
  plan.numbers.forEach((j, d) => {
    const column = layout.first + (d + 1) * COLUMN_BYTES;
    loadColumn(f64, column / 8, plan.columns[j]!, rows);
    operations.shiftColumn(column, countOf(rows), by.shift[d]!, 1 / by.scale[d]!);
  });
}

function sumNumbers(kernel: Kernel, plan: ColumnPlan, layout: BlockLayout, size: number, isWeighted: boolean): void {
  const { f64, operations } = kernel;
  const { first, weighted, crossColumns, high, low } = layout;
  if (isWeighted) {
    for (let d = 1; d <= plan.numbers.length; d++)
      operations.weightColumn(first + d * COLUMN_BYTES, weighted, size, weighted + d * COLUMN_BYTES);
  }
  f64.fill(0, high / 8, high / 8 + crossColumns * crossColumns);
  f64.fill(0, low / 8, low / 8 + crossColumns * crossColumns);
  operations.crossProducts(first, weighted, crossColumns, size, high, low);
}

/** Moves each shift that is farther from the mean than the spread (s² /W > S); true when there was one. */
function moveShifts({ f64 }: Kernel, plan: ColumnPlan, layout: BlockLayout, { shift, scale }: Shifts): boolean {
  const total = totalAt(f64, layout, 0, 0);
  let hasMoved = false;
  plan.numbers.forEach((_, d) => {
    const s = totalAt(f64, layout, d + 1, 0);
    const moved = shift[d]! + scale[d]! * (s / total);
    if (2 * s * s > total * totalAt(f64, layout, d + 1, d + 1) && moved !== shift[d]) {
      shift[d] = moved;
      hasMoved = true;
    }
  });
  return hasMoved;
}

function totalAt(f64: Float64Array, { high, low, crossColumns }: BlockLayout, j: number, k: number): number {
  const at = j * crossColumns + k;
  return f64[high / 8 + at]! + f64[low / 8 + at]!;
}

function sumGroups({ f64, operations }: Kernel, plan: ColumnPlan, layout: BlockLayout, size: number): void {
  const { groupColumns, weighted, codes } = layout;
  plan.choices.forEach(({ groups }, c) => {
    const out = layout.groupSums[c]!;
    f64.fill(0, out / 8, out / 8 + 2 * groups * groupColumns);
    operations.groupSums(codes[c]!, groups, weighted, groupColumns, size, out);
    for (let at = out / 8, i = 0; i < groups * groupColumns; i++)
      f64[at + i] = f64[at + i]! + f64[at + i + groups * groupColumns]!;
  });
  for (const { a, b, at } of layout.pairSums) {
    const groupsB = plan.choices[b]!.groups;
    f64.fill(0, at / 8, at / 8 + plan.choices[a]!.groups * groupsB);
    operations.pairSums(codes[a]!, codes[b]!, groupsB, weighted, size, at);
  }
}

function momentsOfSums(
  { f64 }: Kernel,
  plan: ColumnPlan,
  layout: BlockLayout,
  { shift, scale }: Shifts,
  counts: readonly Uint32Array[],
  rowCount: number,
): Moments {
  const q = plan.columns.length;
  const weightSum = totalAt(f64, layout, 0, 0);
  const moments = { ...emptyMoments(q), rowCount, weightSum };
  const { means, meanTails, scales, crossProducts } = moments;
  const set = (j: number, k: number, value: number): void => {
    crossProducts[j * q + k] = value;
    crossProducts[k * q + j] = value;
  };
  const sums = plan.numbers.map((_, d) => totalAt(f64, layout, d + 1, 0));
  plan.numbers.forEach((j, d) => {
    const mean = twoSum(shift[d]!, scale[d]! * (sums[d]! / weightSum));
    means[j] = mean.hi;
    meanTails[j] = mean.lo;
    scales[j] = scale[d]!;
    for (let e = 0; e <= d; e++) {
      const value = totalAt(f64, layout, d + 1, e + 1) - sums[d]! * (sums[e]! / weightSum);
      set(j, plan.numbers[e]!, e === d ? Math.max(0, value) : value);
    }
  });
  setLevels({ f64, plan, layout, moments, sums, counts, set });
  return rescaled(moments);
}
