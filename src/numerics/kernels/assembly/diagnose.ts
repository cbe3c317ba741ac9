// What one row says about a fit: squared lengths |T′z|² eight rows and three columns of T at a time, and the diagnostics that
// come from leverage and residual (Cook 1977; Belsley, Kuh & Welsch 1980). Columns lie COLUMN_STRIDE doubles apart; rows past
// the end are worked out too and not read. `../plain/diagnose.ts` does the same operations in the same order.
import { COLUMN_STRIDE } from "../layout";

const NEXT: usize = COLUMN_STRIDE * 8;
/** 1 − h below this is rounding: the row is the only one of its kind, and nothing can be said without it. */
const FULL_LEVERAGE: f64 = 1e-10;

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function fma(sum: v128, factor: v128, x: v128): v128 {
  return f64x2.add(sum, f64x2.mul(factor, x));
}

/**
 * out += |T′z|² per row, rows filled up to eights: T is columns × columns doubles row by row, columns filled up to threes;
 * upper = 1 where T has nothing below the diagonal, so that those products are left away.
 */
export function addSquaredLengths(first: usize, columns: i32, rows: i32, t: usize, upper: i32, out: usize): void {
  const line = <usize>columns << 3;
  const bytes = <usize>((rows + 7) & ~7) << 3;
  for (let at: usize = 0; at < bytes; at += 64) {
    let h0 = v128.load(out + at);
    let h1 = v128.load(out + at, 16);
    let h2 = v128.load(out + at, 32);
    let h3 = v128.load(out + at, 48);
    for (let b = 0; b < columns; b += 3) {
      const last = upper == 1 ? b + 3 : columns;
      let z = first + at;
      let entry = t + (<usize>b << 3);
      let p0 = f64x2.splat(0);
      let p1 = p0;
      let p2 = p0;
      let p3 = p0;
      let q0 = p0;
      let q1 = p0;
      let q2 = p0;
      let q3 = p0;
      let r0 = p0;
      let r1 = p0;
      let r2 = p0;
      let r3 = p0;
      for (let a = 0; a < last; a++, z += NEXT, entry += line) {
        const p = v128.load64_splat(entry);
        const q = v128.load64_splat(entry, 8);
        const r = v128.load64_splat(entry, 16);
        const z0 = v128.load(z);
        p0 = fma(p0, p, z0);
        q0 = fma(q0, q, z0);
        r0 = fma(r0, r, z0);
        const z1 = v128.load(z, 16);
        p1 = fma(p1, p, z1);
        q1 = fma(q1, q, z1);
        r1 = fma(r1, r, z1);
        const z2 = v128.load(z, 32);
        p2 = fma(p2, p, z2);
        q2 = fma(q2, q, z2);
        r2 = fma(r2, r, z2);
        const z3 = v128.load(z, 48);
        p3 = fma(p3, p, z3);
        q3 = fma(q3, q, z3);
        r3 = fma(r3, r, z3);
      }
      h0 = fma(fma(fma(h0, p0, p0), q0, q0), r0, r0);
      h1 = fma(fma(fma(h1, p1, p1), q1, q1), r1, r1);
      h2 = fma(fma(fma(h2, p2, p2), q2, q2), r2, r2);
      h3 = fma(fma(fma(h3, p3, p3), q3, q3), r3, r3);
    }
    v128.store(out + at, h0);
    v128.store(out + at, h1, 16);
    v128.store(out + at, h2, 32);
    v128.store(out + at, h3, 48);
  }
}

/**
 * From residuals e, responses y, roots √w and lengths 1/W + |T′d|², per row and one column of `out` each: fitted, leverage h,
 * internally and externally studentised residual, Cook's distance, DFFITS, and the price without the row, y − e/(1 − h).
 * `freedom` is the residual degrees of freedom less one; NaN where nothing is left without a row.
 */
export function diagnoseRows(
  e: usize,
  y: usize,
  roots: usize,
  lengths: usize,
  rows: i32,
  s: f64,
  freedom: f64,
  rank: f64,
  out: usize,
): void {
  const bytes = <usize>((rows + 1) & ~1) << 3;
  const one = f64x2.splat(1);
  const zero = f64x2.splat(0);
  const nothing = f64x2.splat(NaN);
  const limit = f64x2.splat(FULL_LEVERAGE);
  const spread = f64x2.splat(s);
  const less = f64x2.splat(freedom);
  const df = f64x2.splat(freedom + 1);
  const count = f64x2.splat(rank);
  for (let at: usize = 0; at < bytes; at += 16) {
    const residual = v128.load(e + at);
    const response = v128.load(y + at);
    const root = v128.load(roots + at);
    const h = f64x2.mul(f64x2.mul(root, root), v128.load(lengths + at));
    const rest = f64x2.sub(one, h);
    const gap = v128.bitselect(rest, nothing, f64x2.gt(rest, limit));
    const rootGap = f64x2.sqrt(gap);
    const r = f64x2.div(f64x2.mul(root, residual), f64x2.mul(spread, rootGap));
    const square = f64x2.mul(r, r);
    const left = f64x2.max(zero, f64x2.sub(df, square));
    const t = f64x2.mul(r, f64x2.sqrt(f64x2.div(less, left)));
    const ratio = f64x2.div(h, gap);
    v128.store(out + at, f64x2.sub(response, residual));
    v128.store(out + at, h, NEXT);
    v128.store(out + at, r, 2 * NEXT);
    v128.store(out + at, t, 3 * NEXT);
    v128.store(out + at, f64x2.div(f64x2.mul(square, ratio), count), 4 * NEXT);
    v128.store(out + at, f64x2.mul(t, f64x2.sqrt(ratio)), 5 * NEXT);
    v128.store(out + at, f64x2.sub(response, f64x2.div(residual, gap)), 6 * NEXT);
  }
}
