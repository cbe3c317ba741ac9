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

/** Standard error of the carried part of each included column for one left-out group, on the response's scale; null without residual degrees of freedom. */
export function carriedErrors(
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
  const k = long.columns.length;
  const spread = spreadOfCarried(short, long, own) / df;
  return Float64Array.from(short.columns, (_, a) => {
    let variance = spread * short.solution.inverse[a * short.columns.length + a]!;
    own.forEach((first, i) => {
      own.forEach((second, j) => {
        variance += first.slopes[a]! * second.slopes[a]! * s * s * long.solution.inverse[at[i]! * k + at[j]!]!;
      });
    });
    return Math.sqrt(Math.max(0, variance));
  });
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
