// Rows reduced to a triangle (Householder reflections of [R; tile], Demmel, Grigori, Hoemmen & Langou 2012, sequential TSQR),
// and squared lengths |T′z| per row. Columns lie COLUMN_STRIDE doubles apart; rows past the end of an odd tile hold zeros.
// `../plain/reduce.ts` does the same operations in the same order.
import { COLUMN_STRIDE } from "../layout";

const NEXT: usize = COLUMN_STRIDE * 8;

/** Replaces each x of a column by (x − high − low) · factor, and the row after an odd last one by 0. */
export function centreColumn(column: usize, rows: i32, high: f64, low: f64, factor: f64): void {
  const highs = f64x2.splat(high);
  const lows = f64x2.splat(low);
  const factors = f64x2.splat(factor);
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    const x = f64x2.sub(f64x2.sub(v128.load(column + at), highs), lows);
    v128.store(column + at, f64x2.mul(x, factors));
  }
  if (rows & 1) store<f64>(column + (<usize>rows << 3), 0);
}

/** Replaces each x of a column by x · factor of its row. */
export function scaleRows(column: usize, rows: i32, factors: usize): void {
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    v128.store(column + at, f64x2.mul(v128.load(column + at), v128.load(factors + at)));
  }
}

/**
 * Folds a tile (columns × rows) into the triangle r (columns × columns doubles, row by row, upper part): afterwards R′R has
 * grown by the tile's own cross-products. The tile is overwritten.
 */
export function foldTile(r: usize, tile: usize, columns: i32, rows: i32): void {
  const line = <usize>columns << 3;
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let j = 0; j < columns; j++) {
    const v = tile + <usize>j * NEXT;
    const row = r + <usize>j * line;
    const sigma = dot(v, v, bytes);
    if (sigma == 0) continue;
    const old = load<f64>(row + (<usize>j << 3));
    const length = Math.sqrt(old * old + sigma);
    const next = old > 0 ? -length : length;
    const head = old - next;
    const factor = 2 / (head * head + sigma);
    store<f64>(row + (<usize>j << 3), next);
    let l = j + 1;
    for (; l + 3 < columns; l += 4) reflect4(row + (<usize>l << 3), v, tile + <usize>l * NEXT, bytes, head, factor);
    for (; l < columns; l++) reflect1(row + (<usize>l << 3), v, tile + <usize>l * NEXT, bytes, head, factor);
  }
}

function dot(a: usize, b: usize, bytes: usize): f64 {
  let sum = f64x2.splat(0);
  for (let at: usize = 0; at < bytes; at += 16) {
    sum = f64x2.add(sum, f64x2.mul(v128.load(a + at), v128.load(b + at)));
  }
  return f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1);
}

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function share(top: usize, lanes: v128, head: f64, factor: f64): f64 {
  const old = load<f64>(top);
  const inner = old * head + (f64x2.extract_lane(lanes, 0) + f64x2.extract_lane(lanes, 1));
  const amount = inner * factor;
  store<f64>(top, old - amount * head);
  return amount;
}

function reflect1(top: usize, v: usize, target: usize, bytes: usize, head: f64, factor: f64): void {
  let sum = f64x2.splat(0);
  for (let at: usize = 0; at < bytes; at += 16) {
    sum = f64x2.add(sum, f64x2.mul(v128.load(v + at), v128.load(target + at)));
  }
  const amount = f64x2.splat(share(top, sum, head, factor));
  for (let at: usize = 0; at < bytes; at += 16) {
    v128.store(target + at, f64x2.sub(v128.load(target + at), f64x2.mul(v128.load(v + at), amount)));
  }
}

/** Four columns at once: the reflector is loaded once for all of them. */
function reflect4(top: usize, v: usize, target: usize, bytes: usize, head: f64, factor: f64): void {
  let sum0 = f64x2.splat(0);
  let sum1 = sum0;
  let sum2 = sum0;
  let sum3 = sum0;
  let t = target;
  const end = v + bytes;
  for (let at = v; at < end; at += 16, t += 16) {
    const x = v128.load(at);
    sum0 = f64x2.add(sum0, f64x2.mul(x, v128.load(t)));
    sum1 = f64x2.add(sum1, f64x2.mul(x, v128.load(t, NEXT)));
    sum2 = f64x2.add(sum2, f64x2.mul(x, v128.load(t, 2 * NEXT)));
    sum3 = f64x2.add(sum3, f64x2.mul(x, v128.load(t, 3 * NEXT)));
  }
  const amount0 = f64x2.splat(share(top, sum0, head, factor));
  const amount1 = f64x2.splat(share(top + 8, sum1, head, factor));
  const amount2 = f64x2.splat(share(top + 16, sum2, head, factor));
  const amount3 = f64x2.splat(share(top + 24, sum3, head, factor));
  t = target;
  for (let at = v; at < end; at += 16, t += 16) {
    const x = v128.load(at);
    v128.store(t, f64x2.sub(v128.load(t), f64x2.mul(x, amount0)));
    v128.store(t, f64x2.sub(v128.load(t, NEXT), f64x2.mul(x, amount1)), NEXT);
    v128.store(t, f64x2.sub(v128.load(t, 2 * NEXT), f64x2.mul(x, amount2)), 2 * NEXT);
    v128.store(t, f64x2.sub(v128.load(t, 3 * NEXT), f64x2.mul(x, amount3)), 3 * NEXT);
  }
}

/** out += |T′z|² per row: T is columns × columns doubles, row by row; z the columns from `first` on; rows in whole pairs. */
export function addSquaredForms(first: usize, columns: i32, rows: i32, t: usize, out: usize): void {
  const line = <usize>columns << 3;
  const bytes = <usize>((rows + 1) & ~1) << 3;
  const fours = bytes & ~63;
  for (let at: usize = 0; at < fours; at += 64) {
    let h0 = v128.load(out + at);
    let h1 = v128.load(out + at, 16);
    let h2 = v128.load(out + at, 32);
    let h3 = v128.load(out + at, 48);
    for (let b = 0; b < columns; b++) {
      let s0 = f64x2.splat(0);
      let s1 = s0;
      let s2 = s0;
      let s3 = s0;
      let z = first + at;
      let entry = t + (<usize>b << 3);
      for (let a = 0; a < columns; a++, z += NEXT, entry += line) {
        const factor = f64x2.splat(load<f64>(entry));
        s0 = f64x2.add(s0, f64x2.mul(factor, v128.load(z)));
        s1 = f64x2.add(s1, f64x2.mul(factor, v128.load(z, 16)));
        s2 = f64x2.add(s2, f64x2.mul(factor, v128.load(z, 32)));
        s3 = f64x2.add(s3, f64x2.mul(factor, v128.load(z, 48)));
      }
      h0 = f64x2.add(h0, f64x2.mul(s0, s0));
      h1 = f64x2.add(h1, f64x2.mul(s1, s1));
      h2 = f64x2.add(h2, f64x2.mul(s2, s2));
      h3 = f64x2.add(h3, f64x2.mul(s3, s3));
    }
    v128.store(out + at, h0);
    v128.store(out + at, h1, 16);
    v128.store(out + at, h2, 32);
    v128.store(out + at, h3, 48);
  }
  for (let at = fours; at < bytes; at += 16) {
    let h = v128.load(out + at);
    for (let b = 0; b < columns; b++) {
      let s = f64x2.splat(0);
      for (let a = 0; a < columns; a++) {
        const factor = f64x2.splat(load<f64>(t + <usize>a * line + (<usize>b << 3)));
        s = f64x2.add(s, f64x2.mul(factor, v128.load(first + <usize>a * NEXT + at)));
      }
      h = f64x2.add(h, f64x2.mul(s, s));
    }
    v128.store(out + at, h);
  }
}
