/**
 * The first few of 0 … total − 1 in an order, without sorting the rest. `compare` is that of Array.sort and never 0 for two
 * different numbers, so that the answer is one.
 */
export function firstFew(total: number, count: number, compare: (a: number, b: number) => number): number[] {
  const kept: number[] = [];
  for (let i = 0; i < total; i++) {
    if (kept.length === count && compare(i, kept[count - 1]!) > 0) continue;
    let place = kept.length;
    while (place > 0 && compare(i, kept[place - 1]!) < 0) place -= 1;
    kept.splice(place, 0, i);
    if (kept.length > count) kept.pop();
  }
  return kept;
}
