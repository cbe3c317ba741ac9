/**
 * A value of sets of players shared out among the players: what each adds, averaged over all orders in which they can come
 * in (Shapley 1953; of R² over attributes: Lindeman, Merenda & Gold 1980). The shares add up to v(all) − v(none).
 */
import { NumericsError } from "./numericsError.ts";

export interface AveragedShares {
  /** Per player Σ over sets S without it of |S|!(k − |S| − 1)!/k! · (v(S + it) − v(S)). */
  readonly shares: Float64Array;
  /** What each adds when it comes in alone, and when it comes in after all others. */
  readonly first: Float64Array;
  readonly last: Float64Array;
}

/**
 * Shares of `players` players in a value known for each of the 2^players sets, bit g of a set standing for player g.
 * Refuses (shape) another number of values and (notFinite) a value that is not a number.
 */
export function averagedShares(values: Float64Array, players: number): AveragedShares {
  const sets = 2 ** players;
  if (values.length !== sets) throw new NumericsError("shape", `${values.length} values for ${sets} sets`);
  const bad = values.findIndex((value) => !Number.isFinite(value));
  if (bad >= 0) throw new NumericsError("notFinite", `the value of set ${bad} is not a finite number`);
  const sizes = sizesOf(players);
  const shares = new Float64Array(players);
  for (let g = 0; g < players; g++) shares[g] = shareOf(values, sizes, g, players);
  const all = sets - 1;
  return {
    shares,
    first: Float64Array.from(shares, (_, g) => values[1 << g]! - values[0]!),
    last: Float64Array.from(shares, (_, g) => values[all]! - values[all - (1 << g)]!),
  };
}

/** Number of players in each set. */
function sizesOf(players: number): Uint8Array {
  const sizes = new Uint8Array(2 ** players);
  for (let set = 1; set < sizes.length; set++) sizes[set] = sizes[set >> 1]! + (set & 1);
  return sizes;
}

/** The mean over sizes of the mean, over the sets of that size without g, of what g adds. */
function shareOf(values: Float64Array, sizes: Uint8Array, g: number, players: number): number {
  const bit = 1 << g;
  const sums = new Float64Array(players);
  for (let block = 0; block < values.length; block += 2 * bit) {
    for (let set = block; set < block + bit; set++) {
      const size = sizes[set]!;
      sums[size] = sums[size]! + (values[set + bit]! - values[set]!);
    }
  }
  let share = 0;
  let count = 1;
  for (let size = 0; size < players; size++) {
    share += sums[size]! / count;
    count = (count * (players - 1 - size)) / (size + 1);
  }
  return share / players;
}
