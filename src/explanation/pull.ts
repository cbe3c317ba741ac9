/**
 * Pull: which sales made this price. The fitted value is an exact weighted sum of the responses, ŷ₀ = Σ w_i y_i with
 *   w_i = ω_i(1/Σω + (x₀ − x̄)'C⁻¹(x_i − x̄)),  C = X'ΩX + Λ centred;  Σ w_i = 1 with an intercept;
 * and the fit without sale i is ŷ₀ − w_i·e_i/(1 − h_i) in closed form (Cook & Weisberg 1982, §2.2), at the weights ω and
 * penalties Λ of the fit. Least squares has ω = 1 and Λ = 0.
 */

import type { Pull, PullReport } from "../domain/appraisal.ts";
import { dayOf } from "../domain/day.ts";
import { formatMoney, formatNumber, niceStep, roundTo } from "../domain/format.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { Fit, SubjectRow } from "../hedonic/fit.ts";
import { numbersOf, valueAt } from "../numerics/column.ts";
import { firstFew } from "./firstFew.ts";

/** Sales listed by name; the others are summed in one row. */
const LISTED = 40;
/** 1 − h below this: the sale is the only one of its kind, and the price without it does not exist. */
const ALONE = 1e-9;

/** n weights in the design's row order. */
export function pullWeights(fit: Fit, row: SubjectRow): Float64Array {
  const { n, columns } = fit.design;
  const k = fit.columns.length;
  const direction = new Float64Array(k);
  for (let a = 0; a < k; a++) {
    let sum = 0;
    for (let b = 0; b < k; b++) {
      sum += fit.solution.inverse[a * k + b]! * (row.x[fit.columns[b]!]! - fit.solution.means[b]!);
    }
    direction[a] = sum;
  }
  const counts = fit.rule.weights;
  const weights = new Float64Array(n).fill(1 / (counts === null ? n : counts.reduce((sum, one) => sum + one, 0)));
  for (let a = 0; a < k; a++) {
    const values = numbersOf(columns[fit.columns[a]!]!.values);
    const mean = fit.solution.means[a]!;
    for (let i = 0; i < n; i++) weights[i]! += direction[a]! * (values[i]! - mean);
  }
  if (counts !== null) for (let i = 0; i < n; i++) weights[i]! *= counts[i]!;
  return weights;
}

export interface PullInput {
  readonly fit: Fit;
  readonly row: SubjectRow;
  readonly sales: SaleColumns;
  /** Fitted value of the subject on the response's scale, and its price. */
  readonly fitted: number;
  readonly amount: number;
  readonly currencyCode: string;
}

/** The sales that pull hardest, by the size of their weight; ties by id. */
export function pull(input: PullInput): PullReport {
  const { fit, sales } = input;
  const weights = pullWeights(fit, input.row);
  const listed = firstFew(
    weights.length,
    LISTED,
    (a, b) =>
      Math.abs(weights[b]!) - Math.abs(weights[a]!) ||
      sales.ids[fit.design.rows[a]!]! - sales.ids[fit.design.rows[b]!]!,
  );
  const top = listed.map((i) => describe(input, weights, i));
  const largestMove = largestMoveOf(input, weights);
  return {
    top,
    restWeight: restOf(weights, listed),
    restCount: weights.length - listed.length,
    negativeCount: weights.filter((weight) => weight < 0).length,
    sentence: pullSentence(input, weights, largestMove),
  };
}

/** Σ of the weights that are not listed. */
function restOf(weights: Float64Array, listed: readonly number[]): number {
  const isListed = new Set(listed);
  let sum = 0;
  for (let i = 0; i < weights.length; i++) if (!isListed.has(i)) sum += weights[i]!;
  return sum;
}

function describe({ fit, row, sales, ...input }: PullInput, weights: Float64Array, i: number): Pull {
  const at = fit.design.rows[i]!;
  const differences: Record<string, number> = {};
  for (const group of fit.groups) {
    const column = group.columns[0]!;
    if (group.form !== "line" || group.isMarket) continue;
    differences[group.key] = valueAt(fit.design.columns[column]!.values, i) - row.x[column]!;
  }
  return {
    sale: sales.ids[at]!,
    reference: sales.references.at(at) ?? null,
    title: sales.titles.at(at)!,
    soldOn: dayOf(sales.soldOn[at]!),
    price: sales.price[at]!,
    channel: sales.channels.at(at)!,
    verified: sales.verified[at] === 1,
    weight: weights[i]!,
    priceWithout: priceWithout(fit, weights, i, input.fitted),
    differences,
  };
}

/** Price of the subject fitted without sale i, or null where that fit does not exist. */
export function priceWithout(fit: Fit, weights: Float64Array, i: number, fitted: number): number | null {
  const rest = 1 - fit.leverages[i]!;
  if (rest < ALONE) return null;
  const without = fitted - (weights[i]! * fit.solution.residuals[i]!) / rest;
  return fit.design.responseForm === "lnPrice" ? Math.exp(without) : without;
}

function largestMoveOf({ fit, fitted, amount }: PullInput, weights: Float64Array): number | null {
  let largest: number | null = null;
  for (let i = 0; i < weights.length; i++) {
    const without = priceWithout(fit, weights, i, fitted);
    if (without !== null) largest = Math.max(largest ?? 0, Math.abs(without - amount));
  }
  return largest;
}

function pullSentence(input: PullInput, weights: Float64Array, largestMove: number | null): string {
  const { n } = input.fit.design;
  const effective = 1 / weights.reduce((sum, weight) => sum + weight * weight, 0);
  const first = `The ${formatNumber(n)} sales weigh like ${formatNumber(effective, effective < 10 ? 1 : 0)} equal ones`;
  if (largestMove === null) return `${first}.`;
  const step = Math.max(1, niceStep(largestMove / 10));
  const move = formatMoney(roundTo(largestMove, step), input.currencyCode);
  return `${first}; leaving any one out moves the price by ${move} at most.`;
}
