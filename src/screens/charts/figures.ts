/** How coarse figures on screen are, as on the sheet: a price to a tenth of half its 90 % range, parts finer so that they add up. */
import type { PriceEstimate } from "../../domain/appraisal.ts";
import { niceStep, roundingStep } from "../../domain/format.ts";
import { rangeAt } from "./ruler.ts";

const ROUNDING_LEVEL = 0.9;

/** Step that the price and its ranges are rounded to. Without a range: 1. */
export function priceStep(price: Pick<PriceEstimate, "rangeForOneSale">): number {
  const range = rangeAt(price.rangeForOneSale, ROUNDING_LEVEL);
  return range === null ? 1 : roundingStep(range);
}

/** Step of the parts that a price is built up from. */
export function partStep(price: Pick<PriceEstimate, "rangeForOneSale">): number {
  return Math.max(1, Math.min(10, niceStep(priceStep(price) / 50)));
}

/** Step of one ledger row's money: three digits of its largest part, from 1 to 10. */
export function rowStep(money: { own: number; coefficient: number }): number {
  const largest = Math.max(Math.abs(money.own), Math.abs(money.coefficient), 1);
  return Math.max(1, Math.min(10, niceStep(largest / 100)));
}
