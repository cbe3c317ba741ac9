// Residuals and what they have in common with the columns, in double-double, over one block of rows.
// A number is carried as high + low; products are exact by Dekker's split (1971), sums by TwoSum (Knuth 1969). Rows past the
// end of an odd block hold zeros. `../plain/refine.ts` does the same operations in the same order.

const SPLITTER: f64 = 134217729;

/** (high, low) −= x · (bh + bl), x the numbers of a column; bh = b1 + b2 is bh split. */
export function subtractProduct(
  column: usize,
  rows: i32,
  bh: f64,
  b1: f64,
  b2: f64,
  bl: f64,
  high: usize,
  low: usize,
): void {
  const splitter = f64x2.splat(SPLITTER);
  const whole = f64x2.splat(bh);
  const head = f64x2.splat(b1);
  const tail = f64x2.splat(b2);
  const rest = f64x2.splat(bl);
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    const v = v128.load(column + at);
    const p = f64x2.mul(v, whole);
    const t = f64x2.mul(splitter, v);
    const v1 = f64x2.sub(t, f64x2.sub(t, v));
    const v2 = f64x2.sub(v, v1);
    let e = f64x2.sub(p, f64x2.mul(v1, head));
    e = f64x2.sub(e, f64x2.mul(v2, head));
    e = f64x2.sub(e, f64x2.mul(v1, tail));
    e = f64x2.sub(f64x2.mul(v2, tail), e);
    e = f64x2.add(e, f64x2.mul(v, rest));
    const old = v128.load(high + at);
    const s = f64x2.sub(old, p);
    const part = f64x2.sub(s, old);
    const lost = f64x2.sub(f64x2.sub(old, f64x2.sub(s, part)), f64x2.add(p, part));
    v128.store(low + at, f64x2.sub(f64x2.add(v128.load(low + at), lost), e));
    v128.store(high + at, s);
  }
}

/** (high, low) −= the entry of each row's code: table holds high and low by turns. */
export function subtractTable(codes: usize, rows: i32, table: usize, high: usize, low: usize): void {
  for (let i: usize = 0; i < <usize>rows; i++) {
    const entry = table + (<usize>load<u16>(codes + (i << 1)) << 4);
    const x = load<f64>(entry);
    const at = i << 3;
    const old = load<f64>(high + at);
    const s = old - x;
    const part = s - old;
    store<f64>(low + at, load<f64>(low + at) + (old - (s - part) - (x + part)) - load<f64>(entry, 8));
    store<f64>(high + at, s);
  }
}

/** Makes high the rounded sum of both, low what rounding took. */
export function settle(rows: i32, high: usize, low: usize): void {
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    const h = v128.load(high + at);
    const l = v128.load(low + at);
    const s = f64x2.add(h, l);
    v128.store(low + at, f64x2.sub(l, f64x2.sub(s, h)));
    v128.store(high + at, s);
  }
}

/** (outHigh, outLow) = weight · (high + low). */
export function weightPairs(weights: usize, rows: i32, high: usize, low: usize, outHigh: usize, outLow: usize): void {
  const splitter = f64x2.splat(SPLITTER);
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    const v = v128.load(weights + at);
    const w = v128.load(high + at);
    const p = f64x2.mul(v, w);
    v128.store(outHigh + at, p);
    v128.store(outLow + at, f64x2.add(tailOfProduct(splitter, v, w, p), f64x2.mul(v, v128.load(low + at))));
  }
}

// @ts-ignore: decorators on functions belong to AssemblyScript
@inline
function tailOfProduct(splitter: v128, v: v128, w: v128, p: v128): v128 {
  const tv = f64x2.mul(splitter, v);
  const v1 = f64x2.sub(tv, f64x2.sub(tv, v));
  const v2 = f64x2.sub(v, v1);
  const tw = f64x2.mul(splitter, w);
  const w1 = f64x2.sub(tw, f64x2.sub(tw, w));
  const w2 = f64x2.sub(w, w1);
  let e = f64x2.sub(p, f64x2.mul(v1, w1));
  e = f64x2.sub(e, f64x2.mul(v2, w1));
  e = f64x2.sub(e, f64x2.mul(v1, w2));
  return f64x2.sub(f64x2.mul(v2, w2), e);
}

/** out += Σ x · (high + low): four doubles, high of even and odd rows, then low of both. */
export function addProducts(column: usize, rows: i32, high: usize, low: usize, out: usize): void {
  const splitter = f64x2.splat(SPLITTER);
  let sumHigh = v128.load(out);
  let sumLow = v128.load(out, 16);
  const bytes = <usize>((rows + 1) & ~1) << 3;
  for (let at: usize = 0; at < bytes; at += 16) {
    const v = v128.load(column + at);
    const w = v128.load(high + at);
    const p = f64x2.mul(v, w);
    const e = tailOfProduct(splitter, v, w, p);
    const s = f64x2.add(sumHigh, p);
    const part = f64x2.sub(s, sumHigh);
    const lost = f64x2.add(f64x2.sub(sumHigh, f64x2.sub(s, part)), f64x2.sub(p, part));
    sumLow = f64x2.add(sumLow, f64x2.add(f64x2.add(lost, e), f64x2.mul(v, v128.load(low + at))));
    sumHigh = s;
  }
  v128.store(out, sumHigh);
  v128.store(out, sumLow, 16);
}

/** out[code] += high + low of each row: high and low by turns. */
export function addByCode(codes: usize, rows: i32, high: usize, low: usize, out: usize): void {
  for (let i: usize = 0; i < <usize>rows; i++) {
    const entry = out + (<usize>load<u16>(codes + (i << 1)) << 4);
    const x = load<f64>(high + (i << 3));
    const old = load<f64>(entry);
    const s = old + x;
    const part = s - old;
    store<f64>(entry, load<f64>(entry, 8) + (old - (s - part) + (x - part) + load<f64>(low + (i << 3))), 8);
    store<f64>(entry, s);
  }
}
