/** How far coefficients and prices move over attribute sets: spans, signs that turn, and what switching one attribute does. */
import type { CoefficientSpan, SetSwitch, Span } from "../domain/attributeSets.ts";
import { moneyPerUnit } from "./carryOver.ts";
import type { SetTable } from "./setTable.ts";

/** Lowest and highest of the finite values; null without one. */
export function spanOf(values: Iterable<number>): Span | null {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return low <= high ? { low, high } : null;
}

/** One per column that some offered set has, in column order. `average` is the average price. */
export function coefficientSpans(
  sets: SetTable,
  offered: readonly number[],
  defensible: readonly number[],
  average: number,
): CoefficientSpan[] {
  return [...sets.alwaysIn, ...sets.groups].flatMap((group) =>
    group.columns.flatMap((column): CoefficientSpan[] => {
      const values = valuesOf(sets, column, offered);
      const all = spanOf(values);
      if (all === null) return [];
      const ofDefensible = valuesOf(sets, column, defensible);
      const defensibleSpan = spanOf(ofDefensible);
      const [current] = valuesOf(sets, column, [sets.current]);
      const now = current === undefined || Number.isNaN(current) ? null : current;
      const report = { response: sets.fit.design.responseForm, averagePrice: average };
      const money = (b: number): number => b * moneyPerUnit(report, b, group.step);
      const moneySpan = (span: Span): Span => ({ low: money(span.low), high: money(span.high) });
      return [
        {
          attribute: group.key,
          label: group.label,
          level: sets.fit.design.columns[column]!.level,
          stepWords: group.stepWords,
          all,
          defensible: defensibleSpan,
          now,
          money: {
            all: moneySpan(all),
            defensible: defensibleSpan === null ? null : moneySpan(defensibleSpan),
            now: now === null ? null : money(now),
          },
          signs: signsOf(values),
          defensibleSigns: signsOf(ofDefensible),
        },
      ];
    }),
  );
}

/** Coefficients of the column in those sets that have it and whose columns do not depend on each other. */
function valuesOf({ table, fit }: SetTable, column: number, sets: readonly number[]): number[] {
  const width = fit.design.columns.length;
  return sets.flatMap((set) => {
    const value = table.coefficients![set * width + column]!;
    return table.smallestPivots[set] === 0 || Number.isNaN(value) ? [] : [value];
  });
}

function signsOf(values: readonly number[]): { above: number; below: number } {
  return { above: values.filter((b) => b > 0).length, below: values.filter((b) => b < 0).length };
}

/** One per attribute that can be in or out. `prices` per set, NaN for those that do not count. */
export function setSwitches(sets: SetTable, prices: Float64Array, defensible: readonly number[]): SetSwitch[] {
  const isDefensible = new Uint8Array(prices.length);
  for (const set of defensible) isDefensible[set] = 1;
  return sets.groups.map(({ key, label }, g) => {
    const bit = 1 << g;
    const changes: number[] = [];
    const defensibleChanges: number[] = [];
    for (let set = 0; set < prices.length; set++) {
      if ((set & bit) !== 0) continue;
      const change = prices[set + bit]! - prices[set]!;
      if (Number.isNaN(change)) continue;
      changes.push(change);
      if (isDefensible[set] === 1 && isDefensible[set + bit] === 1) defensibleChanges.push(change);
    }
    const having = defensible.filter((set) => (set & bit) !== 0).length;
    const switched = prices[sets.current ^ bit]!;
    return {
      key,
      label,
      pairs: changes.length,
      mean: meanOf(changes),
      span: spanOf(changes),
      meanDefensible: meanOf(defensibleChanges),
      inDefensible: having === 0 ? "never" : having === defensible.length ? "always" : "sometimes",
      priceSwitched: Number.isNaN(switched) ? null : switched,
    };
  });
}

function meanOf(values: readonly number[]): number | null {
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length;
}
