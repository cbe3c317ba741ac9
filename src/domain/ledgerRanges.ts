/**
 * Ranges of the parts of a ledger row in money per step: part ± t·error, 95 % (errors: Gelbach 2016). Printed no finer than
 * the second digit of the half range: a digit that the error does not bear is no digit.
 */
import type { LedgerRow } from "./appraisal.ts";
import { formatNumber, lowerStart, roundTo } from "./format.ts";

export interface PartRange {
  /** Null: the own part. */
  readonly from: string | null;
  /** "own part", "carried for age" */
  readonly name: string;
  readonly amount: number;
  /** Half the 95 % range; null where no spread is known. */
  readonly halfRange: number | null;
}

/** Own part first, then every carried part in the row's order. */
export function partRanges({ carriedParts, money, errors = null }: LedgerRow): PartRange[] {
  const own = { from: null, name: "own part", amount: money.own, halfRange: errors && errors.t95 * errors.moneyOwn };
  const carried = money.carried.map(({ from, amount }) => {
    const error = errors?.moneyCarried.find((one) => one.from === from)?.amount ?? null;
    const label = carriedParts.find((one) => one.from === from)?.fromLabel ?? from;
    const halfRange = errors === null || error === null ? null : errors.t95 * error;
    return { from, name: `carried for ${lowerStart(label)}`, amount, halfRange };
  });
  return [own, ...carried];
}

/** Step of the half range's second digit: 163 → 10, 1.63 → 0.1. Guards: null or 0 → 1. */
export function errorStep(halfRange: number | null): number {
  if (halfRange === null || !(halfRange > 0) || !Number.isFinite(halfRange)) return 1;
  return 10 ** (Math.floor(Math.log10(halfRange)) - 1);
}

/** "−710 ± 160", "own part" and all; without a range the amount alone. The range is never shown narrower than it is. */
export function partWords({ name, amount, halfRange }: PartRange): string {
  return `${name} ${amountWords(amount, halfRange)}`;
}

/** "−710 ± 160": both to the second digit of the half range, money no finer than `least`. */
export function amountWords(amount: number, halfRange: number | null, least = 1): string {
  const step = Math.max(least, errorStep(halfRange));
  const shown = formatNumber(roundTo(amount, step));
  if (halfRange === null) return shown;
  return `${shown}\u00a0±\u00a0${formatNumber(Math.max(step, Math.ceil(halfRange / step - 1e-9) * step))}`;
}

/** "own part −710 ± 160; carried for age −1,430 ± 210"; null where no spread is known. */
export function rowRangeWords(row: LedgerRow): string | null {
  const parts = partRanges(row);
  return parts.some(({ halfRange }) => halfRange === null) ? null : parts.map(partWords).join("; ");
}
