/**
 * Price index of the class: the level of each calendar quarter against the first, for items alike, as the model's market movement
 * has it at the middle of the quarter's sales. After ln the level is 100·e^(c − v/2) (Kennedy 1981), its range 100·e^(c ± t·√v);
 * for a plain price 100 + 100·c over the average price. c and v: the difference of the market columns, with the fit's errors.
 */
import { MARKET_KEY } from "../domain/attribute.ts";
import { dayOf } from "../domain/day.ts";
import type { IndexPoint } from "../domain/modelHealth.ts";
import { percentEffect } from "../numerics/percentEffect.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";
import type { FitErrors } from "./errorRules/errors.ts";
import type { Fit } from "./fit.ts";
import { quarterOf, quarterWords } from "./market.ts";

/** Empty without market movement, or without residual degrees of freedom. Null errors: an even spread. */
export function marketIndex(fit: Fit, errors: FitErrors | null): IndexPoint[] {
  const group = fit.groups.find(({ key }) => key === MARKET_KEY);
  const { solution, design } = fit;
  const s = solution.residualStandardError;
  if (group === undefined || s === null) return [];
  const at = group.columns.map((index) => fit.columns.indexOf(index));
  const k = fit.columns.length;
  const covariance = errors?.covariance ?? solution.inverse.map((value) => s * s * value);
  const df = errors?.df ?? solution.residualDf;
  const t = tUpperQuantile(0.025, df);
  const quarters = quartersOf(design.soldOn);
  const base = group.numbersAt(quarters[0]!.middle);
  return quarters.map(({ quarter, from, sales, middle }) => {
    const d = group.numbersAt(middle).map((value, j) => value - base[j]!);
    const change = d.reduce((sum, value, j) => sum + value * solution.slopes[at[j]!]!, 0);
    let variance = 0;
    d.forEach((a, i) => {
      d.forEach((b, j) => {
        variance += a * b * covariance[at[i]! * k + at[j]!]!;
      });
    });
    const half = t * Math.sqrt(Math.max(0, variance));
    const point = { period: quarterWords(quarter), from: dayOf(from), sales };
    if (design.responseForm === "lnPrice") {
      const { kennedy } = percentEffect(change, Math.max(0, variance), df);
      return {
        ...point,
        level: 100 + kennedy,
        low95: 100 * Math.exp(change - half),
        high95: 100 * Math.exp(change + half),
      };
    }
    const share = 100 / solution.responseMean;
    return {
      ...point,
      level: 100 + change * share,
      low95: 100 + (change - half) * share,
      high95: 100 + (change + half) * share,
    };
  });
}

interface Quarter {
  readonly quarter: number;
  readonly from: number;
  readonly sales: number;
  /** Mean day of its sales. */
  readonly middle: number;
}

function quartersOf(soldOn: Float64Array): Quarter[] {
  const found = new Map<number, { from: number; count: number; sum: number }>();
  for (const day of soldOn) {
    const quarter = quarterOf(day);
    const now = found.get(quarter) ?? { from: day, count: 0, sum: 0 };
    found.set(quarter, { from: Math.min(now.from, day), count: now.count + 1, sum: now.sum + day });
  }
  return [...found]
    .sort((a, b) => a[0] - b[0])
    .map(([quarter, { from, count, sum }]) => ({ quarter, from, sales: count, middle: sum / count }));
}
