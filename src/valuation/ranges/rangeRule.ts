/**
 * What the range kinds have in common. Symbols: ŷ₀ fitted value of the subject, h₀ its leverage, ω weights of the fit,
 * C = X′ΩX + Λ centred, α = 1 − level.
 */
import type { Range } from "../../domain/appraisal.ts";
import type { RangeKind } from "../../domain/priceModel.ts";
import type { SaleRanges } from "../../domain/saleRange.ts";
import type { Fit, FitRule, SubjectRow } from "../../hedonic/fit.ts";

/** The rule of a refit in which only the sales with kept[i] = 1 count; its weights are 0 for the others. */
export type RefitRule = (kept: Float64Array) => FitRule;

/** Ranges at these levels. Kinds that refit parts of the sales ask `refitRule` for weights and penalties. */
export type RangeRule = (fit: Fit, row: SubjectRow, levels: readonly number[], refitRule?: RefitRule) => SaleRanges;

/** ŷ₀ = ȳ + Σ b_j(x₀j − x̄_j). */
export function fittedAt({ solution, columns }: Pick<Fit, "solution" | "columns">, { x }: SubjectRow): number {
  const { slopes, means, responseMean } = solution;
  return columns.reduce((sum, index, j) => sum + slopes[j]! * (x[index]! - means[j]!), responseMean);
}

/** From the response's scale to money. */
export function toMoney({ design }: Fit): (value: number) => number {
  return design.responseForm === "lnPrice" ? Math.exp : (value) => value;
}

export function withoutRanges(kind: RangeKind, reason: string): SaleRanges {
  return { kind, ranges: [], sentence: reason, guarantee: null };
}

/**
 * From the ⌊α(n + 1)⌋-th smallest of `lows` to the ⌈(1 − α)(n + 1)⌉-th smallest of `highs`, both n long and sorted here in place.
 * A level that needs more than n sales is left out: its range would have no end.
 */
export function orderedRanges(
  fit: Fit,
  lows: Float64Array,
  highs: Float64Array,
  levels: readonly number[],
): readonly Range[] {
  lows.sort();
  highs.sort();
  const n = lows.length;
  const back = toMoney(fit);
  return levels.flatMap((level): Range[] => {
    // ⌈(1 − α)(n + 1)⌉ is n + 1 less this rank. The allowance undoes the rounding of 1 − level.
    const rank = Math.floor((1 - level) * (n + 1) + 1e-9);
    return rank < 1 ? [] : [{ level, low: back(lows[rank - 1]!), high: back(highs[n - rank]!) }];
  });
}

/** "80 % of the time when asked for 90 %"; the least level is floored to a whole percent. */
export function leastLevels(levels: readonly number[], lostBesides = 0): string {
  const least = (level: number) => Math.max(0, Math.floor(100 * (2 * level - 1 - lostBesides) + 1e-9));
  return levels.map((level) => `at ${Math.round(1000 * level) / 10} % at least ${least(level)} %`).join(", ");
}

/**
 * What the promise rests on when sales do not count alike: a penalty stated beforehand treats all sales alike, so that only weights
 * (and a penalty found from the same sales) take the proof away. Null for plain least squares.
 */
export function whatIsHeld({ weights, penalty }: FitRule): string | null {
  if (weights === null && penalty === null) return null;
  const held = weights === null ? "penalties" : penalty === null ? "weights" : "weights and penalties";
  return `The ${held} of the sales are held as they are when a sale is left out, so the usual promise holds nearly, not exactly.`;
}
