/**
 * Numbers carried as an unevaluated sum hi + lo of two doubles: about 32 digits.
 * twoSum: Knuth 1969 (Møller 1965); product by Dekker 1971 with Veltkamp's split (no fused multiply-add in JavaScript).
 * Products are exact while |a·b| stays between about 1e-290 and 1e300; callers scale by powers of two where that could matter.
 */

export interface DoubleDouble {
  readonly hi: number;
  readonly lo: number;
}

/** Veltkamp's constant for 53-bit doubles, 2^27 + 1. */
export const SPLITTER = 134217729;

/** a + b exactly: hi is the rounded sum, lo what rounding took. */
export function twoSum(a: number, b: number): DoubleDouble {
  const hi = a + b;
  const part = hi - a;
  return { hi, lo: a - (hi - part) + (b - part) };
}

/** a · b exactly: hi is the rounded product, lo what rounding took. */
export function twoProduct(a: number, b: number): DoubleDouble {
  const hi = a * b;
  const ta = SPLITTER * a;
  const ah = ta - (ta - a);
  const al = a - ah;
  const tb = SPLITTER * b;
  const bh = tb - (tb - b);
  const bl = b - bh;
  return { hi, lo: al * bl - (hi - ah * bh - al * bh - ah * bl) };
}

export function fromNumber(value: number): DoubleDouble {
  return { hi: value, lo: 0 };
}

function normalise(a: number, b: number): DoubleDouble {
  const hi = a + b;
  return { hi, lo: b - (hi - a) };
}

export function add(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const s = twoSum(a.hi, b.hi);
  const t = twoSum(a.lo, b.lo);
  const u = normalise(s.hi, s.lo + t.hi);
  return normalise(u.hi, u.lo + t.lo);
}

export function negate(a: DoubleDouble): DoubleDouble {
  return { hi: -a.hi, lo: -a.lo };
}

export function subtract(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  return add(a, negate(b));
}

export function multiply(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const p = twoProduct(a.hi, b.hi);
  return normalise(p.hi, p.lo + (a.hi * b.lo + a.lo * b.hi));
}

/** a / b by two corrections of the double quotient. */
export function divide(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const q1 = a.hi / b.hi;
  const r1 = subtract(a, multiply(b, fromNumber(q1)));
  const q2 = r1.hi / b.hi;
  const r2 = subtract(r1, multiply(b, fromNumber(q2)));
  return add(normalise(q1, q2), fromNumber(r2.hi / b.hi));
}

/** √a by one correction of the double root (Karp & Markstein 1997); 0 for 0. */
export function squareRoot(a: DoubleDouble): DoubleDouble {
  if (a.hi <= 0) return { hi: 0, lo: 0 };
  const root = Math.sqrt(a.hi);
  const rest = subtract(a, twoProduct(root, root));
  return normalise(root, rest.hi / (2 * root));
}

/** Σ values, accumulated in double-double. */
export function sum(values: ArrayLike<number>): DoubleDouble {
  let hi = 0;
  let lo = 0;
  for (let i = 0; i < values.length; i++) {
    const x = values[i]!;
    const s = hi + x;
    const part = s - hi;
    lo += hi - (s - part) + (x - part);
    hi = s;
  }
  return normalise(hi, lo);
}

/** Mean of the values in double-double; {0, 0} for no values. */
export function mean(values: ArrayLike<number>): DoubleDouble {
  if (values.length === 0) return { hi: 0, lo: 0 };
  return divide(sum(values), fromNumber(values.length));
}

/** Σ a_i b_i, every product exact (Ogita, Rump & Oishi 2005, Dot2). */
export function dot(a: ArrayLike<number>, b: ArrayLike<number>): DoubleDouble {
  let hi = 0;
  let lo = 0;
  for (let i = 0; i < a.length; i++) {
    const x = a[i]!;
    const y = b[i]!;
    const p = x * y;
    const tx = SPLITTER * x;
    const xh = tx - (tx - x);
    const xl = x - xh;
    const ty = SPLITTER * y;
    const yh = ty - (ty - y);
    const yl = y - yh;
    const s = hi + p;
    const part = s - hi;
    lo += hi - (s - part) + (p - part) + (xl * yl - (p - xh * yh - xl * yh - xh * yl));
    hi = s;
  }
  return normalise(hi, lo);
}
