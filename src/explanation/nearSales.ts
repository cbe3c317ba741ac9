/**
 * The sales most like the subject, by the model's own measure: how much it would have to adjust them. Adjustment of sale i for
 * attribute g: Σ_j∈g b_j(x₀j − x_ij); gross = Σ_g |adjustment|; adjusted price = price · e^(Σ adjustments) after ln, price + Σ
 * otherwise. Gross adjustment as the measure of likeness: common practice, no source.
 */
import type { NearReport, NearSale } from "../domain/appraisal.ts";
import { dayOf } from "../domain/day.ts";
import { formatMoney, formatNumber, niceStep, roundTo } from "../domain/format.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { isIndicator } from "../numerics/column.ts";
import { firstFew } from "./firstFew.ts";

export const LISTED = 8;

export interface NearInput {
  readonly fit: Fit;
  readonly row: SubjectRow;
  readonly sales: SaleColumns;
  /** n pull weights. */
  readonly weights: Float64Array;
  readonly amount: number;
  readonly currencyCode: string;
}

/** At most `LISTED`; ties by sale number. */
export function nearSales(input: NearInput): NearReport {
  const { fit, sales } = input;
  const adjustments = fit.groups.map((group) => adjustmentsFor(fit, input.row, group));
  const gross = new Float64Array(fit.design.n);
  for (const one of adjustments) for (let i = 0; i < gross.length; i++) gross[i]! += Math.abs(one[i]!);
  const idOf = (i: number): number => sales.ids[fit.design.rows[i]!]!;
  const order = firstFew(gross.length, LISTED, (a, b) => gross[a]! - gross[b]! || idOf(a) - idOf(b));
  const near = order.map((i) => describe(input, adjustments, gross[i]!, i));
  return { sales: near, sentence: sentence(near, input) };
}

/** n adjustments for one attribute. */
function adjustmentsFor(fit: Fit, row: SubjectRow, group: AttributeGroup): Float64Array {
  const result = new Float64Array(fit.design.n);
  for (const index of group.columns) {
    const slope = fit.solution.slopes[fit.columns.indexOf(index)]!;
    const column = fit.design.columns[index]!.values;
    const own = row.x[index]!;
    if (isIndicator(column)) {
      const { codes, level } = column;
      for (let i = 0; i < result.length; i++) result[i]! += slope * (own - (codes[i] === level ? 1 : 0));
    } else for (let i = 0; i < result.length; i++) result[i]! += slope * (own - column[i]!);
  }
  return result;
}

function describe(
  { fit, sales, weights }: NearInput,
  all: readonly Float64Array[],
  gross: number,
  i: number,
): NearSale {
  const at = fit.design.rows[i]!;
  const adjustments = fit.groups
    .map(({ key, label }, g) => ({ key, label, amount: all[g]![i]! }))
    .filter(({ amount }) => amount !== 0);
  const net = adjustments.reduce((sum, { amount }) => sum + amount, 0);
  const price = fit.design.prices[i]!;
  const isLn = fit.design.responseForm === "lnPrice";
  return {
    sale: sales.ids[at]!,
    reference: sales.references.at(at) ?? null,
    title: sales.titles.at(at)!,
    soldOn: dayOf(sales.soldOn[at]!),
    price,
    channel: sales.channels.at(at)!,
    verified: sales.verified[at] === 1,
    weight: weights[i]!,
    gross: isLn ? Math.expm1(gross) : gross,
    adjusted: isLn ? price * Math.exp(net) : price + net,
    adjustments: adjustments.map((one) => (isLn ? { ...one, amount: Math.expm1(one.amount) } : one)),
  };
}

function sentence(near: readonly NearSale[], { amount, currencyCode }: NearInput): string {
  if (near.length === 0) return "There is no sale to compare with.";
  const prices = near.map(({ adjusted }) => adjusted).sort((a, b) => a - b);
  const middle = prices.length >> 1;
  const median = prices.length % 2 === 1 ? prices[middle]! : (prices[middle - 1]! + prices[middle]!) / 2;
  const step = Math.max(1, niceStep(amount / 200));
  const money = (value: number): string => formatMoney(roundTo(value, step), currencyCode);
  if (near.length === 1)
    return `The one sale, adjusted to this item, comes to ${money(prices[0]!)}; the model says ${money(amount)}.`;
  return `The ${formatNumber(near.length)} sales most like this item, adjusted to it, run from ${money(prices[0]!)} to ${money(prices.at(-1)!)}, the middle at ${money(median)}; the model says ${money(amount)}.`;
}
