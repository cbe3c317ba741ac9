/**
 * Every attribute set at once: the subject's price and range in each, error out of sample, criteria, the defensible sets and
 * how far price and coefficients move over them, and the price averaged over sets. All sets on the same sales, at the weights
 * and penalties of the fit in use. Ranges as in estimatePrice: ŷ₀ ± t·s·√(1 + h₀).
 */
import type { AttributeSets, DefensibleRule, SetFigures, Span } from "../domain/attributeSets.ts";
import { USUAL_RULE } from "../domain/attributeSets.ts";
import { niceStep, roundingStep } from "../domain/format.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";
import { generalisedErrors } from "../numerics/subsetErrors.ts";
import { averagedPrice, type SetPrices } from "./averagedPrice.ts";
import { setSentences } from "./setSentences.ts";
import { coefficientSpans, setSwitches, spanOf } from "./setSpans.ts";
import {
  backFrom,
  buildSetTable,
  errorsOf,
  isOffered,
  leaveOneOutOf,
  type SetErrors,
  type SetTable,
  type SetTableInput,
  typicalError,
} from "./setTable.ts";
import { type KeptErrors, stackedPrice } from "./stackedPrice.ts";

export interface AttributeSetsInput extends SetTableInput {
  readonly currencyCode: string;
  readonly rule?: DefensibleRule;
}

const LEVEL = 0.9;

/** What does not depend on which sets count as defensible. */
export interface LookedAtSets {
  readonly sets: SetTable;
  readonly offered: readonly number[];
  readonly errorKind: SetErrors["kind"];
  readonly prices: SetPrices;
  readonly error: Float64Array;
  readonly currencyCode: string;
  readonly kept: KeptErrors;
}

export function attributeSets(input: AttributeSetsInput): AttributeSets {
  return judgeSets(lookAtSets(input), input.rule);
}

export function lookAtSets(input: AttributeSetsInput): LookedAtSets {
  const sets = buildSetTable(input);
  const offered = [...sets.table.r2.keys()].filter((set) => isOffered(sets, set));
  const found = errorsOf(sets);
  return {
    sets,
    offered,
    errorKind: found.kind,
    prices: pricesOf(sets, offered),
    error: typicalErrors(sets, found.sums, offered),
    currencyCode: input.currencyCode,
    kept: new Map(),
  };
}

/** Which sets count by the rule, and what follows from that. */
export function judgeSets(looked: LookedAtSets, rule: DefensibleRule = USUAL_RULE): AttributeSets {
  const { sets, offered, errorKind, prices, error, currencyCode } = looked;
  const { fit, groups, alwaysIn, notKnown, moments, current } = sets;
  const back = backFrom(fit.design);
  const defensible = defensibleSets(rule, error, prices.aicc);
  const money = prices.fitted.map(back);
  const switches = setSwitches(sets, money, defensible);
  const named = (some: SetTable["groups"]) => some.map(({ key, label }) => ({ key, label }));
  const result = {
    attributes: named(groups),
    alwaysIn: named(alwaysIn),
    pinned: named(sets.pinned),
    heldIn: named(sets.heldIn),
    heldOut: named(sets.heldOut),
    notKnown: named(notKnown),
    sales: fit.design.n,
    figures: figuresOf(sets, prices, error),
    errorKind,
    leaveOneOut: exactErrors(sets, errorKind, defensible),
    rule,
    defensible,
    current,
    price: spanOf(defensible.map((set) => money[set]!)),
    coefficients: coefficientSpans(sets, offered, defensible, back(moments.means.at(-1)!)),
    switches,
    movesMost: movesMost(switches, money[current]!),
    averaged: fit.rule.penalty === null ? averagedPrice(prices, back) : null,
    stacked: fit.rule.penalty === null ? stackedPrice(sets, prices, defensible, looked.kept) : null,
  };
  const step = stepOf(result.figures, result.averaged, defensible);
  const untested = offered.filter((set) => Number.isNaN(error[set]!)).length;
  return { ...result, step, ...setSentences({ ...result, step }, offered.length, untested, currencyCode) };
}

/** Fitted price, variance for one sale and AICc per set; NaN where the set is not offered, not determined or has no freedom. */
function pricesOf(sets: SetTable, offered: readonly number[]): SetPrices {
  const { table, fit, moments } = sets;
  const count = table.r2.length;
  const empty = (): Float64Array => new Float64Array(count).fill(Number.NaN);
  const [fitted, variances, residualDf, aicc] = [empty(), empty(), empty(), empty()];
  for (const set of offered) {
    const df = moments.rowCount - table.ranks[set]!;
    residualDf[set] = df;
    if (df <= 0 || table.smallestPivots[set] === 0) continue;
    fitted[set] = table.fitted?.[set] ?? Number.NaN;
    if (fit.rule.penalty !== null) continue;
    variances[set] = (table.residualSums[set]! / df) * (1 + (table.leverages?.[set] ?? Number.NaN));
    aicc[set] = criteria(table.residualSums[set]!, moments.rowCount, table.ranks[set]!).aicc;
  }
  return { fitted, variances, residualDf, aicc };
}

/**
 * AICc = −2 ln L + 2K·n/(n − K − 1) and BIC = −2 ln L + K ln n, with −2 ln L = n ln(2πRSS/n) + n and K = p + 1 (s counts
 * too); AICc NaN when n ≤ K + 1, both −Infinity for a fit without error. With weights less a constant of the sales.
 */
export function criteria(residualSum: number, n: number, rank: number): { aicc: number; bic: number } {
  const deviance = n * Math.log((2 * Math.PI * residualSum) / n) + n;
  const k = rank + 1;
  const aicc = n > k + 1 ? deviance + (2 * k * n) / (n - k - 1) : Number.NaN;
  return { aicc, bic: deviance + k * Math.log(n) };
}

function typicalErrors(sets: SetTable, sums: Float64Array, offered: readonly number[]): Float64Array {
  const errors = new Float64Array(sums.length).fill(Number.NaN);
  for (const set of offered) errors[set] = typicalError(sets.fit, sets.moments, sums[set]!);
  return errors;
}

/** After ten folds the exact errors of the current set and the best defensible ones. */
function exactErrors(sets: SetTable, kind: SetErrors["kind"], defensible: readonly number[]) {
  if (kind === "leave-one-out") return [];
  const wanted = [sets.current, ...defensible.filter((set) => set !== sets.current)];
  return leaveOneOutOf(sets, wanted).flatMap(({ set, sum }) =>
    Number.isNaN(sum) ? [] : [{ set, error: typicalError(sets.fit, sets.moments, sum) }],
  );
}

/** Sets within the rule, best first; among equals the lower number. */
function defensibleSets(rule: DefensibleRule, error: Float64Array, aicc: Float64Array): number[] {
  const measure = rule.kind === "error" ? error : aicc;
  const best = spanOf(measure)?.low;
  if (best === undefined) return [];
  const limit = rule.kind === "error" ? best * (1 + rule.share) : best + rule.distance;
  return [...measure.keys()].filter((set) => measure[set]! <= limit).sort((a, b) => measure[a]! - measure[b]! || a - b);
}

function figuresOf(
  sets: SetTable,
  { fitted, variances, residualDf, aicc }: SetPrices,
  error: Float64Array,
): SetFigures {
  const { table, fit, moments } = sets;
  const back = backFrom(fit.design);
  const half = fitted.map((_, set) => {
    const df = residualDf[set]!;
    return df > 0 ? tUpperQuantile((1 - LEVEL) / 2, df) * Math.sqrt(variances[set]!) : Number.NaN;
  });
  const n = moments.rowCount;
  return {
    price: listed(fitted.map(back)),
    low: listed(fitted.map((value, set) => back(value - half[set]!))),
    high: listed(fitted.map((value, set) => back(value + half[set]!))),
    error: listed(error),
    r2: listed(table.r2),
    aicc: listed(aicc),
    bic: listed(
      aicc.map((value, set) =>
        Number.isNaN(value) ? value : criteria(table.residualSums[set]!, n, table.ranks[set]!).bic,
      ),
    ),
    generalisedError: listed(generalisedErrors(table, n).map(Math.sqrt)),
  };
}

function listed(values: Float64Array): (number | null)[] {
  return Array.from(values, (value) => (Number.isFinite(value) ? value : null));
}

/** Without a range half a hundredth of the price. */
function stepOf({ low, high, price }: SetFigures, averaged: Span | null, [best]: readonly number[]): number {
  if (averaged !== null) return roundingStep(averaged);
  const [from, to] = best === undefined ? [null, null] : [low[best]!, high[best]!];
  if (from !== null && to !== null) return roundingStep({ low: from, high: to });
  return best === undefined ? 1 : niceStep((price[best] ?? 0) / 200);
}

function movesMost(switches: AttributeSets["switches"], now: number): string | null {
  const move = ({ priceSwitched }: AttributeSets["switches"][number]): number =>
    priceSwitched === null || Number.isNaN(now) ? -1 : Math.abs(priceSwitched - now);
  const most = [...switches].sort((a, b) => move(b) - move(a))[0];
  return most === undefined || move(most) < 0 ? null : most.key;
}
