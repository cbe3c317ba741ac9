/**
 * Seeded draws for the invented demo: the same seed gives the same figures on every machine. Not for statistics.
 * Generator: mulberry32 (T. Ettinger, public domain), 32 bits of state.
 */

export interface Draw {
  /** Even on [0, 1). */
  even(): number;
  /** Even on [low, high). */
  between(low: number, high: number): number;
  /** Whole number from low to high, both included. */
  whole(low: number, high: number): number;
  /** Normal with mean 0 and standard deviation 1: twelve even draws less six, within ±6. */
  normal(): number;
  pick<T>(items: readonly T[]): T;
  /** One of the items, by their weights. */
  weighted<T>(items: readonly (readonly [T, number])[]): T;
  chance(share: number): boolean;
  /** A new order of the same items. */
  shuffled<T>(items: readonly T[]): T[];
}

export function drawFrom(seed: number): Draw {
  let state = seed >>> 0;
  const even = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t = (t + Math.imul(t ^ (t >>> 7), t | 61)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
  const whole = (low: number, high: number) => low + Math.floor(even() * (high - low + 1));
  return {
    even,
    whole,
    between: (low, high) => low + (high - low) * even(),
    normal: () => {
      let sum = -6;
      for (let k = 0; k < 12; k++) sum += even();
      return sum;
    },
    pick: (items) => items[whole(0, items.length - 1)]!,
    weighted: (items) => {
      let left = even() * items.reduce((sum, [, weight]) => sum + weight, 0);
      for (const [item, weight] of items) {
        left -= weight;
        if (left < 0) return item;
      }
      return items.at(-1)![0];
    },
    chance: (share) => even() < share,
    shuffled: (items) => {
      const order = [...items];
      for (let k = order.length - 1; k > 0; k--) {
        const other = whole(0, k);
        [order[k], order[other]] = [order[other]!, order[k]!];
      }
      return order;
    },
  };
}
