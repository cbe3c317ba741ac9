/** Upper tails of the F, normal and chi-squared distributions, never as 1 − cdf (Abramowitz & Stegun 26.6.2, 26.4.4, 26.4.5). */
import betainc from "@stdlib/math-base-special-betainc";
import { tTwoSided } from "./studentT.ts";

/** P(F > f) with a and b degrees of freedom, f ≥ 0. */
export function fUpperTail(f: number, a: number, b: number): number {
  const share = (a * f) / (b + a * f);
  return share < 0.5 ? betainc(share, a / 2, b / 2, true, true) : betainc(b / (b + a * f), b / 2, a / 2, true, false);
}

/** From so many degrees of freedom on, Student's t is the normal distribution to the last digit for |t| below some 40. */
const NORMAL_DF = 1e20;

/** P(Z > z) of the normal distribution. */
export function normalUpperTail(z: number): number {
  const half = tTwoSided(z, NORMAL_DF) / 2;
  return z >= 0 ? half : 1 - half;
}

/**
 * P(χ² > x) with a whole number of degrees of freedom: e^(−x/2) or the two-sided normal tail, plus one positive term for
 * every two degrees of freedom more.
 */
export function chiSquaredUpperTail(x: number, df: number): number {
  if (x <= 0) return 1;
  const half = x / 2;
  const isEven = df % 2 === 0;
  let tail = isEven ? Math.exp(-half) : tTwoSided(Math.sqrt(x), NORMAL_DF);
  let term = isEven ? Math.exp(-half) : Math.exp(-half) / Math.sqrt(Math.PI * half);
  for (let a = isEven ? 1 : 0.5; a < df / 2; a++) {
    term *= half / a;
    tail += term;
  }
  return tail;
}
