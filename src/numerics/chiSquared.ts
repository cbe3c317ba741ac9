/** The chi-squared distribution, both tails computed directly (Abramowitz & Stegun 26.4.19). df > 0. */
import { gammaPower, incompleteGamma } from "./incompleteGamma.ts";
import { type PositiveLaw, tailQuantile } from "./tailQuantile.ts";

function law(df: number): PositiveLaw {
  return { tails: (x) => incompleteGamma(df / 2, x / 2), power: (x) => gammaPower(df / 2, x / 2) };
}

/** P(X > x). */
export function chiSquaredUpperTail(x: number, df: number): number {
  return incompleteGamma(df / 2, x / 2).upper;
}

/** P(X ≤ x). */
export function chiSquaredCdf(x: number, df: number): number {
  return incompleteGamma(df / 2, x / 2).lower;
}

/** The x with P(X ≤ x) = p. */
export function chiSquaredQuantile(p: number, df: number): number {
  return tailQuantile(law(df), p, "lower", df);
}

/** The x with P(X > x) = tail; asked by the tail, since 1 − tail would lose the digits of a small one. */
export function chiSquaredUpperQuantile(tail: number, df: number): number {
  return tailQuantile(law(df), tail, "upper", df);
}
