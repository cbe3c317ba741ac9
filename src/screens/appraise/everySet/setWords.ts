/** How coarse the figures of this place are, and what counts before the answer is there. */
import type { EverySet } from "../../../domain/attributeSets.ts";
import { niceStep } from "../../../domain/format.ts";

/** Finer than the step of the price, for telling sets apart. */
export function fineStepOf({ step }: Pick<EverySet, "step">): number {
  return niceStep(step / 5);
}

/** Step of amounts that are read beside each other: two to three digits of the largest. */
export function amountStep(amounts: readonly number[]): number {
  const largest = Math.max(1, ...amounts.map(Math.abs));
  return Math.max(1, niceStep(largest / 200));
}

/** Sets that count while the answer for this share is still awaited: those within it by the marks. */
export function countWithin({ marks }: Pick<EverySet, "marks">, share: number): { limit: number; count: number } {
  let best = Number.POSITIVE_INFINITY;
  for (const error of marks.error) if (error !== null && error < best) best = error;
  const limit = best * (1 + share);
  let count = 0;
  for (const error of marks.error) if (error !== null && error <= limit) count += 1;
  return { limit, count };
}
