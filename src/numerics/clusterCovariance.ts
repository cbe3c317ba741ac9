/**
 * Covariance of a fit by the rows' own pulls on it, which asks for no even spread, and, added up by cluster, for no independence
 * within a cluster either (White 1980; Liang & Zeger 1986). Symbols: d_i = x_i − m; q_i = (1/Σw, C⁻¹d_i) times the score w_i·e_i;
 * M = Σ_g (Σ_{i∈g} q_i)(Σ_{i∈g} q_i)′, (k + 1)²: first the response at the means m, then the slopes. The variance of an average
 * at x₀ is a′Ma with a = (1, x₀ − m). Centred, so that nothing cancels.
 */
import { choleskyFactor, invertUpper, timesOwnTranspose } from "./choleskyFactor.ts";
import { type Column, numbersOf, valueAt } from "./column.ts";
import { NumericsError } from "./numericsError.ts";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";
import { frameOf, meanOf, weightedProducts } from "./weightedSteps.ts";

/** How a row's score moves the fit. */
export interface Bread {
  /** m, k: weighted means; zeros without an intercept. */
  readonly means: Float64Array;
  /** C⁻¹, k × k row-major. */
  readonly inverse: Float64Array;
  /** Σw; Infinity without an intercept, which no row moves then. */
  readonly totalWeight: number;
}

export interface FitCovariance {
  readonly means: Float64Array;
  /** M, (k + 1)² row-major. */
  readonly matrix: Float64Array;
}

/** Of a least-squares fit at its own weights (null: all 1) and penalties. */
export function breadOf(solution: LeastSquaresSolution, weights: Float64Array | null): Bread {
  const { means, inverse, residuals, intercept } = solution;
  const total = weights === null ? residuals.length : weights.reduce((sum, w) => sum + w, 0);
  return { means, inverse, totalWeight: intercept === null ? Number.POSITIVE_INFINITY : total };
}

/**
 * Of an M estimate, with the slopes a·ψ′ in place of the weights, n (Huber 1981, section 6.3). `penalty` in raw units, k, or null.
 * Refuses rankDeficient where too many sales lie on the falling side of ψ.
 */
export function breadOfCurvature(
  columns: readonly Column[],
  curvature: Float64Array,
  penalty: Float64Array | null,
): Bread {
  const k = columns.length;
  const totalWeight = curvature.reduce((sum, c) => sum + c, 0);
  const centred = frameOf(columns, curvature.length, penalty);
  const means = Float64Array.from(columns, (column) => meanOf(numbersOf(column), curvature));
  const frame = { ...centred, means };
  const { matrix } = weightedProducts(frame, curvature, new Float64Array(curvature.length));
  const inner = new Float64Array(k * k);
  for (let a = 0; a < k; a++) for (let b = 0; b < k; b++) inner[a * k + b] = matrix[(a + 1) * (k + 1) + b + 1]!;
  const factor = choleskyFactor(inner, k, 1e-13);
  if (typeof factor === "number" || !(totalWeight > 0)) {
    throw new NumericsError("rankDeficient", "the rows that still count do not carry a covariance");
  }
  const scaled = timesOwnTranspose(invertUpper(factor, k), k);
  const inverse = scaled.map((v, at) => v / (frame.scales[Math.floor(at / k)]! * frame.scales[at % k]!));
  return { means, inverse, totalWeight };
}

/** d′Ad. */
function formOf(matrix: Float64Array, d: Float64Array): number {
  const k = d.length;
  let sum = 0;
  for (let a = 0; a < k; a++) {
    let row = 0;
    for (let b = 0; b < k; b++) row += matrix[a * k + b]! * d[b]!;
    sum += d[a]! * row;
  }
  return sum;
}

/**
 * M from one score per row (n), added up within clusters when these are given: `clusters` n codes from 0 up to `clusterCount`;
 * null: every row on its own.
 */
export function pulledCovariance(
  columns: readonly Column[],
  bread: Bread,
  scores: Float64Array,
  clusters: { readonly codes: ArrayLike<number>; readonly count: number } | null,
): FitCovariance {
  const q = columns.length + 1;
  const matrix = new Float64Array(q * q);
  const sums = clusters === null ? null : new Float64Array(clusters.count * q);
  const pull = new Float64Array(q);
  const d = new Float64Array(q - 1);
  for (let i = 0; i < scores.length; i++) {
    for (let a = 0; a < q - 1; a++) d[a] = valueAt(columns[a]!, i) - bread.means[a]!;
    pullOf(pull, d, bread, scores[i]!);
    if (sums === null) addSquare(matrix, pull, 0);
    else for (let a = 0; a < q; a++) sums[clusters!.codes[i]! * q + a]! += pull[a]!;
  }
  if (sums !== null) for (let g = 0; g < clusters!.count; g++) addSquare(matrix, sums, g * q);
  for (let a = 0; a < q; a++) for (let b = 0; b < a; b++) matrix[b * q + a] = matrix[a * q + b]!;
  return { means: bread.means, matrix };
}

function pullOf(pull: Float64Array, d: Float64Array, bread: Bread, score: number): void {
  const k = d.length;
  pull[0] = score / bread.totalWeight;
  for (let a = 0; a < k; a++) {
    let g = 0;
    for (let b = 0; b < k; b++) g += bread.inverse[a * k + b]! * d[b]!;
    pull[a + 1] = g * score;
  }
}

function addSquare(matrix: Float64Array, values: Float64Array, from: number): void {
  const q = Math.sqrt(matrix.length);
  for (let a = 0; a < q; a++) {
    for (let b = 0; b <= a; b++) matrix[a * q + b]! += values[from + a]! * values[from + b]!;
  }
}

/** M of an even spread: s²/Σw for the response at the means, s²C⁻¹ for the slopes. */
export function evenCovariance(bread: Bread, variance: number): FitCovariance {
  const k = bread.means.length;
  const q = k + 1;
  const matrix = new Float64Array(q * q);
  matrix[0] = variance / bread.totalWeight;
  for (let a = 0; a < k; a++) {
    for (let b = 0; b < k; b++) matrix[(a + 1) * q + b + 1] = variance * bread.inverse[a * k + b]!;
  }
  return { means: bread.means, matrix };
}

/** a′Ma, a = (1, x₀ − m): the variance of the average price at x₀ (k raw values). */
export function varianceAt({ means, matrix }: FitCovariance, x: ArrayLike<number>): number {
  const a = new Float64Array(means.length + 1);
  a[0] = 1;
  for (let j = 0; j < means.length; j++) a[j + 1] = x[j]! - means[j]!;
  return formOf(matrix, a);
}
