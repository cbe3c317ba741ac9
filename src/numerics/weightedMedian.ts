/** The middle of values that count by weights: half of the weight lies on either side. */

/**
 * Where the running weight of the sorted values passes half of the whole; midway between two values when it falls exactly
 * between them, so that equal weights give the ordinary median. `weights` null: every value counts alike. NaN for nothing.
 */
export function weightedMedian(values: Float64Array, weights: Float64Array | null): number {
  if (weights === null) return medianOfSorted(Float64Array.from(values).sort());
  const order = Array.from(values.keys())
    .filter((i) => weights[i]! > 0)
    .sort((a, b) => values[a]! - values[b]!);
  const half = order.reduce((sum, i) => sum + weights[i]!, 0) / 2;
  let below = 0;
  for (const [at, i] of order.entries()) {
    below += weights[i]!;
    const next = order[at + 1];
    if (next !== undefined && Math.abs(below - half) <= 1e-12 * half) return (values[i]! + values[next]!) / 2;
    if (below > half) return values[i]!;
  }
  return order.length === 0 ? Number.NaN : values[order[order.length - 1]!]!;
}

function medianOfSorted(sorted: Float64Array): number {
  const n = sorted.length;
  if (n === 0) return Number.NaN;
  return n % 2 === 1 ? sorted[(n - 1) / 2]! : (sorted[n / 2 - 1]! + sorted[n / 2]!) / 2;
}
