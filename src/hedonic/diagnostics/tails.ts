/**
 * Are the residuals normal in their tails? A² of the standardised residuals (Anderson & Darling 1952), times 1 + 0.75/n + 2.25/n²
 * with mean and variance estimated, and its p by the formulas of Stephens (in D'Agostino & Stephens 1986, table 4.9; from memory).
 * Residuals of a fit are taken as a sample, which holds for many more sales than coefficients.
 */
import { normalUpperTail } from "../../numerics/normal.ts";
import { type Diagnostic, SMALL_SHARE, verdictOf } from "./diagnostic.ts";

export const tails: Diagnostic = {
  code: "tails",
  label: "Normal tails",
  needs: 8,
  underWeights: false,
  run: ({ solution: { residuals } }) => {
    const statistic = andersonDarling(residuals);
    const p = andersonDarlingTail(statistic);
    return {
      statistic,
      df: [],
      p,
      // A²/n is the mean weighted square of the distance between the two distributions.
      verdict: verdictOf(p, statistic < SMALL_SHARE * residuals.length),
      sentence:
        p < 0.05
          ? "Very small and very large distances from the model are more, or fewer, than a normal distribution has."
          : "Distances from the model follow a normal distribution into the tails.",
      whatToDo:
        p < 0.05
          ? "Prefer the range that needs no distribution for the price of one sale; ranges at 95 % and more rest on the tails most."
          : "Nothing.",
      source: "Anderson & Darling 1952; D'Agostino & Stephens 1986",
    };
  },
};

/**
 * With each value's place from below and from above: A² = −n − Σ((2i − 1)ln Φ(z_i) + (2(n − i) + 1)ln(1 − Φ(z_i)))/n, i from 1,
 * z the values about their own mean over their standard deviation (n − 1); times 1 + 0.75/n + 2.25/n².
 */
export function andersonDarling(values: Float64Array): number {
  const n = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const spread = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1));
  const z = values.map((value) => (value - mean) / spread).sort();
  let sum = 0;
  z.forEach((one, i) => {
    // The smaller of the two tails; past where it is no longer a double, the smallest one.
    const tail = Math.max(normalUpperTail(Math.abs(one)), Number.MIN_VALUE);
    const [below, above] = one < 0 ? [Math.log(tail), Math.log1p(-tail)] : [Math.log1p(-tail), Math.log(tail)];
    sum += (2 * i + 1) * below + (2 * (n - i) - 1) * above;
  });
  return (-n - sum / n) * (1 + 0.75 / n + 2.25 / n ** 2);
}

export function andersonDarlingTail(a: number): number {
  if (a < 0.2) return -Math.expm1(-13.436 + 101.14 * a - 223.73 * a * a);
  if (a < 0.34) return -Math.expm1(-8.318 + 42.796 * a - 59.938 * a * a);
  if (a < 0.6) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a);
  // The last formula turns up again from about 150 on; beyond 10 there is nothing left to tell apart.
  return Math.exp(1.2937 - 5.709 * Math.min(a, 10) + 0.0186 * Math.min(a, 10) ** 2);
}
