/** Sample quantile by linear interpolation of order statistics (Hyndman & Fan 1996, type 7). */

const sortedBefore = new WeakMap<Float64Array, Float64Array>();

/** The values in ascending order; kept for as long as the array itself, which must not change. */
export function sortedOf(values: Float64Array): Float64Array {
  const known = sortedBefore.get(values);
  if (known !== undefined) return known;
  const sorted = Float64Array.from(values).sort();
  sortedBefore.set(values, sorted);
  return sorted;
}

/** p in [0, 1]; sorted ascending, not empty. */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  const at = (sorted.length - 1) * p;
  const below = Math.floor(at);
  const above = Math.min(below + 1, sorted.length - 1);
  return sorted[below]! + (at - below) * (sorted[above]! - sorted[below]!);
}
