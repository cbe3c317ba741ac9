/** Sample quantile by linear interpolation of order statistics (Hyndman & Fan 1996, type 7). */

/** p in [0, 1]; sorted ascending, not empty. */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  const at = (sorted.length - 1) * p;
  const below = Math.floor(at);
  const above = Math.min(below + 1, sorted.length - 1);
  return sorted[below]! + (at - below) * (sorted[above]! - sorted[below]!);
}
