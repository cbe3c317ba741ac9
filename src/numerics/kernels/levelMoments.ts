/**
 * The part of a block's moments that belongs to levels of choices, from grouped sums; formulas at the top of `blockMoments.ts`.
 * A level that holds all rows or none is constant: its cross-products stay exactly 0.
 */
import { twoProduct } from "../doubleDouble.ts";
import type { Moments } from "../mergeMoments.ts";
import type { BlockLayout } from "./blockLayout.ts";
import type { ColumnPlan } from "./columnPlan.ts";

export interface LevelSums {
  readonly f64: Float64Array;
  readonly plan: ColumnPlan;
  readonly layout: BlockLayout;
  /** Filled here: means and tails of the levels. */
  readonly moments: Moments;
  /** s per column of numbers. */
  readonly sums: readonly number[];
  /** Rows per choice and group. */
  readonly counts: readonly Uint32Array[];
  /** Sets S_jk and S_kj. */
  readonly set: (j: number, k: number, value: number) => void;
}

/** One level: its column number, choice, group, W_l and W_l/W. */
interface Level {
  readonly column: number;
  readonly choice: number;
  readonly group: number;
  readonly weight: number;
  readonly share: number;
}

export function setLevels(sums: LevelSums): void {
  const levels = sums.plan.choices.map((_, c) => varyingLevels(sums, c));
  for (const members of levels) {
    for (const level of members) {
      for (const other of members) sums.set(level.column, other.column, withinChoice(sums, level, other));
      setNumbers(sums, level);
    }
  }
  for (const { a, b, at } of sums.layout.pairSums) {
    const { groups } = sums.plan.choices[b]!;
    for (const level of levels[a]!) {
      for (const other of levels[b]!) {
        const both = sums.f64[at / 8 + level.group * groups + other.group]!;
        sums.set(level.column, other.column, both - level.share * other.weight);
      }
    }
  }
}

/** Sets the mean of every level of a choice; gives back the levels that vary. */
function varyingLevels({ f64, plan, layout, moments, counts }: LevelSums, choice: number): Level[] {
  const { rowCount, weightSum, means, meanTails } = moments;
  return plan.choices[choice]!.members.flatMap(({ column, group }) => {
    const count = counts[choice]![group]!;
    if (count === 0 || count === rowCount) {
      means[column] = count === 0 ? 0 : 1;
      return [];
    }
    const weight = f64[layout.groupSums[choice]! / 8 + group * layout.groupColumns]!;
    const share = weight / weightSum;
    const product = twoProduct(share, weightSum);
    means[column] = share;
    meanTails[column] = (weight - product.hi - product.lo) / weightSum;
    return [{ column, choice, group, weight, share }];
  });
}

function withinChoice({ moments }: LevelSums, level: Level, other: Level): number {
  return level.share * (level.group === other.group ? moments.weightSum - level.weight : -other.weight);
}

function setNumbers({ f64, plan, layout, sums, set }: LevelSums, level: Level): void {
  const line = layout.groupSums[level.choice]! / 8 + level.group * layout.groupColumns;
  for (let d = 0; d < plan.numbers.length; d++) {
    const spread = f64[line + d + 1]! - level.share * sums[d]!;
    set(level.column, plan.numbers[d]!, spread);
  }
}
