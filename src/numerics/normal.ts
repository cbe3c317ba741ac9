/** The standard normal distribution by z² being chi-squared with one degree of freedom, so that far tails keep digits. */
import { chiSquaredCdf, chiSquaredQuantile, chiSquaredUpperQuantile, chiSquaredUpperTail } from "./chiSquared.ts";

/** P(Z > z). */
export function normalUpperTail(z: number): number {
  return z >= 0 ? chiSquaredUpperTail(z * z, 1) / 2 : 0.5 + chiSquaredCdf(z * z, 1) / 2;
}

/** P(Z ≤ z). */
export function normalCdf(z: number): number {
  return normalUpperTail(-z);
}

/** The z with P(Z > z) = tail. Between a quarter and a half, 1 − 2 tail is exact and small: it is the side to ask. */
export function normalUpperQuantile(tail: number): number {
  if (tail > 0.5) return -normalUpperQuantile(1 - tail);
  return Math.sqrt(tail < 0.25 ? chiSquaredUpperQuantile(2 * tail, 1) : chiSquaredQuantile(1 - 2 * tail, 1));
}

/** The z with P(Z ≤ z) = p. */
export function normalQuantile(p: number): number {
  return p > 0.5 ? normalUpperQuantile(1 - p) : -normalUpperQuantile(p);
}
