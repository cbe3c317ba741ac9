/**
 * The part of a block's moments that belongs to levels of choices, from grouped sums; formulas at the top of `blockMoments.ts`.
 * A level that holds all rows or none is constant: its cross-products stay exactly 0.
 */
import { twoProduct } from "../doubleDouble.ts";
import { type Moments, setBoth } from "../mergeMoments.ts";
import type { BlockLayout } from "./blockLayout.ts";
import type { ColumnPlan } from "./columnPlan.ts";

export interface LevelSums {
  readonly f64: Float64Array;
  readonly plan: ColumnPlan;
  readonly layout: BlockLayout;
  /** Filled here: what belongs to levels. */
  readonly moments: Moments;
  /** s per column of numbers. */
  readonly sums: Float64Array;
}

/** One level: its column number, group, W_l and W_l/W. */
interface Level {
  readonly column: number;
  readonly group: number;
  readonly weight: number;
  readonly share: number;
}

export function setLevels(of: LevelSums): void {
  const { f64, plan, layout, moments } = of;
  const q = plan.columns.length;
  const levels = plan.choices.map((_, choice) => varyingLevels(of, choice));
  levels.forEach((members, choice) => {
    for (const level of members) {
      for (const other of members) {
        const rest = level.group === other.group ? moments.weightSum - level.weight : -other.weight;
        setBoth(moments.crossProducts, q, level.column, other.column, level.share * rest);
      }
      setNumbers(of, choice, level);
    }
  });
  for (const { a, b, at } of layout.pairSums) {
    const { groups } = plan.choices[b]!;
    for (const level of levels[a]!) {
      for (const other of levels[b]!) {
        const both = f64[at / 8 + level.group * groups + other.group]!;
        setBoth(moments.crossProducts, q, level.column, other.column, both - level.share * other.weight);
      }
    }
  }
}

/** Sets the mean of every level of a choice; gives back the levels that vary: those with some rows, but not all. */
function varyingLevels({ f64, plan, layout, moments }: LevelSums, choice: number): Level[] {
  const { weightSum, means, meanTails } = moments;
  const { groups, members } = plan.choices[choice]!;
  const ones = layout.groupSums[choice]! / 8 + plan.numbers.length;
  const weights = Array.from({ length: groups }, (_, group) => f64[ones + group * layout.groupColumns]!);
  const isOneGroup = weights.filter((weight) => weight > 0).length === 1;
  return members.flatMap(({ column, group }) => {
    const weight = weights[group]!;
    if (isOneGroup || weight === 0) {
      means[column] = weight === 0 ? 0 : 1;
      return [];
    }
    const share = weight / weightSum;
    const product = twoProduct(share, weightSum);
    means[column] = share;
    meanTails[column] = (weight - product.hi - product.lo) / weightSum;
    return [{ column, group, weight, share }];
  });
}

function setNumbers({ f64, plan, layout, moments, sums }: LevelSums, choice: number, level: Level): void {
  const q = plan.columns.length;
  const line = layout.groupSums[choice]! / 8 + level.group * layout.groupColumns;
  for (let d = 0; d < sums.length; d++)
    setBoth(moments.crossProducts, q, level.column, plan.numbers[d]!, f64[line + d]! - level.share * sums[d]!);
}
