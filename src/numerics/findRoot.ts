/** Where a function passes zero between two points at which its signs differ: false position that halves the end that stays (Illinois: Dowell & Jarratt 1971). */

const MOST_STEPS = 200;

/** x between a and b, either order, to within `tolerance`. f(a) and f(b) have different signs, or one is zero. */
export function findRoot(f: (x: number) => number, a: number, b: number, tolerance: number): number {
  let kept = { x: a, f: f(a) };
  let newest = { x: b, f: f(b) };
  for (let steps = 0; steps < MOST_STEPS && newest.f !== 0; steps++) {
    if (kept.f === 0) return kept.x;
    const x = (kept.x * newest.f - newest.x * kept.f) / (newest.f - kept.f);
    const found = { x, f: f(x) };
    kept = found.f * newest.f < 0 ? newest : { x: kept.x, f: kept.f / 2 };
    const move = Math.abs(found.x - newest.x);
    newest = found;
    if (move <= tolerance || Math.abs(kept.x - newest.x) <= tolerance) break;
  }
  return newest.x;
}
