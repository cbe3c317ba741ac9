/**
 * The operations of `../assembly/moments.ts` in TypeScript: even and odd rows are summed apart like the two lanes there, and
 * every addition comes in the same order. What each operation does, and how a block lies in memory, is said there.
 */
import { COLUMN_STRIDE, CROSS_WIDTH, GROUP_WIDTH, TILE_ROWS } from "../layout.ts";
import type { PlainMemory } from "./plainMemory.ts";

export interface MomentOperations {
  rangeOfColumn(column: number, rows: number, out: number): void;
  shiftColumn(column: number, rows: number, shift: number, factor: number): number;
  weightColumn(column: number, weights: number, rows: number, out: number): number;
  crossProducts(left: number, right: number, columns: number, rows: number, high: number, low: number): void;
  groupSums(codes: number, groups: number, first: number, columns: number, rows: number, out: number): void;
  pairSums(codesA: number, codesB: number, groupsB: number, weights: number, rows: number, out: number): void;
}

export function momentOperations(memory: PlainMemory): MomentOperations {
  return {
    rangeOfColumn: (column, rows, out) => rangeOfColumn(memory.f64, column / 8, rows, out / 8),
    shiftColumn: (column, rows, shift, factor) => shiftColumn(memory.f64, column / 8, rows, shift, factor),
    weightColumn: (column, weights, rows, out) => weightColumn(memory.f64, column / 8, weights / 8, rows, out / 8),
    crossProducts: (left, right, columns, rows, high, low) =>
      crossProducts(memory.f64, left / 8, right / 8, columns, rows, high / 8, low / 8),
    groupSums: (codes, groups, first, columns, rows, out) =>
      groupSums(memory, codes / 2, groups, first / 8, columns, rows, out / 8),
    pairSums: (codesA, codesB, groupsB, weights, rows, out) =>
      pairSums(memory, codesA / 2, codesB / 2, groupsB, weights / 8, rows, out / 8),
  };
}

/** Sum of `rows` doubles: eight running sums for whole eights of rows, added up in pairs, then the rest one by one. */
function sumOf(f64: Float64Array, at: number, rows: number): number {
  const sums = new Float64Array(8);
  const whole = rows - (rows % 8);
  for (let i = 0; i < whole; i++) sums[i % 8] = sums[i % 8]! + f64[at + i]!;
  const lane = (l: number): number => sums[l]! + sums[2 + l]! + (sums[4 + l]! + sums[6 + l]!);
  let sum = lane(0) + lane(1);
  for (let i = whole; i < rows; i++) sum += f64[at + i]!;
  return sum;
}

function rangeOfColumn(f64: Float64Array, column: number, rows: number, out: number): void {
  let least = Number.POSITIVE_INFINITY;
  let largest = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < rows; i++) {
    const x = f64[column + i]!;
    if (x < least) least = x;
    if (largest < x) largest = x;
  }
  f64[out] = sumOf(f64, column, rows);
  f64[out + 1] = least;
  f64[out + 2] = largest;
}

function shiftColumn(f64: Float64Array, column: number, rows: number, shift: number, factor: number): number {
  for (let i = 0; i < rows; i++) f64[column + i] = (f64[column + i]! - shift) * factor;
  if (rows % 2 === 1) f64[column + rows] = 0;
  return sumOf(f64, column, rows);
}

function weightColumn(f64: Float64Array, column: number, weights: number, rows: number, out: number): number {
  for (let i = 0; i < rows; i++) f64[out + i] = f64[column + i]! * f64[weights + i]!;
  if (rows % 2 === 1) f64[out + rows] = 0;
  return sumOf(f64, out, rows);
}

function crossProducts(
  f64: Float64Array,
  left: number,
  right: number,
  columns: number,
  rows: number,
  high: number,
  low: number,
): void {
  for (let start = 0; start < rows; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, rows - start);
    for (let j = 0; j < columns; j++) {
      const end = Math.floor(j / CROSS_WIDTH) * CROSS_WIDTH + CROSS_WIDTH;
      for (let k = 0; k < end; k++) {
        const x = lanesDot(f64, left + j * COLUMN_STRIDE + start, right + k * COLUMN_STRIDE + start, size);
        addCompensated(f64, high + j * columns + k, low + j * columns + k, x);
      }
    }
  }
}

function lanesDot(f64: Float64Array, left: number, right: number, size: number): number {
  let even = 0;
  let odd = 0;
  for (let i = 0; i < size; i += 2) {
    even += f64[left + i]! * f64[right + i]!;
    odd += f64[left + i + 1]! * f64[right + i + 1]!;
  }
  return even + odd;
}

/** Adds x to the sum high + low (TwoSum: Knuth 1969). */
function addCompensated(f64: Float64Array, high: number, low: number, x: number): void {
  const old = f64[high]!;
  const s = old + x;
  const part = s - old;
  f64[low] = f64[low]! + (old - (s - part) + (x - part));
  f64[high] = s;
}

function groupSums(
  { f64, u16 }: PlainMemory,
  codes: number,
  groups: number,
  first: number,
  columns: number,
  rows: number,
  out: number,
): void {
  for (let j = 0; j < columns; j += GROUP_WIDTH) {
    for (let i = 0; i < rows; i++) {
      const line = out + ((i % 2) * groups + u16[codes + i]!) * columns + j;
      for (let c = 0; c < GROUP_WIDTH; c++) f64[line + c] = f64[line + c]! + f64[first + (j + c) * COLUMN_STRIDE + i]!;
    }
  }
}

function pairSums(
  { f64, u16 }: PlainMemory,
  codesA: number,
  codesB: number,
  groupsB: number,
  weights: number,
  rows: number,
  out: number,
): void {
  for (let i = 0; i < rows; i++) {
    const at = out + u16[codesA + i]! * groupsB + u16[codesB + i]!;
    f64[at] = f64[at]! + f64[weights + i]!;
  }
}
