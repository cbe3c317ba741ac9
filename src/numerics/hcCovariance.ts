/**
 * Standard errors that do not ask for an even spread: the sandwich C⁻¹(Σ ω_i d_i d_i′)C⁻¹ with
 * HC0 ω = e² (White 1980); HC1 e²·n/(n − p); HC2 e²/(1 − h); HC3 e²/(1 − h)² (MacKinnon & White 1985).
 */
import { type Column, numbersOf } from "./column.ts";
import { leverages } from "./leverages.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

export type HcKind = "HC0" | "HC1" | "HC2" | "HC3";

export interface HcStandardErrors {
  readonly standardErrors: Float64Array;
  readonly interceptStandardError: number | null;
}

/** By the rows' influence on each coefficient, g_i = C⁻¹d_i; on the intercept 1/n − x̄′g_i. Infinite where 1 − h = 0. */
export function hcCovariance(given: readonly Column[], solution: LeastSquaresSolution, kind: HcKind): HcStandardErrors {
  const columns = given.map(numbersOf);
  const n = solution.residuals.length;
  const k = columns.length;
  const h = leverages(columns, solution);
  const { inverse, means, residuals } = solution;
  const sums = new Float64Array(k);
  let interceptSum = 0;
  const d = new Float64Array(k);
  for (let i = 0; i < n; i++) {
    const weight = weightOf(kind, residuals[i]!, h[i]!, n, solution.rank);
    for (let a = 0; a < k; a++) d[a] = columns[a]![i]! - means[a]!;
    let intercept = 1 / n;
    for (let a = 0; a < k; a++) {
      let g = 0;
      for (let b = 0; b < k; b++) g += inverse[a * k + b]! * d[b]!;
      sums[a]! += weight * g * g;
      intercept -= means[a]! * g;
    }
    interceptSum += weight * intercept * intercept;
  }
  return {
    standardErrors: sums.map(Math.sqrt),
    interceptStandardError: solution.intercept === null ? null : Math.sqrt(interceptSum),
  };
}

function weightOf(kind: HcKind, e: number, h: number, n: number, p: number): number {
  if (kind === "HC0") return e * e;
  if (kind === "HC1") return (e * e * n) / (n - p);
  return kind === "HC2" ? (e * e) / (1 - h) : (e / (1 - h)) ** 2;
}
