/** Attribute sets in words, and how coarse the figures of this place are. */
import { type EverySet, hasAttribute } from "../../../domain/attributeSets.ts";
import { listWords, lowerStart, niceStep } from "../../../domain/format.ts";

const NAMED = 3;

/** "all ten attributes", "without age and hours", "only make and hours", "no attribute". */
export function setName({ attributes }: Pick<EverySet, "attributes">, set: number): string {
  const inside = attributes.filter((_, g) => hasAttribute(set, g)).map(({ label }) => lowerStart(label));
  const out = attributes.filter((_, g) => !hasAttribute(set, g)).map(({ label }) => lowerStart(label));
  if (out.length === 0) return `all ${attributes.length} attributes`;
  if (inside.length === 0) return "no attribute";
  return inside.length < out.length ? `only ${shortened(inside)}` : `without ${shortened(out)}`;
}

function shortened(names: readonly string[]): string {
  if (names.length <= NAMED + 1) return listWords(names);
  return listWords([...names.slice(0, NAMED), `${names.length - NAMED} more`]);
}

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
