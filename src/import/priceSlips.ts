/**
 * Prices that look ten or a hundred times off. A price is doubted only when it lies far outside the prices of its own file and
 * the shifted one lies well inside: a class whose prices truly spread that far is left alone.
 */
import { formatMoney, majorOf } from "../domain/format.ts";
import type { HeldBackReason } from "../domain/importRecord.ts";
import type { NewSale } from "../domain/sale.ts";
import { asWritten, type Marks } from "./readNumber.ts";

/** Too few prices say nothing about what is usual. */
const FEWEST = 20;
/** Never doubt what is less than six times off the middle, nor what is within five robust standard deviations (ln). */
const NEAR = Math.log(6);
const SPREADS = 5;
/** Median absolute deviation → standard deviation under the normal law. */
const MAD_TO_SD = 1.4826;
const SHIFTS = [
  { factor: 10, words: "About a tenth of" },
  { factor: 100, words: "About a hundredth of" },
  { factor: 0.1, words: "About ten times" },
  { factor: 0.01, words: "About a hundred times" },
];

function median(values: Float64Array): number {
  const sorted = values.slice().sort();
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

export function priceSlips<T extends { readonly sale: NewSale }>(
  drafts: readonly T[],
  column: string | null,
  marks: Marks,
): [T, HeldBackReason][] {
  if (drafts.length < FEWEST) return [];
  const lnPrices = Float64Array.from(drafts, ({ sale }) => Math.log(sale.priceMinor));
  const middle = median(lnPrices);
  const spread = MAD_TO_SD * median(lnPrices.map((value) => Math.abs(value - middle)));
  const far = Math.max(NEAR, SPREADS * spread);
  const slips: [T, HeldBackReason][] = [];
  drafts.forEach((draft, k) => {
    const off = lnPrices[k]! - middle;
    if (Math.abs(off) <= far) return;
    const shift = SHIFTS.find(({ factor }) => Math.abs(off + Math.log(factor)) <= Math.max(Math.log(2), 2 * spread));
    if (shift === undefined) return;
    const { priceMinor, currencyCode } = draft.sale;
    const major = majorOf(priceMinor, currencyCode);
    const usual = formatMoney(majorOf(Math.exp(middle), currencyCode), currencyCode);
    const suggestion = asWritten(String(Number((major * shift.factor).toPrecision(12))), marks);
    const reason = `${shift.words} the middle price in this file, ${usual}.`;
    slips.push([draft, { column, value: asWritten(String(major), marks), reason, suggestion }]);
  });
  return slips;
}
