/**
 * The F distribution through the incomplete beta function (Abramowitz & Stegun 26.6.2), a = df1/2, b = df2/2,
 * X = af/(af + b): the continued fraction 26.5.8 taken on the side where it converges, times a power term whose two
 * logarithms are taken about the mean. Both tails are computed directly where they are small. df1, df2 > 0.
 */
import type { Tails } from "./incompleteGamma.ts";
import { logLessExcess, stirlingRemainder } from "./stirling.ts";
import { type PositiveLaw, tailQuantile } from "./tailQuantile.ts";

const TINY = 1e-300;

/** Xᵃ(1 − X)ᵇ / B(a, b): f times the density. */
function power(f: number, a: number, b: number): number {
  const below = a * f + b;
  const ofX = logLessExcess(((a + b) * f) / below, (b * (f - 1)) / below);
  const ofY = logLessExcess((a + b) / below, (a * (1 - f)) / below);
  const remainder = stirlingRemainder(a + b) - stirlingRemainder(a) - stirlingRemainder(b);
  return Math.sqrt((a / (a + b)) * (b / (2 * Math.PI))) * Math.exp(a * ofX + b * ofY + remainder);
}

function tails(f: number, a: number, b: number): Tails {
  if (f <= 0) return { lower: 0, upper: 1 };
  if (f === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const x = (a * f) / (a * f + b);
  const y = b / (a * f + b);
  if (x < (a + 1) / (a + b + 2)) {
    const lower = (power(f, a, b) / a) * fraction(x, a, b);
    return { lower, upper: 1 - lower };
  }
  const upper = (power(f, a, b) / b) * fraction(y, b, a);
  return { lower: 1 - upper, upper };
}

/** 1/(1 + d₁/(1 + d₂/(1 + …))) of 26.5.8, by the method of Lentz (1976). */
function fraction(x: number, a: number, b: number): number {
  let d = 0;
  let c = 1;
  let value = 1;
  for (let n = 1, change = 0; Math.abs(change - 1) > 2e-16 && n < 1e6; n++) {
    const m = n >> 1;
    const numerator =
      n % 2 === 0
        ? (m * (b - m) * x) / ((a + n - 1) * (a + n))
        : (-(a + m) * (a + b + m) * x) / ((a + n - 1) * (a + n));
    d = 1 / (1 + numerator * d || TINY);
    c = 1 + numerator / c || TINY;
    change = 1 / (c * d);
    value /= c * d;
  }
  return value;
}

function law(df1: number, df2: number): PositiveLaw {
  return { tails: (f) => tails(f, df1 / 2, df2 / 2), power: (f) => power(f, df1 / 2, df2 / 2) };
}

/** P(F > f). */
export function fUpperTail(f: number, df1: number, df2: number): number {
  return tails(f, df1 / 2, df2 / 2).upper;
}

/** P(F ≤ f). */
export function fCdf(f: number, df1: number, df2: number): number {
  return tails(f, df1 / 2, df2 / 2).lower;
}

/** The f with P(F ≤ f) = p. */
export function fQuantile(p: number, df1: number, df2: number): number {
  return tailQuantile(law(df1, df2), p, "lower", 1);
}

/** The f with P(F > f) = tail. */
export function fUpperQuantile(tail: number, df1: number, df2: number): number {
  return tailQuantile(law(df1, df2), tail, "upper", 1);
}
