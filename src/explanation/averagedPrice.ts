/**
 * The subject's price averaged over attribute sets by Akaike weights, w = e^(−Δ/2)/Σ e^(−Δ/2) with Δ the distance from the
 * least AICc (Burnham & Anderson 2002, section 2.9); the variance for one sale is that within sets and between them,
 * Σ w (s²(1 + h) + (ŷ − ȳ)²) (the same, section 4.3; averaged as Buckland, Burnham & Augustin 1997 do, with variances).
 */
import type { AveragedPrice } from "../domain/attributeSets.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";

export interface SetPrices {
  /** Per set on the response's scale. */
  readonly fitted: Float64Array;
  /** s²(1 + h₀), and n − p. */
  readonly variances: Float64Array;
  readonly residualDf: Float64Array;
  /** NaN for a set that does not count. */
  readonly aicc: Float64Array;
}

const LEVEL = 0.9;
/** Sets below this weight are not listed. */
const LISTED = 0.01;

/** Null when no set has a price and an AICc. */
export function averagedPrice(prices: SetPrices, back: (value: number) => number): AveragedPrice | null {
  const { fitted, variances, aicc } = prices;
  const weights = akaikeWeights(aicc, (set) => Number.isFinite(fitted[set]!) && Number.isFinite(variances[set]!));
  return weights === null ? null : mixedPrice(prices, weights, back);
}

/** The average by these weights, per set, summing to 1. t is read at the average of the sets' degrees of freedom. */
export function mixedPrice(
  { fitted, variances, residualDf }: SetPrices,
  weights: Float64Array,
  back: (value: number) => number,
): AveragedPrice {
  const mean = weightedSum(weights, (set) => fitted[set]!);
  const within = weightedSum(weights, (set) => variances[set]!);
  const between = weightedSum(weights, (set) => (fitted[set]! - mean) ** 2);
  const t = tUpperQuantile(
    (1 - LEVEL) / 2,
    weightedSum(weights, (set) => residualDf[set]!),
  );
  const half = t * Math.sqrt(within + between);
  const halfWithin = t * Math.sqrt(within);
  const width = back(mean + half) - back(mean - half);
  const listed = [...weights].flatMap((weight, set) => (weight > LISTED ? [{ set, weight }] : []));
  return {
    price: back(mean),
    low: back(mean - half),
    high: back(mean + half),
    addedWidth: width - (back(mean + halfWithin) - back(mean - halfWithin)),
    weights: listed.sort((a, b) => b.weight - a.weight || a.set - b.set),
  };
}

/** Weights that sum to 1, 0 for sets that do not count; null when none does. */
export function akaikeWeights(aicc: Float64Array, counts: (set: number) => boolean): Float64Array | null {
  let least = Number.POSITIVE_INFINITY;
  aicc.forEach((value, set) => {
    if (Number.isFinite(value) && counts(set)) least = Math.min(least, value);
  });
  if (least === Number.POSITIVE_INFINITY) return null;
  const raw = aicc.map((value, set) => (Number.isFinite(value) && counts(set) ? Math.exp((least - value) / 2) : 0));
  const sum = raw.reduce((total, weight) => total + weight, 0);
  return raw.map((weight) => weight / sum);
}

function weightedSum(weights: Float64Array, figure: (set: number) => number): number {
  let sum = 0;
  for (let set = 0; set < weights.length; set++) if (weights[set]! > 0) sum += weights[set]! * figure(set);
  return sum;
}
