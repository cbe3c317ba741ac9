/**
 * The regularised incomplete gamma functions P(a, x) and Q(a, x) = 1 − P(a, x), each computed directly where it is the
 * smaller: series below the mean, continued fraction above it (Abramowitz & Stegun 6.5.29, 6.5.31).
 */
import { logLessExcess, stirlingRemainder } from "./stirling.ts";

const TINY = 1e-300;
const CLOSE = 1e-16;

export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

/** xᵃ e⁻ˣ / Γ(a): x times the density. */
export function gammaPower(a: number, x: number): number {
  const scale = Math.sqrt(a / (2 * Math.PI));
  return scale * Math.exp(a * logLessExcess(x / a, (x - a) / a) - stirlingRemainder(a));
}

/** P(a, x) and Q(a, x) for a > 0, x ≥ 0. */
export function incompleteGamma(a: number, x: number): Tails {
  if (x <= 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const power = gammaPower(a, x);
  if (x < a + 1) {
    const lower = (power / a) * risingSeries(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = power / fraction(a, x);
  return { lower: 1 - upper, upper };
}

/** Σ xⁿ / ((a + 1) … (a + n)). */
function risingSeries(a: number, x: number): number {
  let sum = 1;
  let term = 1;
  for (let n = 1; term > CLOSE * sum; n++) {
    term *= x / (a + n);
    sum += term;
  }
  return sum;
}

/** x + 1 − a − 1(1 − a)/(x + 3 − a − 2(2 − a)/(x + 5 − a − …)), by the method of Lentz (1976). */
function fraction(a: number, x: number): number {
  let b = x + 1 - a;
  let value = b || TINY;
  let c = value;
  let d = 0;
  for (let n = 1, change = 0; Math.abs(change - 1) > 2 * CLOSE && n < 1e6; n++) {
    const numerator = n * (a - n);
    b += 2;
    d = 1 / (b + numerator * d || TINY);
    c = b + numerator / c || TINY;
    change = c * d;
    value *= change;
  }
  return value;
}
