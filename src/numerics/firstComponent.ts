/** Loadings of the first principal component of standardised columns (Hotelling 1933). */
import { EVD, Matrix } from "ml-matrix";
import { NumericsError } from "./numericsError.ts";

export interface StandardColumn {
  readonly mean: number;
  /** √(Σ (x − m)²/n). */
  readonly spread: number;
}

/** Mean and spread. */
export function standardOf(values: Float64Array): StandardColumn {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const spread = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length);
  return { mean, spread };
}

/** Loadings that add up to a positive number, length 1. Refuses (rankDeficient) constant columns. */
export function firstComponent(columns: readonly Float64Array[]): number[] {
  const standards = columns.map(standardOf);
  const flat = standards.flatMap(({ spread }, j) => (spread > 0 ? [] : [j]));
  if (flat.length > 0) throw new NumericsError("rankDeficient", "some columns do not vary", flat);
  const k = columns.length;
  const n = columns[0]!.length;
  const correlations = Matrix.zeros(k, k);
  for (let a = 0; a < k; a++) {
    for (let b = 0; b <= a; b++) {
      let sum = 0;
      for (let i = 0; i < n; i++) {
        sum += (columns[a]![i]! - standards[a]!.mean) * (columns[b]![i]! - standards[b]!.mean);
      }
      const value = sum / n / standards[a]!.spread / standards[b]!.spread;
      correlations.set(a, b, value);
      correlations.set(b, a, value);
    }
  }
  const found = new EVD(correlations, { assumeSymmetric: true });
  const best = found.realEigenvalues.indexOf(Math.max(...found.realEigenvalues));
  const loadings = found.eigenvectorMatrix.getColumn(best);
  const sign = loadings.reduce((sum, one) => sum + one, 0) < 0 ? -1 : 1;
  return loadings.map((one) => one * sign);
}
