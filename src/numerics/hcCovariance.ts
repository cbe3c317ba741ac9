/**
 * Standard errors that do not ask for an even spread: the sandwich C⁻¹(Σ ω_i d_i d_i′)C⁻¹ with, at weights w,
 * HC0 ω = w²e² (White 1980); HC1 w²e²·n/(n − p); HC2 w²e²/(1 − h); HC3 w²e²/(1 − h)² (MacKinnon & White 1985).
 * The middle sum is a weighted cross-product, so it comes from the moments of the columns at weights ω.
 */
import { accumulateMoments } from "./accumulateMoments.ts";
import type { Column } from "./column.ts";
import { leverages } from "./leverages.ts";
import { sharedNumbers } from "./sharedMemory.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

export type HcKind = "HC0" | "HC1" | "HC2" | "HC3";

export interface HcStandardErrors {
  readonly standardErrors: Float64Array;
  readonly interceptStandardError: number | null;
}

/** Infinite where 1 − h = 0 under HC2 and HC3; zeros when every residual is zero. `h` saves working them out again. */
export function hcCovariance(
  columns: readonly Column[],
  solution: LeastSquaresSolution,
  kind: HcKind,
  weights: Float64Array | null = null,
  h: Float64Array = leverages(columns, solution, weights),
): HcStandardErrors {
  const k = columns.length;
  const { residuals, residualDf, rank } = solution;
  const omega = residuals.map((e, i) => omegaOf(kind, (weights?.[i] ?? 1) * e, h[i]!, residualDf, rank));
  const isAlone = omega.some((one) => !Number.isFinite(one));
  const isNothing = omega.every((one) => one === 0);
  if (isAlone || isNothing || k === 0) return plainSums(solution, omega, k, isAlone);
  const middle = accumulateMoments(columns, { weights: sharedNumbers(omega) });
  // Rows of the influences on each coefficient: C⁻¹d for the slopes, 1/Σw − x̄′C⁻¹d for the intercept.
  const { inverse, means } = solution;
  const spread = (g: ArrayLike<number>, constant: number): number => {
    let offset = constant;
    for (let a = 0; a < k; a++) offset += g[a]! * (middle.means[a]! - means[a]! + middle.meanTails[a]!);
    let sum = middle.weightSum * offset * offset;
    for (let a = 0; a < k; a++) {
      for (let b = 0; b < k; b++) {
        sum += g[a]! * middle.scales[a]! * middle.crossProducts[a * k + b]! * middle.scales[b]! * g[b]!;
      }
    }
    return sum;
  };
  const rowOf = (a: number) => inverse.subarray(a * k, a * k + k);
  const onIntercept = Float64Array.from({ length: k }, (_, b) => -sumOver(k, (a) => means[a]! * inverse[a * k + b]!));
  return {
    standardErrors: Float64Array.from({ length: k }, (_, a) => Math.sqrt(Math.max(0, spread(rowOf(a), 0)))),
    interceptStandardError:
      solution.intercept === null ? null : Math.sqrt(Math.max(0, spread(onIntercept, 1 / solution.weightSum))),
  };
}

/** An intercept alone, or nothing to sum, or a row without which there is no fit. */
function plainSums(solution: LeastSquaresSolution, omega: Float64Array, k: number, isAlone: boolean): HcStandardErrors {
  const total = isAlone ? Number.POSITIVE_INFINITY : omega.reduce((sum, one) => sum + one, 0);
  const each = k > 0 ? Math.sqrt(total) : 0;
  return {
    standardErrors: new Float64Array(k).fill(each),
    interceptStandardError: solution.intercept === null ? null : Math.sqrt(total) / solution.weightSum,
  };
}

function sumOver(count: number, term: (a: number) => number): number {
  let sum = 0;
  for (let a = 0; a < count; a++) sum += term(a);
  return sum;
}

function omegaOf(kind: HcKind, e: number, h: number, residualDf: number, rank: number): number {
  if (e === 0) return 0;
  if (kind === "HC0") return e * e;
  if (kind === "HC1") return (e * e * (residualDf + rank)) / residualDf;
  return kind === "HC2" ? (e * e) / (1 - h) : (e / (1 - h)) ** 2;
}
