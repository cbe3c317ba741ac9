/**
 * A move shared out over what changed, averaged over every order in which the changes could have been made (Shapley 1953):
 *   φ_i = Σ_{S ∌ i} |S|!(m − |S| − 1)!/m! · (v(S ∪ {i}) − v(S)).
 * The shares add up to v(all) − v(none).
 */

/** `valueAt` is asked once for each of the 2^m sets of changes, as a bit mask; m at most 12. Shares in the order of the bits. */
export function shareOut(count: number, valueAt: (mask: number) => number): number[] {
  if (!(count >= 0 && count <= 12)) throw new RangeError(`${count} changes cannot be shared out; at most 12`);
  const values = Array.from({ length: 2 ** count }, (_, mask) => valueAt(mask));
  const weights = Array.from({ length: count }, (_, size) => orderWeight(size, count));
  return Array.from({ length: count }, (_, i) => {
    let share = 0;
    for (let mask = 0; mask < values.length; mask++) {
      if ((mask >> i) & 1) continue;
      share += weights[bitCount(mask)]! * (values[mask | (1 << i)]! - values[mask]!);
    }
    return share;
  });
}

/** |S|!(m − |S| − 1)!/m! = 1/(m·C(m − 1, |S|)). */
function orderWeight(size: number, count: number): number {
  let choose = 1;
  for (let j = 1; j <= size; j++) choose = (choose * (count - j)) / j;
  return 1 / (count * choose);
}

function bitCount(mask: number): number {
  let bits = 0;
  for (let rest = mask; rest > 0; rest &= rest - 1) bits += 1;
  return bits;
}
