/** What the checks of a fit have in common. */
import type { Diagnosis, Verdict } from "../../domain/diagnosis.ts";
import { accumulateMoments, type Moments, mergeMoments } from "../../numerics/accumulateMoments.ts";
import type { Column } from "../../numerics/column.ts";
import type { RowDiagnostics } from "../../numerics/rowDiagnostics.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import type { Fit } from "../fit.ts";

/** What several checks read, worked out once, when the first of them asks. */
export interface DiagnosticContext {
  readonly rows: () => RowDiagnostics;
}

export interface Diagnostic {
  readonly code: Diagnosis["code"];
  readonly label: string;
  /** Residual degrees of freedom that the check needs. */
  readonly needs: number;
  /** Holds under weights and penalties too; the others hold for least squares with equal weights and no penalty. */
  readonly underWeights: boolean;
  /** The finding, or a sentence why there is none. */
  readonly run: (fit: Fit, context: DiagnosticContext) => Finding | string;
}

/** A finding without what the diagnostic itself says already. */
export type Finding = Omit<Diagnosis, "code" | "label">;

/**
 * Below 1 in 100 trouble, below 1 in 20 a look. Many sales show what is real but too small to matter: `isSmall` makes that a look
 * at most. Common practice, no source.
 */
export function verdictOf(p: number, isSmall = false): Verdict {
  if (p >= 0.05) return "fine";
  return p < 0.01 && !isSmall ? "trouble" : "look";
}

/** A share of variation explained below this is small. Common practice, no source. */
export const SMALL_SHARE = 0.01;

export function columnsOf(fit: Fit): Column[] {
  return fit.columns.map((index) => fit.design.columns[index]!.values);
}

/** ŷ less its mean, over its standard deviation: powers of it keep apart in floating point. */
export function standardisedFitted({ design, solution }: Fit): Float64Array {
  const centred = design.response.map((y, i) => y - solution.residuals[i]! - solution.responseMean);
  const spread = Math.sqrt(centred.reduce((sum, value) => sum + value * value, 0) / design.n);
  return centred.map((value) => value / spread);
}

/** n·R² of the squared residuals on columns (Koenker 1981). */
export function explainedSquares(columns: readonly Column[], { residuals }: LeastSquaresSolution): number {
  const squares = residuals.map((e) => e * e);
  const { residualSumOfSquares, totalSumOfSquares } = solveLeastSquares([...columns], squares, {
    intercept: true,
  });
  return squares.length * (1 - residualSumOfSquares / totalSumOfSquares);
}

/** Sales named by a finding. */
const LISTED = 20;
/** Rows worked on at a time, so that made-up columns of a million sales never lie in memory together. */
const BLOCK = 65_536;

/** Moments of columns that `make` works out for rows `start` … `start + size − 1`, 1 ≤ size. */
export function momentsOfMade(n: number, make: (start: number, size: number) => Column[]): Moments {
  const parts: Moments[] = [];
  for (let start = 0; start < n; start += BLOCK) parts.push(accumulateMoments(make(start, Math.min(BLOCK, n - start))));
  return mergeMoments(parts);
}

/** Σ(x_a − x̄_a)(x_b − x̄_b). */
export function centredProduct({ crossProducts, scales }: Moments, a: number, b: number): number {
  return crossProducts[a * scales.length + b]! * (scales[a]! * scales[b]!);
}

/** Σ x_a x_b. */
export function product(moments: Moments, a: number, b: number): number {
  return centredProduct(moments, a, b) + moments.weightSum * moments.means[a]! * moments.means[b]!;
}

/** The rows concerned with the largest `size`, the largest first, as the design's places in SaleColumns. */
export function worstSales(
  { design }: Fit,
  size: (i: number) => number,
  isConcerned: (i: number) => boolean,
): number[] {
  const worst: number[] = [];
  for (let i = 0; i < design.n; i++) {
    const isFull = worst.length === LISTED;
    if (!isConcerned(i) || (isFull && !(size(i) > size(worst[LISTED - 1]!)))) continue;
    let at = worst.length;
    while (at > 0 && size(worst[at - 1]!) < size(i)) at--;
    worst.splice(at, 0, i);
    if (isFull) worst.pop();
  }
  return worst.map((i) => design.rows[i]!);
}
