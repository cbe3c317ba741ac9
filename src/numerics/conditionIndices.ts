/**
 * How near the columns come to depending on each other, and which coefficients pay for it: condition indices and
 * variance-decomposition proportions (Belsley, Kuh & Welsch 1980, chapter 3).
 * Symbols: Z = [1, X] with every column divided by its length, not centred; Z = UDV′; index d_max/d_k; share of coefficient j
 * tied to d_k: φ_jk/Σφ_jk with φ_jk = (v_jk/d_k)². From the root of the inverse and not from cross-products, whose condition
 * is the square: (Z′Z)⁻¹ = (LG)(LG)′, L the lengths, G = [[1/√n, −x̄′T], [0, T]] with C⁻¹ = TT′, and LG = V·D⁻¹·W′.
 */
import { determinant, Matrix, SVD } from "ml-matrix";
import type { LeastSquaresSolution } from "./solveLeastSquares.ts";

export interface ConditionIndices {
  /** d, largest first, q = k + 1. */
  readonly singularValues: Float64Array;
  /** From 1 upwards, q. */
  readonly indices: Float64Array;
  /** q × q row-major: coefficient j (the intercept first) by index; each row sums to 1. */
  readonly proportions: Float64Array;
}

/**
 * Of a fit with an intercept. `squaredLengths`: Σ(x − x̄)² of each column, k. Worked value: two columns at right angles to each
 * other and to the ones give indices 1, 1, 1.
 */
export function conditionIndices(
  { rootInverse, means, weightSum }: Pick<LeastSquaresSolution, "rootInverse" | "means" | "weightSum">,
  squaredLengths: Float64Array,
): ConditionIndices {
  const k = means.length;
  const g = Matrix.zeros(k + 1, k + 1);
  // The ones have length √n, which takes the 1/√n of the corner away.
  const root = Math.sqrt(weightSum);
  g.set(0, 0, 1);
  for (let b = 0; b < k; b++) {
    let mean = 0;
    for (let a = 0; a < k; a++) {
      const t = rootInverse[a * k + b]!;
      mean += means[a]! * t;
      g.set(a + 1, b + 1, Math.sqrt(squaredLengths[a]! + weightSum * means[a]! ** 2) * t);
    }
    g.set(0, b + 1, -root * mean);
  }
  return decompose(g);
}

function decompose(g: Matrix): ConditionIndices {
  const q = g.rows;
  const svd = new SVD(g, { computeRightSingularVectors: false });
  const left = svd.leftSingularVectors;
  // Largest singular value of LG last: it belongs to the smallest of Z.
  const inverses = Float64Array.from(svd.diagonal).reverse();
  const singularValues = inverses.map((one) => 1 / one);
  const proportions = new Float64Array(q * q);
  for (let j = 0; j < q; j++) {
    let sum = 0;
    for (let c = 0; c < q; c++) {
      proportions[j * q + c] = (left.get(j, q - 1 - c) * inverses[c]!) ** 2;
      sum += proportions[j * q + c]!;
    }
    for (let c = 0; c < q; c++) proportions[j * q + c]! /= sum;
  }
  return { singularValues, indices: singularValues.map((d) => singularValues[0]! / d), proportions };
}

/**
 * Generalised variance inflation of a group of columns, det R_gg·det Q_gg with R the correlations and Q their inverse
 * (Fox & Monette 1992), from centred cross-products and their inverse, k × k in raw units. One column gives its VIF.
 */
export function generalisedInflation(
  crossProducts: Float64Array,
  inverse: Float64Array,
  k: number,
  group: readonly number[],
): number {
  const lengths = group.map((j) => Math.sqrt(crossProducts[j * k + j]!));
  const scaled = (matrix: Float64Array, power: 1 | -1) =>
    new Matrix(group.map((j, a) => group.map((l, b) => matrix[j * k + l]! * (lengths[a]! * lengths[b]!) ** power)));
  return Math.max(1, determinant(scaled(crossProducts, -1)) * determinant(scaled(inverse, 1)));
}
