/** Recency weights: ½^(months before the effective date ÷ half-life), at a mean of one. A preference, not a precision. */
import { DAYS_PER_MONTH, type Day, dayNumber } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import { formatNumber } from "../domain/format.ts";

export interface Recency {
  /** n. */
  readonly weights: Float64Array;
  readonly note: string;
}

/**
 * Counted from `effectiveOn`, or from the last sale without it; a sale after that day counts as one of that day. Null without a
 * half-life. Refuses (AppError, family "fit") a half-life so short that no sale counts. `soldOn`: day numbers, ascending.
 */
export function recencyWeights(
  halfLifeMonths: number | null,
  soldOn: Float64Array,
  effectiveOn: Day | null,
): Recency | null {
  if (halfLifeMonths === null) return null;
  const stated = effectiveOn === null ? null : dayNumber(effectiveOn);
  const until = stated ?? soldOn.at(-1)!;
  const weights = soldOn.map((day) => 0.5 ** (Math.max(0, until - day) / DAYS_PER_MONTH / halfLifeMonths));
  const mean = weights.reduce((sum, one) => sum + one, 0) / weights.length;
  const months = formatNumber(halfLifeMonths, Number.isInteger(halfLifeMonths) ? 0 : 1);
  const from = stated === null ? "the last sale" : "the effective date";
  if (!(mean > 1e-200)) {
    throw new AppError({
      family: "fit",
      code: "half-life",
      what: `With weights that halve every ${months} months no sale is left that counts.`,
      where: "Price model, older sales",
      whatToDo: "Choose a longer half-life, or let every sale count alike.",
    });
  }
  return {
    weights: weights.map((one) => one / mean),
    note: `A sale counts half for every ${months} months before ${from}.`,
  };
}
