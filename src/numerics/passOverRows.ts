/**
 * One pass over the rows in double-double: residuals of given coefficients, and what they still have in common with the columns.
 * Symbols: b slopes, b₀ intercept, w weights, e = y − b₀ − Xb, g = X′We (centred columns when there is an intercept).
 * Extra-precise residuals: Demmel, Hida, Riedy & Li 2009. A choice is looked up by its codes, once for all its levels.
 */
import type { Column } from "./column.ts";
import { add, type DoubleDouble, fromNumber, multiply, SPLITTER, subtract, twoSum } from "./doubleDouble.ts";
import { currentKernel } from "./kernels/currentKernel.ts";
import { blocksOf, COLUMN_BYTES, type DesignPlan, planDesign, putBlock } from "./kernels/designBlocks.ts";
import type { Kernel } from "./kernels/kernel.ts";
import { BLOCK_ROWS } from "./kernels/layout.ts";

export interface RowProblem {
  readonly columns: readonly Column[];
  readonly response: Float64Array;
  /** n, or null when every row counts alike. */
  readonly weights: Float64Array | null;
  /** Low parts of columns known to more than a double: null for the others, or null altogether. */
  readonly tails: readonly (Float64Array | null)[] | null;
}

export interface RowPass {
  /** e rounded to doubles, n. */
  readonly residuals: Float64Array;
  /** Σ w e², worked out in double-double, rounded. */
  readonly residualSumOfSquares: number;
  /** g, k. */
  readonly gradient: Float64Array;
  /** Σ w e. */
  readonly sumOfResiduals: DoubleDouble;
}

/** Byte addresses of what a block needs. */
interface Layout {
  readonly numbers: number;
  readonly ones: number;
  readonly weights: number;
  readonly high: number;
  readonly low: number;
  readonly weightedHigh: number;
  readonly weightedLow: number;
  readonly sums: number;
  readonly codes: readonly number[];
  readonly effects: readonly number[];
  readonly levelSums: readonly number[];
  readonly end: number;
}

function layOut({ numbers, choices }: DesignPlan, start: number): Layout {
  let next = start;
  const take = (bytes: number): number => {
    const at = next;
    next += Math.ceil(bytes / 64) * 64;
    return at;
  };
  const columnsAt = take(numbers.length * COLUMN_BYTES);
  const [ones, weights, high, low, weightedHigh, weightedLow] = Array.from({ length: 6 }, () => take(COLUMN_BYTES));
  const sums = take((numbers.length + 2) * 32);
  const codes = choices.map(() => take(BLOCK_ROWS * 2));
  const effects = choices.map(({ size }) => take(size * 16));
  const levelSums = choices.map(({ size }) => take(size * 16));
  return {
    numbers: columnsAt,
    ones: ones!,
    weights: weights!,
    high: high!,
    low: low!,
    weightedHigh: weightedHigh!,
    weightedLow: weightedLow!,
    sums,
    codes,
    effects,
    levelSums,
    end: next,
  };
}

interface Pass {
  readonly kernel: Kernel;
  readonly plan: DesignPlan;
  readonly layout: Layout;
  readonly problem: RowProblem;
  readonly slopes: readonly DoubleDouble[];
  readonly intercept: DoubleDouble;
}

/** Residuals, their sum of squares, and g. `means` are zero without an intercept. */
export function passOverRows(
  problem: RowProblem,
  slopes: readonly DoubleDouble[],
  intercept: DoubleDouble,
  means: readonly DoubleDouble[],
): RowPass {
  const kernel = currentKernel();
  const n = problem.response.length;
  const plan = planDesign(problem.columns, n);
  const start = kernel.reserve(0);
  const layout = layOut(plan, start);
  kernel.reserve(layout.end - start);
  const pass = { kernel, plan, layout, problem, slopes, intercept };
  kernel.f64.fill(0, layout.sums / 8, layout.end / 8);
  putEffects(pass);
  const residuals = new Float64Array(n);
  for (const { start: row, size } of blocksOf(n)) {
    loadBlock(pass, row, size);
    subtractFitted(pass, row, size);
    residuals.set(kernel.f64.subarray(layout.high / 8, layout.high / 8 + size), row);
    addUp(pass, row, size);
  }
  return readSums(pass, means, residuals);
}

/** Each choice's effects by code: the slope of the level's column, 0 for the others. */
function putEffects({ kernel: { f64 }, plan, layout, slopes }: Pass): void {
  plan.choices.forEach(({ levels }, c) => {
    const at = layout.effects[c]! / 8;
    for (const { column, code } of levels) {
      f64[at + 2 * code] = slopes[column]!.hi;
      f64[at + 2 * code + 1] = slopes[column]!.lo;
    }
  });
}

function loadBlock({ kernel: { f64, u16 }, plan, layout, problem }: Pass, row: number, size: number): void {
  plan.numbers.forEach((j, d) => {
    putBlock(f64, layout.numbers + d * COLUMN_BYTES, problem.columns[j] as Float64Array, row, size);
  });
  f64.fill(1, layout.ones / 8, layout.ones / 8 + size);
  f64[layout.ones / 8 + size] = 0;
  if (problem.weights !== null) putBlock(f64, layout.weights, problem.weights, row, size);
  plan.choices.forEach(({ codes }, c) => {
    u16.set(codes.subarray(row, row + size), layout.codes[c]! / 2);
  });
  putBlock(f64, layout.high, problem.response, row, size);
  f64.fill(0, layout.low / 8, layout.low / 8 + size + 1);
}

function subtractFitted(pass: Pass, row: number, size: number): void {
  const { kernel, plan, layout, problem, slopes, intercept } = pass;
  const { operations, f64 } = kernel;
  const { high, low } = layout;
  const subtractColumn = (at: number, { hi, lo }: DoubleDouble): void => {
    const t = SPLITTER * hi;
    const head = t - (t - hi);
    operations.subtractProduct(at, size, hi, head, hi - head, lo, high, low);
  };
  subtractColumn(layout.ones, intercept);
  plan.numbers.forEach((j, d) => {
    subtractColumn(layout.numbers + d * COLUMN_BYTES, slopes[j]!);
    const tail = problem.tails?.[j];
    if (tail) for (let i = 0; i < size; i++) f64[low / 8 + i] = f64[low / 8 + i]! - tail[row + i]! * slopes[j]!.hi;
  });
  plan.choices.forEach((_, c) => {
    operations.subtractTable(layout.codes[c]!, size, layout.effects[c]!, high, low);
  });
  if (size % 2 === 1) {
    f64[high / 8 + size] = 0;
    f64[low / 8 + size] = 0;
  }
  operations.settle(size, high, low);
}

function addUp({ kernel, plan, layout, problem }: Pass, row: number, size: number): void {
  const { operations, f64 } = kernel;
  let { high, low } = layout;
  if (problem.weights !== null) {
    operations.weightPairs(layout.weights, size, high, low, layout.weightedHigh, layout.weightedLow);
    high = layout.weightedHigh;
    low = layout.weightedLow;
  }
  const total = layout.sums + plan.numbers.length * 32;
  plan.numbers.forEach((j, d) => {
    operations.addProducts(layout.numbers + d * COLUMN_BYTES, size, high, low, layout.sums + d * 32);
    const tail = problem.tails?.[j];
    if (!tail) return;
    const sum = (layout.sums + d * 32) / 8 + 2;
    for (let i = 0; i < size; i++) f64[sum] = f64[sum]! + tail[row + i]! * f64[high / 8 + i]!;
  });
  operations.addProducts(layout.ones, size, high, low, total);
  operations.addProducts(layout.high, size, high, low, total + 32);
  plan.choices.forEach((_, c) => {
    operations.addByCode(layout.codes[c]!, size, high, low, layout.levelSums[c]!);
  });
}

function readSums(
  { kernel: { f64 }, plan, layout, slopes }: Pass,
  means: readonly DoubleDouble[],
  residuals: Float64Array,
): RowPass {
  const fourAt = (bytes: number): DoubleDouble => {
    const at = bytes / 8;
    const sum = add(twoSum(f64[at]!, f64[at + 1]!), fromNumber(f64[at + 2]!));
    return add(sum, fromNumber(f64[at + 3]!));
  };
  const sumOfResiduals = fourAt(layout.sums + plan.numbers.length * 32);
  const gradient = new Float64Array(slopes.length);
  const centred = (j: number, sum: DoubleDouble): number => subtract(sum, multiply(means[j]!, sumOfResiduals)).hi;
  plan.numbers.forEach((j, d) => {
    gradient[j] = centred(j, fourAt(layout.sums + d * 32));
  });
  plan.choices.forEach(({ levels }, c) => {
    for (const { column, code } of levels) {
      const at = layout.levelSums[c]! / 8 + 2 * code;
      gradient[column] = centred(column, twoSum(f64[at]!, f64[at + 1]!));
    }
  });
  const squares = fourAt(layout.sums + (plan.numbers.length + 1) * 32);
  return { residuals, residualSumOfSquares: squares.hi, gradient, sumOfResiduals };
}

/** residuals − δ₀ − Xδ for a step δ so small against the slopes that plain doubles carry it; one rounding of each residual. */
export function moveResiduals(
  columns: readonly Column[],
  residuals: Float64Array,
  step: Float64Array,
  interceptStep: number,
): Float64Array {
  const n = residuals.length;
  const plan = planDesign(columns, n);
  const change = new Float64Array(n).fill(interceptStep);
  for (const j of plan.numbers) {
    const values = columns[j] as Float64Array;
    const b = step[j]!;
    for (let i = 0; i < n; i++) change[i] = change[i]! + values[i]! * b;
  }
  for (const { codes, levels, size } of plan.choices) {
    const effects = new Float64Array(size);
    for (const { column, code } of levels) effects[code] = step[column]!;
    for (let i = 0; i < n; i++) change[i] = change[i]! + effects[codes[i]!]!;
  }
  for (let i = 0; i < n; i++) change[i] = residuals[i]! - change[i]!;
  return change;
}
