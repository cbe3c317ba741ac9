/**
 * Price and ln price side by side, by the one measure that is in the same unit for both: what each sale's price is missed by
 * when that sale is left out, in money. Symbols: ẏ_i = y_i − e_i/(1 − h_i) the response at sale i without it. After a
 * logarithm exp ẏ_i is a median; for the root mean square, which is about means, it is multiplied by the mean of exp e over
 * the other sales (smearing: Duan 1983). The median error is taken from the medians as they are.
 */
import { formatPercent } from "../domain/format.ts";
import type { ResponseForm } from "../domain/priceModel.ts";
import { leverages } from "../numerics/leverages.ts";
import { solveLeastSquares } from "../numerics/solveLeastSquares.ts";
import { weightedMedian } from "../numerics/weightedMedian.ts";
import { inClassWords, modelColumns } from "./estimators/modelColumns.ts";
import { groundOf } from "./estimators/partialPooling.ts";
import type { AttributeGroup, Design, FitRule } from "./fit.ts";

/** Left-out errors; money in major units, fractions of the sale's own price. */
export interface LeftOutErrors {
  /** √ of the (weighted) mean of (price − mean price predicted)². */
  readonly rootMeanSquare: number;
  readonly rootMeanSquareFraction: number;
  /** Median of |price − median price predicted|. */
  readonly medianAbsolute: number;
  readonly medianAbsoluteFraction: number;
}

export interface ResponseComparison {
  readonly price: LeftOutErrors;
  readonly lnPrice: LeftOutErrors;
  /** Null: the two measures of money disagree. */
  readonly better: ResponseForm | null;
  /** Sales not compared, because a model without them could not price them (leverage 1). */
  readonly skipped: number;
  readonly sentence: string;
}

/** A leverage this near 1: without the sale its price cannot be worked out. */
const FULL_LEVERAGE = 1 - 1e-9;

/**
 * Both fits are least squares at the recency weights over the same columns. Refuses (AppError, family "fit") too few sales and
 * dependent columns.
 */
export function compareResponses(design: Design, groups: readonly AttributeGroup[]): ResponseComparison {
  const { rule } = groundOf(design, groups);
  const logs = design.prices.map(Math.log);
  const direct = leftOut(design, groups, rule, design.prices);
  const logged = leftOut(design, groups, rule, logs);
  const compared = Int32Array.from([...direct.leverages.keys()].filter((i) => direct.leverages[i]! <= FULL_LEVERAGE));
  const smear = smearingWithout(logged.residuals, rule.weights);
  const measure = (meanAt: (i: number) => number, medianAt: (i: number) => number) =>
    errorsOver(compared, design.prices, rule.weights, meanAt, medianAt);
  const price = measure(
    (i) => direct.predicted[i]!,
    (i) => direct.predicted[i]!,
  );
  const lnPrice = measure(
    (i) => Math.exp(logged.predicted[i]!) * smear(i),
    (i) => Math.exp(logged.predicted[i]!),
  );
  const better = betterOf(price, lnPrice);
  const skipped = design.n - compared.length;
  return { price, lnPrice, better, skipped, sentence: sentenceOf(price, lnPrice, better, skipped) };
}

interface LeftOut {
  readonly residuals: Float64Array;
  readonly leverages: Float64Array;
  /** ẏ, n. */
  readonly predicted: Float64Array;
}

function leftOut(design: Design, groups: readonly AttributeGroup[], rule: FitRule, response: Float64Array): LeftOut {
  const { values, penalty } = modelColumns(design, groups, rule);
  const { weights } = rule;
  const options = {
    intercept: true,
    ...(weights === null ? {} : { weights }),
    ...(penalty === null ? {} : { penalty }),
  };
  const solution = inClassWords(design, groups, () => solveLeastSquares(values, response, options));
  const { residuals } = solution;
  const h = leverages(values, solution, weights);
  return { residuals, leverages: h, predicted: response.map((y, i) => y - residuals[i]! / (1 - h[i]!)) };
}

/** Mean of exp e over all sales but one. */
function smearingWithout(residuals: Float64Array, weights: Float64Array | null): (i: number) => number {
  const part = (i: number) => (weights === null ? 1 : weights[i]!);
  const total = residuals.reduce((sum, e, i) => sum + part(i) * Math.exp(e), 0);
  const weight = residuals.reduce((sum, _, i) => sum + part(i), 0);
  return (i) => (total - part(i) * Math.exp(residuals[i]!)) / (weight - part(i));
}

function errorsOver(
  compared: Int32Array,
  prices: Float64Array,
  weights: Float64Array | null,
  meanAt: (i: number) => number,
  medianAt: (i: number) => number,
): LeftOutErrors {
  const kept = weights && Float64Array.from(compared, (i) => weights[i]!);
  const means = Float64Array.from(compared, (i) => prices[i]! - meanAt(i));
  const medians = Float64Array.from(compared, (i) => Math.abs(prices[i]! - medianAt(i)));
  const inParts = (values: Float64Array) => values.map((value, at) => value / prices[compared[at]!]!);
  return {
    rootMeanSquare: rootMean(means, kept),
    rootMeanSquareFraction: rootMean(inParts(means), kept),
    medianAbsolute: weightedMedian(medians, kept),
    medianAbsoluteFraction: weightedMedian(inParts(medians), kept),
  };
}

function rootMean(values: Float64Array, weights: Float64Array | null): number {
  const total = weights === null ? values.length : weights.reduce((sum, w) => sum + w, 0);
  return Math.sqrt(values.reduce((sum, value, i) => sum + (weights?.[i] ?? 1) * value * value, 0) / total);
}

function betterOf(price: LeftOutErrors, lnPrice: LeftOutErrors): ResponseForm | null {
  const bySquare = lnPrice.rootMeanSquare < price.rootMeanSquare;
  const byMedian = lnPrice.medianAbsolute < price.medianAbsolute;
  return bySquare === byMedian ? (bySquare ? "lnPrice" : "price") : null;
}

function sentenceOf(
  price: LeftOutErrors,
  lnPrice: LeftOutErrors,
  better: ResponseForm | null,
  skipped: number,
): string {
  const percent = ({ medianAbsoluteFraction }: LeftOutErrors) => formatPercent(medianAbsoluteFraction, 1);
  const found =
    `Left out one by one, half of the sales are missed by more than ${percent(price)} with the price and ` +
    `${percent(lnPrice)} with its logarithm (its median, turned back to money).`;
  const verdict =
    better === null
      ? "The typical miss and the root mean square (of means, corrected by smearing) speak for different ones."
      : `The ${better === "lnPrice" ? "logarithm" : "price itself"} misses less in money, typically and in the root mean square (of means, corrected by smearing).`;
  if (skipped === 0) return `${found} ${verdict}`;
  const who =
    skipped === 1 ? "One sale that is the only one of its kind" : `${skipped} sales that are alone of their kind`;
  return `${found} ${verdict} ${who} could not be compared.`;
}
