/**
 * The arithmetic of the benchmark: times taken in turn in one run, medians, ratios with their spread, and whether a reach is
 * met. A ratio is reference time / ours: above 1 ours is faster.
 */

/** One number of the table. */
export interface Figure {
  /** Id of the row of `rows.ts` it belongs to. */
  readonly row: string;
  /** What it is, or what it is held against. */
  readonly what: string;
  readonly unit: "×" | "ms" | "µs" | "digits" | "MB" | "exponent";
  readonly value: number;
  readonly low: number;
  readonly high: number;
  /** What is to be reached, or null for a number that is only shown. */
  readonly reach: number | null;
  readonly better: "more" | "less";
  /** The times behind a ratio, milliseconds by round. */
  readonly oursMs?: readonly number[];
  readonly referenceMs?: readonly number[];
}

/** A figure of the table that could not be taken, and why. */
export interface Missing {
  readonly row: string;
  readonly what: string;
  readonly why: string;
}

/** Work that says itself how long it took, in milliseconds. */
export type Timed = () => number | Promise<number>;

export const ROUNDS = 5;

/** The middle value, the mean of the two middle ones for an even count; NaN for none. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = Math.floor(sorted.length / 2);
  if (sorted.length === 0) return Number.NaN;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

/** Milliseconds of one run of `work`; the result is handed to nobody but must not be optimised away, so it is looked at. */
export function timeOnce(work: () => unknown): number {
  const start = performance.now();
  const result = work();
  const ms = performance.now() - start;
  if (result === undefined) throw new Error("timed work must give a result");
  return ms;
}

/** One warm-up of each, then `rounds` rounds in which all take their turn. Milliseconds by contender and round. */
export async function takeTurns(contenders: readonly Timed[], rounds: number = ROUNDS): Promise<number[][]> {
  for (const run of contenders) await run();
  const times: number[][] = contenders.map(() => []);
  for (let round = 0; round < rounds; round++) {
    for (const [at, run] of contenders.entries()) times[at]!.push(await run());
  }
  return times;
}

type Named = Pick<Figure, "row" | "what">;

/** Median of the reference over the median of ours; spread: least and greatest ratio of one round. */
export function ratioFigure(
  named: Named,
  oursMs: readonly number[],
  referenceMs: readonly number[],
  reach: number | null,
): Figure {
  const ratios = oursMs.map((ours, round) => referenceMs[round]! / ours);
  return {
    ...named,
    unit: "×",
    value: median(referenceMs) / median(oursMs),
    low: Math.min(...ratios),
    high: Math.max(...ratios),
    reach,
    better: "more",
    oursMs,
    referenceMs,
  };
}

/** Median of values of one kind with their least and greatest. */
export function plainFigure(
  named: Named,
  unit: Figure["unit"],
  values: readonly number[],
  reach: number | null = null,
  better: Figure["better"] = "less",
): Figure {
  return { ...named, unit, value: median(values), low: Math.min(...values), high: Math.max(...values), reach, better };
}

/** Null where nothing is to be reached. */
export function isMet({ value, reach, better }: Figure): boolean | null {
  if (reach === null) return null;
  return better === "more" ? value >= reach : value <= reach;
}

/** Slope of ln time on ln n by least squares: 1 for time in proportion to n. */
export function growthExponent(sizes: readonly number[], times: readonly number[]): number {
  const x = sizes.map(Math.log);
  const y = times.map(Math.log);
  const mean = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
  const [mx, my] = [mean(x), mean(y)];
  const sxy = x.reduce((sum, value, i) => sum + (value - mx) * (y[i]! - my), 0);
  return sxy / x.reduce((sum, value) => sum + (value - mx) ** 2, 0);
}
