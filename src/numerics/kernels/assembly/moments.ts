// Sums over one block of rows, in AssemblyScript with 128-bit SIMD (two doubles, "lanes", at a time).
// A block lies column by column: column j starts COLUMN_STRIDE doubles after column j − 1, so that one pointer and constant
// offsets reach its neighbours. Even rows go to lane 0, odd rows to lane 1; rows past the end of an odd block hold zeros.
// Products are multiplied, rounded, then added: no fused operation, so every machine gives the same bits.
// `../plain/moments.ts` does the same operations in the same order; both are compared bit for bit.
import { COLUMN_STRIDE, CROSS_WIDTH, GROUP_WIDTH, TILE_ROWS } from "../layout";

const NEXT: usize = COLUMN_STRIDE * 8;
const NEXT2: usize = NEXT * 2;
const NEXT3: usize = NEXT * 3;

/**
 * Writes sum, least and largest value of a column to `out`. Eight running sums; the sum alone tells of values that are not
 * finite, so that the two others may use the plain comparisons of one instruction.
 */
export function rangeOfColumn(column: usize, rows: i32, out: usize): void {
  let sum0 = f64x2.splat(0);
  let sum1 = f64x2.splat(0);
  let sum2 = f64x2.splat(0);
  let sum3 = f64x2.splat(0);
  let least = f64x2.splat(Infinity);
  let largest = f64x2.splat(-Infinity);
  let at = column;
  const whole = column + (<usize>(rows & ~7) << 3);
  for (; at < whole; at += 64) {
    const a = v128.load(at);
    const b = v128.load(at, 16);
    const c = v128.load(at, 32);
    const d = v128.load(at, 48);
    sum0 = f64x2.add(sum0, a);
    sum1 = f64x2.add(sum1, b);
    sum2 = f64x2.add(sum2, c);
    sum3 = f64x2.add(sum3, d);
    least = f64x2.pmin(least, f64x2.pmin(f64x2.pmin(a, b), f64x2.pmin(c, d)));
    largest = f64x2.pmax(largest, f64x2.pmax(f64x2.pmax(a, b), f64x2.pmax(c, d)));
  }
  let sum = sumOfLanes(sum0, sum1, sum2, sum3);
  let low = smaller(f64x2.extract_lane(least, 0), f64x2.extract_lane(least, 1));
  let high = larger(f64x2.extract_lane(largest, 0), f64x2.extract_lane(largest, 1));
  const end = column + (<usize>rows << 3);
  for (; at < end; at += 8) {
    const x = load<f64>(at);
    sum += x;
    low = smaller(low, x);
    high = larger(high, x);
  }
  store<f64>(out, sum);
  store<f64>(out, low, 8);
  store<f64>(out, high, 16);
}

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function smaller(a: f64, b: f64): f64 {
  return b < a ? b : a;
}

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function larger(a: f64, b: f64): f64 {
  return a < b ? b : a;
}

/** Replaces each x of a column by (x − shift) · factor, and the row after an odd last one by 0; gives back the sum. */
export function shiftColumn(column: usize, rows: i32, shift: f64, factor: f64): f64 {
  const shifts = f64x2.splat(shift);
  const factors = f64x2.splat(factor);
  let sum0 = f64x2.splat(0);
  let sum1 = sum0;
  let sum2 = sum0;
  let sum3 = sum0;
  let at = column;
  const whole = column + (<usize>(rows & ~7) << 3);
  for (; at < whole; at += 64) {
    const a = f64x2.mul(f64x2.sub(v128.load(at), shifts), factors);
    const b = f64x2.mul(f64x2.sub(v128.load(at, 16), shifts), factors);
    const c = f64x2.mul(f64x2.sub(v128.load(at, 32), shifts), factors);
    const d = f64x2.mul(f64x2.sub(v128.load(at, 48), shifts), factors);
    v128.store(at, a);
    v128.store(at, b, 16);
    v128.store(at, c, 32);
    v128.store(at, d, 48);
    sum0 = f64x2.add(sum0, a);
    sum1 = f64x2.add(sum1, b);
    sum2 = f64x2.add(sum2, c);
    sum3 = f64x2.add(sum3, d);
  }
  let sum = sumOfLanes(sum0, sum1, sum2, sum3);
  const end = column + (<usize>rows << 3);
  for (; at < end; at += 8) {
    const z = (load<f64>(at) - shift) * factor;
    store<f64>(at, z);
    sum += z;
  }
  if (rows & 1) store<f64>(end, 0);
  return sum;
}

/** Writes w · z to `out` for the rows of a column, and 0 after an odd last one; gives back the sum. */
export function weightColumn(column: usize, weights: usize, rows: i32, out: usize): f64 {
  let sum0 = f64x2.splat(0);
  let sum1 = sum0;
  let sum2 = sum0;
  let sum3 = sum0;
  let at: usize = 0;
  const whole = <usize>(rows & ~7) << 3;
  for (; at < whole; at += 64) {
    const a = f64x2.mul(v128.load(column + at), v128.load(weights + at));
    const b = f64x2.mul(v128.load(column + at, 16), v128.load(weights + at, 16));
    const c = f64x2.mul(v128.load(column + at, 32), v128.load(weights + at, 32));
    const d = f64x2.mul(v128.load(column + at, 48), v128.load(weights + at, 48));
    v128.store(out + at, a);
    v128.store(out + at, b, 16);
    v128.store(out + at, c, 32);
    v128.store(out + at, d, 48);
    sum0 = f64x2.add(sum0, a);
    sum1 = f64x2.add(sum1, b);
    sum2 = f64x2.add(sum2, c);
    sum3 = f64x2.add(sum3, d);
  }
  let sum = sumOfLanes(sum0, sum1, sum2, sum3);
  const end = <usize>rows << 3;
  for (; at < end; at += 8) {
    const z = load<f64>(column + at) * load<f64>(weights + at);
    store<f64>(out + at, z);
    sum += z;
  }
  if (rows & 1) store<f64>(out + end, 0);
  return sum;
}

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function sumOfLanes(sum0: v128, sum1: v128, sum2: v128, sum3: v128): f64 {
  const sums = f64x2.add(f64x2.add(sum0, sum1), f64x2.add(sum2, sum3));
  return f64x2.extract_lane(sums, 0) + f64x2.extract_lane(sums, 1);
}

/**
 * Adds Σ_i left_ij · right_ik, j ≥ k, to high + low (columns × columns doubles each), block by block of 3 × 3 and tile by tile.
 * `columns` is a multiple of 3; entries above the diagonal blocks stay as they are.
 */
export function crossProducts(left: usize, right: usize, columns: i32, rows: i32, high: usize, low: usize): void {
  const width: usize = CROSS_WIDTH * NEXT;
  const line = <usize>columns << 3;
  for (let start = 0; start < rows; start += TILE_ROWS) {
    const bytes = <usize>min(TILE_ROWS, rows - start) << 3;
    const offset = <usize>start << 3;
    let a = left + offset;
    for (let j = 0; j < columns; j += CROSS_WIDTH, a += width) {
      let b = right + offset;
      for (let k = 0; k <= j; k += CROSS_WIDTH, b += width) {
        const at = <usize>j * line + (<usize>k << 3);
        crossBlock(a, b, bytes, high + at, low + at, line);
      }
    }
  }
}

function crossBlock(left: usize, right: usize, bytes: usize, high: usize, low: usize, line: usize): void {
  let s00 = f64x2.splat(0);
  let s01 = s00;
  let s02 = s00;
  let s10 = s00;
  let s11 = s00;
  let s12 = s00;
  let s20 = s00;
  let s21 = s00;
  let s22 = s00;
  const end = left + bytes;
  let b = right;
  for (let a = left; a < end; a += 16, b += 16) {
    const b0 = v128.load(b);
    const b1 = v128.load(b, NEXT);
    const b2 = v128.load(b, NEXT2);
    const a0 = v128.load(a);
    s00 = f64x2.add(s00, f64x2.mul(a0, b0));
    s01 = f64x2.add(s01, f64x2.mul(a0, b1));
    s02 = f64x2.add(s02, f64x2.mul(a0, b2));
    const a1 = v128.load(a, NEXT);
    s10 = f64x2.add(s10, f64x2.mul(a1, b0));
    s11 = f64x2.add(s11, f64x2.mul(a1, b1));
    s12 = f64x2.add(s12, f64x2.mul(a1, b2));
    const a2 = v128.load(a, NEXT2);
    s20 = f64x2.add(s20, f64x2.mul(a2, b0));
    s21 = f64x2.add(s21, f64x2.mul(a2, b1));
    s22 = f64x2.add(s22, f64x2.mul(a2, b2));
  }
  addLanes(high, low, s00);
  addLanes(high + 8, low + 8, s01);
  addLanes(high + 16, low + 16, s02);
  addLanes(high + line, low + line, s10);
  addLanes(high + line + 8, low + line + 8, s11);
  addLanes(high + line + 16, low + line + 16, s12);
  addLanes(high + 2 * line, low + 2 * line, s20);
  addLanes(high + 2 * line + 8, low + 2 * line + 8, s21);
  addLanes(high + 2 * line + 16, low + 2 * line + 16, s22);
}

/** Adds both lanes to the sum high + low (TwoSum: Knuth 1969). */
// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function addLanes(high: usize, low: usize, lanes: v128): void {
  const x = f64x2.extract_lane(lanes, 0) + f64x2.extract_lane(lanes, 1);
  const old = load<f64>(high);
  const s = old + x;
  const part = s - old;
  store<f64>(low, load<f64>(low) + (old - (s - part) + (x - part)));
  store<f64>(high, s);
}

/**
 * Sums of the columns by group: out is (2 · groups) × columns doubles, first the sums of the even rows, then of the odd rows,
 * so that two neighbouring rows of one group do not wait for each other. `columns` is a multiple of 4.
 */
export function groupSums(
  codes: usize,
  groups: i32,
  first: usize,
  columns: i32,
  rows: i32,
  out: usize,
): void {
  const line = <usize>columns << 3;
  const odd = <usize>groups * line;
  const pairs = rows >> 1;
  let column = first;
  let target = out;
  for (let j = 0; j < columns; j += GROUP_WIDTH, column += GROUP_WIDTH * NEXT, target += GROUP_WIDTH * 8) {
    let at = column;
    let code = codes;
    for (let i = 0; i < pairs; i++, at += 16, code += 4) {
      const x0 = v128.load(at);
      const x1 = v128.load(at, NEXT);
      const x2 = v128.load(at, NEXT2);
      const x3 = v128.load(at, NEXT3);
      const even = target + <usize>load<u16>(code) * line;
      v128.store(even, f64x2.add(v128.load(even), v128.shuffle<f64>(x0, x1, 0, 2)));
      v128.store(even, f64x2.add(v128.load(even, 16), v128.shuffle<f64>(x2, x3, 0, 2)), 16);
      const other = target + odd + <usize>load<u16>(code, 2) * line;
      v128.store(other, f64x2.add(v128.load(other), v128.shuffle<f64>(x0, x1, 1, 3)));
      v128.store(other, f64x2.add(v128.load(other, 16), v128.shuffle<f64>(x2, x3, 1, 3)), 16);
    }
    if (rows & 1) {
      const even = target + <usize>load<u16>(code) * line;
      store<f64>(even, load<f64>(even) + load<f64>(at));
      store<f64>(even, load<f64>(even, 8) + load<f64>(at, NEXT), 8);
      store<f64>(even, load<f64>(even, 16) + load<f64>(at, NEXT2), 16);
      store<f64>(even, load<f64>(even, 24) + load<f64>(at, NEXT3), 24);
    }
  }
}

/** Adds each row's weight to the cell (a, b) of its two codes: out is groupsA × groupsB doubles. */
export function pairSums(codesA: usize, codesB: usize, groupsB: i32, weights: usize, rows: i32, out: usize): void {
  for (let i: usize = 0; i < <usize>rows; i++) {
    const cell = <usize>load<u16>(codesA + (i << 1)) * <usize>groupsB + <usize>load<u16>(codesB + (i << 1));
    const at = out + (cell << 3);
    store<f64>(at, load<f64>(at) + load<f64>(weights + (i << 3)));
  }
}
