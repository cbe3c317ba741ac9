/** The price and its range in a sentence or two, rounded as the sheet rounds them. */
import type { PricePart } from "../domain/appraisal.ts";
import { formatDay, formatMoney, levelWords, roundingStep, roundOutward, roundTo } from "../domain/format.ts";

/** Price and ranges rounded as the sheet rounds them: a step fit for the width of the range, ends outward. */
export function priceSentence(priced: PricePart, currencyCode: string): string {
  const { price, subject } = priced;
  const wide = price.rangeForOneSale.find(({ level }) => level === 0.9) ?? price.rangeForOneSale.at(-1);
  const step = wide === undefined ? 1 : roundingStep(wide);
  const amount = formatMoney(roundTo(price.amount, step), currencyCode);
  const first = `${subject.title} is priced at ${amount} (${price.centre}) as of ${formatDay(subject.effectiveOn)}.`;
  if (wide === undefined)
    return `${first} No range can be given: there are too few sales for the number of attributes.`;
  const { low, high } = roundOutward(wide, step);
  return `${first} ${levelWords(wide.level)} sales of such an item would fall between ${formatMoney(low, currencyCode)} and ${formatMoney(high, currencyCode)}.`;
}
