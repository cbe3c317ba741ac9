/** What setting sales aside would do to the price on the table, as far as the appraisal's pull tells it. */
import type { PricePart } from "../../domain/appraisal.ts";
import { formatMoney, formatNumber, formatPercent, roundingStep, roundTo } from "../../domain/format.ts";
import type { Sale } from "../../domain/sale.ts";
import type { SaleState } from "./evidenceState.ts";

export const REASONS = [
  "forced sale",
  "part of a larger deal",
  "same lot twice",
  "price cannot be verified",
  "not comparable",
] as const;

/** "forced sale: seized by the court", "forced sale", or the words alone. Empty when nothing was said. */
export function reasonOf(chosen: string | null, words: string): string {
  const said = words.trim();
  if (chosen === null) return said;
  return said === "" ? chosen : `${chosen}: ${said}`;
}

function signedMoney(amount: number, currencyCode: string): string {
  const money = formatMoney(amount, currencyCode);
  return amount > 0 ? `+${money}` : money;
}

function oneSale(priced: PricePart, sale: Sale, currencyCode: string): string {
  const { top, restCount } = priced.pull;
  const pull = top.find((one) => one.sale === sale.id);
  if (pull === undefined) {
    const least = top[top.length - 1];
    if (least === undefined || restCount === 0) return "It does not pull this price.";
    return `It is not among the ${formatNumber(top.length)} sales that pull hardest on this price: it carries less than ${formatPercent(Math.abs(least.weight), 1)} of it.`;
  }
  const carries = `It carries ${formatPercent(pull.weight, 1)} of this price.`;
  if (pull.priceWithout === null) return `${carries} Without it there would be no price.`;
  const range = priced.price.rangeForOneSale.find(({ level }) => level === 0.9) ?? priced.price.rangeForOneSale[0];
  const step = range === undefined ? 1 : roundingStep(range);
  const now = priced.price.amount;
  const move = signedMoney(roundTo(pull.priceWithout - now, Math.max(1, step / 10)), currencyCode);
  const [from, to] = [now, pull.priceWithout].map((amount) => formatMoney(roundTo(amount, step), currencyCode));
  const moved = from === to ? `it stays at ${from} as rounded` : `from ${from} to ${to} as rounded`;
  return `${carries} Without it the price moves by ${move}: ${moved}.`;
}

/** `states`: of each sale now. Null while there is nothing priced: the price can't be spoken of. */
export function setAsideWords(
  priced: PricePart | null,
  sales: readonly Sale[],
  states: readonly SaleState[],
  currencyCode: string,
): string {
  const isEvidence = states.map(({ mark }) => mark === "in");
  if (!isEvidence.some(Boolean)) {
    return sales.length === 1
      ? `It is not evidence now (${states[0]!.words}), so the price stays.`
      : "None of them is evidence now, so the price stays.";
  }
  if (priced === null) return "There is no price on the table that it could move.";
  if (sales.length === 1) return oneSale(priced, sales[0]!, currencyCode);
  const weights = sales.flatMap((sale) =>
    priced.pull.top.filter((one) => one.sale === sale.id).map((one) => one.weight),
  );
  const listed = priced.pull.top.length;
  if (weights.length === 0)
    return `None of them is among the ${formatNumber(listed)} sales that pull hardest on this price.`;
  const sum = weights.reduce((total, weight) => total + weight, 0);
  return `${formatNumber(weights.length)} of the ${formatNumber(sales.length)} ${weights.length === 1 ? "is" : "are"} among the sales that pull hardest; together they carry ${formatPercent(sum, 1)} of this price. The strip shows the move at once.`;
}
