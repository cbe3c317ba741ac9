/**
 * Standard errors of own and carried parts (Gelbach 2016, §3.3). With Δ_B the association of the left-out columns B with the
 * included ones A, V_BB the covariance of b_B in the long fit, and w the residuals of X_B·b_B on X_A:
 *   Var(carried part of a) = (Δ_B V_BB Δ_B′)_aa + σ_w²·((X_A′X_A)⁻¹)_aa,  σ_w² = Σ w²/(n − p_A).
 * The first term is doubt about what the left-out attribute does, the second about how it moves with the included one.
 * Weights and penalties of the fit stand in X′X as they do in the fit itself; errors suppose an even spread.
 */
import type { AttributeGroup, Fit } from "../hedonic/fit.ts";

/** One left-out column on the included ones: slopes[a] of included column a, residuals of the n sales. */
export interface Association {
  readonly column: number;
  readonly slopes: Float64Array;
  readonly residuals: Float64Array;
}

/** Covariance of the carried parts of the included columns for one left-out group, k × k, on the response's scale; null without residual degrees of freedom. */
export function carriedCovariance(
  short: Fit,
  long: Fit,
  group: AttributeGroup,
  associations: readonly Association[],
): Float64Array | null {
  const s = long.solution.residualStandardError;
  const df = short.solution.residualDf;
  if (s === null || df <= 0) return null;
  const own = associations.filter((one) => group.columns.includes(one.column));
  const at = own.map((one) => long.columns.indexOf(one.column));
  const k = short.columns.length;
  const size = long.columns.length;
  const spread = spreadOfCarried(short, long, own) / df;
  const covariance = short.solution.inverse.map((value) => spread * value);
  for (let a = 0; a < k; a++) {
    for (let b = 0; b < k; b++) {
      own.forEach((first, i) => {
        own.forEach((second, j) => {
          const inverse = long.solution.inverse[at[i]! * size + at[j]!]!;
          covariance[a * k + b]! += first.slopes[a]! * second.slopes[b]! * s * s * inverse;
        });
      });
    }
  }
  return covariance;
}

/** Σ w², w = Σ_B b_B·(residual of column B on the included ones), each sale at its weight. */
function spreadOfCarried(short: Fit, long: Fit, own: readonly Association[]): number {
  const weights = short.rule.weights;
  const slopes = own.map((one) => long.solution.slopes[long.columns.indexOf(one.column)]!);
  let sum = 0;
  for (let i = 0; i < short.design.n; i++) {
    let w = 0;
    for (let j = 0; j < own.length; j++) w += slopes[j]! * own[j]!.residuals[i]!;
    sum += (weights?.[i] ?? 1) * w * w;
  }
  return sum;
}
