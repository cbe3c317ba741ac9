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
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  let s4 = 0;
  let s5 = 0;
  let s6 = 0;
  let s7 = 0;
  const end = at + rows;
  let i = at;
  for (; i + 8 <= end; i += 8) {
    s0 += f64[i]!;
    s1 += f64[i + 1]!;
    s2 += f64[i + 2]!;
    s3 += f64[i + 3]!;
    s4 += f64[i + 4]!;
    s5 += f64[i + 5]!;
    s6 += f64[i + 6]!;
    s7 += f64[i + 7]!;
  }
  let sum = s0 + s2 + (s4 + s6) + (s1 + s3 + (s5 + s7));
  for (; i < end; i++) sum += f64[i]!;
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
  const even = new Float64Array(CROSS_WIDTH * CROSS_WIDTH);
  const odd = new Float64Array(CROSS_WIDTH * CROSS_WIDTH);
  for (let start = 0; start < rows; start += TILE_ROWS) {
    const size = Math.min(TILE_ROWS, rows - start);
    for (let j = 0; j < columns; j += CROSS_WIDTH) {
      for (let k = 0; k <= j; k += CROSS_WIDTH) {
        const a = left + j * COLUMN_STRIDE + start;
        const b = right + k * COLUMN_STRIDE + start;
        sumLane(f64, a, b, size, even);
        sumLane(f64, a + 1, b + 1, size, odd);
        for (let at = 0; at < even.length; at++) {
          const to = (j + Math.floor(at / CROSS_WIDTH)) * columns + k + (at % CROSS_WIDTH);
          addCompensated(f64, high + to, low + to, even[at]! + odd[at]!);
        }
      }
    }
  }
}

/** The nine sums of products of three columns with three, over every second row. */
function sumLane(f64: Float64Array, a: number, b: number, size: number, out: Float64Array): void {
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s20 = 0;
  let s21 = 0;
  let s22 = 0;
  for (let i = 0; i < size; i += 2) {
    const a0 = f64[a + i]!;
    const a1 = f64[a + i + COLUMN_STRIDE]!;
    const a2 = f64[a + i + 2 * COLUMN_STRIDE]!;
    const b0 = f64[b + i]!;
    const b1 = f64[b + i + COLUMN_STRIDE]!;
    const b2 = f64[b + i + 2 * COLUMN_STRIDE]!;
    s00 += a0 * b0;
    s01 += a0 * b1;
    s02 += a0 * b2;
    s10 += a1 * b0;
    s11 += a1 * b1;
    s12 += a1 * b2;
    s20 += a2 * b0;
    s21 += a2 * b1;
    s22 += a2 * b2;
  }
  out[0] = s00;
  out[1] = s01;
  out[2] = s02;
  out[3] = s10;
  out[4] = s11;
  out[5] = s12;
  out[6] = s20;
  out[7] = s21;
  out[8] = s22;
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
