/**
 * Are the residuals normal in their tails? A² of the standardised residuals (Anderson & Darling 1952), times 1 + 0.75/n + 2.25/n²
 * with mean and variance estimated, and its p by the formulas of Stephens (in D'Agostino & Stephens 1986, table 4.9; from memory).
 * Residuals of a fit are taken as a sample, which holds for many more sales than coefficients.
 */
import { normalUpperTail } from "../../numerics/testTails.ts";
import { type Diagnostic, verdictOf } from "./diagnostic.ts";

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
      verdict: verdictOf(p),
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

/** A²·(1 + 0.75/n + 2.25/n²) of the values about their own mean and standard deviation (n − 1). */
export function andersonDarling(values: Float64Array): number {
  const n = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const spread = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1));
  const z = values.map((value) => (value - mean) / spread).sort();
  let sum = 0;
  for (let i = 0; i < n; i++) sum += (2 * i + 1) * (lnUpper(-z[i]!) + lnUpper(z[n - 1 - i]!));
  return (-n - sum / n) * (1 + 0.75 / n + 2.25 / n ** 2);
}

/** ln P(Z > z); past where the tail is no longer a double, ln of the smallest one. */
function lnUpper(z: number): number {
  return Math.log(Math.max(normalUpperTail(z), Number.MIN_VALUE));
}

export function andersonDarlingTail(a: number): number {
  if (a < 0.2) return -Math.expm1(-13.436 + 101.14 * a - 223.73 * a * a);
  if (a < 0.34) return -Math.expm1(-8.318 + 42.796 * a - 59.938 * a * a);
  if (a < 0.6) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a);
  // The last formula turns up again from about 150 on; beyond 10 there is nothing left to tell apart.
  return Math.exp(1.2937 - 5.709 * Math.min(a, 10) + 0.0186 * Math.min(a, 10) ** 2);
}
