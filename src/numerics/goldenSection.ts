/** Where a function with one valley is least, by the golden section (Kiefer 1953): one look per step. */

/** x between low and high, to within `tolerance`. Rounding of f limits it to about √ε of the valley's width. */
export function goldenSection(f: (x: number) => number, low: number, high: number, tolerance: number): number {
  const ratio = (Math.sqrt(5) - 1) / 2;
  const look = (x: number) => ({ x, f: f(x) });
  let a = low;
  let b = high;
  let left = look(b - ratio * (b - a));
  let right = look(a + ratio * (b - a));
  while (b - a > tolerance) {
    if (left.f <= right.f) {
      b = right.x;
      right = left;
      left = look(b - ratio * (b - a));
    } else {
      a = left.x;
      left = right;
      right = look(a + ratio * (b - a));
    }
  }
  return (a + b) / 2;
}
