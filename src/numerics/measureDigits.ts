/**
 * How many decimal digits of the slopes can be trusted, from two causes: what refinement left uncorrected, and what
 * storing the inputs as doubles may have changed (whole numbers are stored exactly). First-order propagation of
 * independent storing errors d_j of column j and d_y of the response, uniform within half a unit in the last place:
 * var b_j ≈ ⅓[(C⁻¹)_jj (Σ_k b_k² d_k² + d_y²) + Σ_k (C⁻¹)_jk² d_k² e′e] (Stewart & Sun 1990, ch. III, for the two terms).
 */
import { storedError } from "./centring.ts";
import type { Column } from "./column.ts";
import type { Refined } from "./refineCoefficients.ts";

export interface FittedParts {
  readonly slopes: Float64Array;
  readonly standardErrors: Float64Array;
  readonly inverse: Float64Array;
  readonly residualSumOfSquares: number;
  readonly refined: Refined;
}

/** Whole digits, 0 to 15, that the least sure slope has; a slope near zero is measured against its standard error. */
export function measureDigits(columns: readonly Column[], response: Float64Array, parts: FittedParts): number {
  const k = columns.length;
  const { slopes, inverse, standardErrors } = parts;
  const stored = columns.map((column) => storedError(column) ** 2);
  const spread = stored.reduce((total, d, j) => total + d * slopes[j]! ** 2, storedError(response) ** 2);
  let worst = leftOver(parts.refined.corrections);
  for (let j = 0; j < k; j++) {
    let fromResiduals = 0;
    for (let l = 0; l < k; l++) fromResiduals += inverse[j * k + l]! ** 2 * stored[l]! * parts.residualSumOfSquares;
    const error = Math.sqrt((inverse[j * k + j]! * spread + fromResiduals) / 3);
    const measure = Math.max(Math.abs(slopes[j]!), standardErrors[j]!);
    if (error > 0) worst = Math.max(worst, measure > 0 ? error / measure : 1);
  }
  return Math.max(0, Math.min(15, Math.floor(-Math.log10(worst))));
}

/** What the next correction would be: the last one shrunk at the rate seen; never below a double's own rounding. */
function leftOver(corrections: readonly number[]): number {
  const last = corrections.at(-1) ?? 0;
  const rate = Math.min(1, last / (corrections.at(-2) ?? 1));
  return Math.max(2 ** -53, last * rate);
}
