/** Where the marks of the every-set strip stand: price across, error down on an axis that gives the best sets more room. */
import { hasAttribute } from "../../domain/attributeSets.ts";
import { type Ruler, ticksOf } from "./ruler.ts";

export interface SetMarks {
  readonly attributes: readonly { readonly key: string; readonly label: string }[];
  readonly price: readonly (number | null)[];
  readonly error: readonly (number | null)[];
}

export interface SetScale {
  readonly prices: Ruler;
  readonly best: number;
  readonly worst: number;
  readonly x: (price: number) => number;
  readonly y: (error: number) => number;
}

export interface Frame {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Room for the bracket of the defensible span above the best set. */
const HEAD_ROOM = 34;
const FOOT_ROOM = 16;
/** Below 1 the best sets get more room than on a plain log axis. */
const POWER = 0.8;

/** Null without a single set that has both a price and an error. */
export function setScale({ price, error }: SetMarks, frame: Frame): SetScale | null {
  let [low, high, best, worst] = [Infinity, -Infinity, Infinity, -Infinity];
  price.forEach((amount, set) => {
    const err = error[set];
    if (amount === null || err === null || err === undefined || !(err > 0)) return;
    low = Math.min(low, amount);
    high = Math.max(high, amount);
    best = Math.min(best, err);
    worst = Math.max(worst, err);
  });
  if (!(low <= high)) return null;
  const margin = Math.max((high - low) * 0.05, Math.abs(high) * 0.002, 1e-9);
  const prices = { low: low - margin, high: high + margin };
  const extent = Math.log(worst / best) || 1;
  const room = frame.bottom - frame.top - HEAD_ROOM - FOOT_ROOM;
  return {
    prices,
    best,
    worst,
    x: (amount) => frame.left + ((amount - prices.low) / (prices.high - prices.low)) * (frame.right - frame.left),
    y: (err) => frame.top + HEAD_ROOM + room * (Math.max(0, Math.log(err / best)) / extent) ** POWER,
  };
}

const HEADS = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8] as const;
const TICK_ROOM = 30;

/** Round errors, far enough apart to be read. */
export function errorTicks({ best, worst, y }: SetScale): number[] {
  const ticks: number[] = [];
  for (let power = Math.floor(Math.log10(best)) - 1; power <= Math.ceil(Math.log10(worst)); power++) {
    for (const head of HEADS) {
      const error = Number((head * 10 ** power).toPrecision(2));
      const last = ticks.at(-1);
      if (error <= best || error > worst * 1.02) continue;
      if (last === undefined || y(error) - y(last) >= TICK_ROOM) ticks.push(error);
    }
  }
  return ticks;
}

export function priceTicks({ prices }: SetScale, width: number) {
  return ticksOf(prices, width, 92);
}

/** The two attributes whose leaving out costs most error, on average over sets: they part the marks into families. */
export function partingAttributes({ attributes, error }: SetMarks): number[] {
  const costs = attributes.map((_, g) => {
    let [sum, pairs] = [0, 0];
    error.forEach((without, set) => {
      const within = hasAttribute(set, g) ? null : error[set + 2 ** g];
      if (without === null || within === null || within === undefined) return;
      sum += Math.log(without / within);
      pairs += 1;
    });
    return pairs === 0 ? 0 : sum / pairs;
  });
  const order = [...costs.keys()].sort((a, b) => costs[b]! - costs[a]!);
  return order.slice(0, 2).filter((g) => costs[g]! > 0.02);
}

/** 0: both in; 1: only the first; 2: only the second; 3: neither. */
export function familyOf(set: number, parting: readonly number[]): 0 | 1 | 2 | 3 {
  const [first, second] = parting;
  const isOut = (g: number | undefined): boolean => g !== undefined && !hasAttribute(set, g);
  return ((isOut(first) ? 2 : 0) + (isOut(second) ? 1 : 0)) as 0 | 1 | 2 | 3;
}

/** The set whose mark is nearest to a point, within `reach` pixels. */
export function nearestSet(
  { price, error }: SetMarks,
  { x, y }: SetScale,
  at: { x: number; y: number },
  reach: number,
): number | null {
  let [nearest, least]: [number | null, number] = [null, reach * reach];
  price.forEach((amount, set) => {
    const err = error[set];
    if (amount === null || err === null || err === undefined) return;
    const distance = (x(amount) - at.x) ** 2 + (y(err) - at.y) ** 2;
    if (distance >= least) return;
    least = distance;
    nearest = set;
  });
  return nearest;
}

/** Sets in the order of price, or of error, for going through them by key. */
export function inOrder(values: readonly (number | null)[]): number[] {
  return [...values.keys()].filter((set) => values[set] !== null).sort((a, b) => values[a]! - values[b]!);
}
