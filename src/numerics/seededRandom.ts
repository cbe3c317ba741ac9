/**
 * A small random sequence that is the same on every machine: xorshift with 32 bits (Marsaglia 2003, shifts 13, 17, 5).
 * Good enough to pick rows to start a search from; not for secrets.
 */

/** Draws whole numbers from 0 up to (not including) `below`, 1 ≤ below ≤ 2³². The seed is made odd, so that it is never 0. */
export function seededRandom(seed: number): (below: number) => number {
  let state = (seed | 1) >>> 0;
  return (below) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    state >>>= 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

/** The numbers 0 … n − 1 in an order that the draws decide (Fisher & Yates; Durstenfeld 1964). */
export function shuffled(n: number, draw: (below: number) => number): Int32Array {
  const order = Int32Array.from({ length: n }, (_, i) => i);
  for (let i = n - 1; i > 0; i--) {
    const j = draw(i + 1);
    const moved = order[i]!;
    order[i] = order[j]!;
    order[j] = moved;
  }
  return order;
}
