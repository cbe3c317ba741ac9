/** The engraved ruler that prices are read on: its ends, its ticks and where an amount stands. */
import type { Range } from "../../domain/appraisal.ts";
import { formatNumber, niceStep } from "../../domain/format.ts";

export interface Ruler {
  readonly low: number;
  readonly high: number;
}

export interface Tick {
  readonly at: number;
  readonly amount: number;
  /** 2 with a number, 1 half-long, 0 short. */
  readonly rank: 0 | 1 | 2;
}

export function rangeAt(ranges: readonly Range[], level: number): Range | null {
  return ranges.find((range) => Math.abs(range.level - level) < 1e-9) ?? null;
}

function outermost(ranges: readonly Range[]): Ruler | null {
  if (ranges.length === 0) return null;
  return {
    low: Math.min(...ranges.map((range) => range.low)),
    high: Math.max(...ranges.map((range) => range.high)),
  };
}

/** A ruler with room on both sides of the widest of `ranges`; never below 0. */
export function rulerAround(ranges: readonly Range[], room = 0.12): Ruler {
  const outer = outermost(ranges) ?? { low: 0, high: 1 };
  const margin = Math.max((outer.high - outer.low) * room, Math.abs(outer.high) * 0.001, 1e-9);
  return { low: Math.max(0, outer.low - margin), high: outer.high + margin };
}

export function holds(ruler: Ruler, ranges: readonly Range[]): boolean {
  return ranges.every((range) => range.low >= ruler.low && range.high <= ruler.high);
}

export function placeOn(ruler: Ruler, width: number): (amount: number) => number {
  return (amount) => Math.round(((amount - ruler.low) / (ruler.high - ruler.low)) * width * 10) / 10;
}

/** Ticks at round amounts, numbered so that the numbers have `spacing` pixels each. */
export function ticksOf(ruler: Ruler, width: number, spacing: number): Tick[] {
  const perPixel = (ruler.high - ruler.low) / width;
  const numbered = roundUpStep(perPixel * spacing);
  const fine = numbered / 10;
  const at = placeOn(ruler, width);
  const ticks: Tick[] = [];
  const first = Math.ceil(ruler.low / fine - 1e-9);
  for (let k = first; k * fine <= ruler.high + fine * 1e-6 && ticks.length < 2000; k++) {
    ticks.push({ at: at(k * fine), amount: k * fine, rank: k % 10 === 0 ? 2 : k % 5 === 0 ? 1 : 0 });
  }
  return ticks;
}

function roundUpStep(target: number): number {
  const below = niceStep(target);
  if (below >= target) return below;
  const head = Number(below.toExponential()[0]);
  return below * (head === 2 ? 2.5 : 2);
}

/** "35k" on the strip where thousands are round, else the whole number. */
export function shortAmount(amount: number): string {
  const isRound = amount >= 1000 && Math.abs(amount / 1000 - Math.round(amount / 100) / 10) < 1e-9;
  if (!isRound) return formatNumber(amount);
  const thousands = amount / 1000;
  return `${formatNumber(thousands, Number.isInteger(Math.round(thousands * 10) / 10) ? 0 : 1)}k`;
}
