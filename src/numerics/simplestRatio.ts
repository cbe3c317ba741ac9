/** The ratio of whole numbers with the smallest denominator that lies within a relative tolerance of a value. */

export interface Ratio {
  readonly numerator: number;
  readonly denominator: number;
}

/** Largest denominator looked at: covers twelfths, per mille and conversion factors of four decimals. */
const LARGEST_DENOMINATOR = 10_000;

/** By continued fractions (Khinchin 1964, ch. 2). Null when no denominator up to 10,000 comes near enough. 1.36 → 34/25. */
export function simplestRatio(value: number, relativeTolerance: number): Ratio | null {
  if (!Number.isFinite(value) || Math.abs(value) > 1e12) return null;
  let [p0, q0, p1, q1] = [0, 1, 1, 0];
  let rest = Math.abs(value);
  for (let depth = 0; depth < 40; depth++) {
    const whole = Math.floor(rest + 1e-12 * Math.max(1, rest));
    [p0, q0, p1, q1] = [p1, q1, whole * p1 + p0, whole * q1 + q0];
    if (q1 > LARGEST_DENOMINATOR) return null;
    if (Math.abs(p1 / q1 - Math.abs(value)) <= relativeTolerance * Math.abs(value)) {
      return { numerator: value < 0 ? -p1 : p1, denominator: q1 };
    }
    const fraction = rest - whole;
    if (fraction <= 0) return null;
    rest = 1 / fraction;
  }
  return null;
}
