/** Where a positive quantity's tail has a given size: Newton on ln(tail) over ln(x), kept inside a shrinking bracket. */
import type { Tails } from "./incompleteGamma.ts";

/** A distribution on x > 0: its tails, and x times its density. */
export interface PositiveLaw {
  tails(x: number): Tails;
  power(x: number): number;
}

/** The x whose lower (upper) tail is p, 0 < p < 1; p = 0 and 1 give the ends; NaN for any other p. start > 0. */
export function tailQuantile(law: PositiveLaw, p: number, side: keyof Tails, start: number): number {
  if (!(p >= 0 && p <= 1)) return Number.NaN;
  if (p === 0 || p === 1) return (p === 0) === (side === "lower") ? 0 : Number.POSITIVE_INFINITY;
  const sign = side === "lower" ? 1 : -1;
  let low = Number.MIN_VALUE;
  let high = Number.MAX_VALUE;
  let x = start;
  for (let step = 0; step < 200; step++) {
    const tail = law.tails(x)[side];
    const excess = Math.log(tail / p) * sign;
    if (excess === 0) return x;
    if (excess > 0) high = x;
    else low = x;
    const newton = x * Math.exp((-excess * tail) / law.power(x));
    const next = newton > low && newton < high ? newton : Math.sqrt(low) * Math.sqrt(high);
    if (Math.abs(next - x) <= 4e-16 * x) return next;
    x = next;
  }
  return x;
}
