/**
 * From the model's price to the printed one: the valuer's own adjustments, then the rounding rule.
 * Rounding step: a tenth of half the 90 % range, of the form 1, 2 or 5 × 10^k; range ends go outward, so that rounding never
 * narrows a range. The range for the average has a step of its own, made the same way.
 */
import type { PricePart, Range } from "../domain/appraisal.ts";
import { roundingStep, roundOutward, roundTo } from "../domain/format.ts";
import type { Conclusion, SheetRequest } from "../domain/sheetRecord.ts";

/** The level that the rounding step is taken from. */
const RULE_LEVEL = 0.9;

/** The range whose level is 90 %, or the nearest to it; null where there is none. */
export function ruleRange(ranges: readonly Range[]): Range | null {
  return ranges.reduce<Range | null>((best, range) => {
    const nearer = best === null || Math.abs(range.level - RULE_LEVEL) < Math.abs(best.level - RULE_LEVEL);
    return nearer ? range : best;
  }, null);
}

/** Step of a set of ranges; 1 where there is none. */
export function stepOf(ranges: readonly Range[]): number {
  const range = ruleRange(ranges);
  return range === null ? 1 : roundingStep(range);
}

function rounded(ranges: readonly Range[], shift: number, step: number): Conclusion["rangeForOneSale"] {
  return ranges.map(({ level, low, high }) => ({
    level,
    ...roundOutward({ low: low + shift, high: high + shift }, step),
  }));
}

/**
 * The printed price and its ranges. An adjustment moves the price and both ranges by the same money.
 * One worked value: price 38,620.9, 90 % range 33,090 to 45,070 → step 500, price 38,500, range 33,000 to 45,500.
 */
export function concludePrice(priced: Pick<PricePart, "price">, adjustments: SheetRequest["adjustments"]): Conclusion {
  const { amount, rangeForOneSale, rangeForAverage } = priced.price;
  const shift = adjustments.reduce((sum, one) => sum + one.amount, 0);
  const adjusted = amount + shift;
  const step = stepOf(rangeForOneSale);
  return {
    modelAmount: amount,
    adjusted,
    roundingStep: step,
    amount: roundTo(adjusted, step),
    rangeForOneSale: rounded(rangeForOneSale, shift, step),
    rangeForAverage: rounded(rangeForAverage, shift, stepOf(rangeForAverage)),
  };
}
