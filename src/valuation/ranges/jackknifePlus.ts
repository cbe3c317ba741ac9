/**
 * Range for one sale that needs no distribution: jackknife+ (Barber, Candès, Ramdas & Tibshirani 2021). With R_i = |e_i/(1 − h_i)|
 * and m_i the subject's value without sale i, m_i = ŷ₀ − g_i·e_i/(1 − h_i), g_i = 1/n + d₀′C⁻¹d_i: the ⌊α(n + 1)⌋-th smallest
 * of m − R to the ⌈(1 − α)(n + 1)⌉-th smallest of m + R. It holds the sale with probability 1 − 2α or more.
 */
import type { Range } from "../../domain/appraisal.ts";
import type { Fit } from "../../hedonic/fit.ts";
import { numbersOf } from "../../numerics/column.ts";

export interface DistributionFreeRanges {
  /** Levels that so few sales cannot give are left out. */
  readonly ranges: readonly Range[];
  readonly sentence: string;
}

/** For least squares with equal weights; x₀ in the order of fit.columns. O(n·k + n ln n). */
export function jackknifePlus(fit: Fit, x: Float64Array, levels: readonly number[]): DistributionFreeRanges {
  const { solution, design, leverages } = fit;
  const reason = whyNot(fit);
  if (reason !== null) return { ranges: [], sentence: reason };
  const fitted = solution.slopes.reduce((sum, b, j) => sum + b * (x[j]! - solution.means[j]!), solution.responseMean);
  const pulls = pullsOf(fit, x);
  const without = solution.residuals.map((e, i) => e / (1 - leverages[i]!));
  const lows = without.map((r, i) => fitted - pulls[i]! * r - Math.abs(r)).sort();
  const highs = without.map((r, i) => fitted - pulls[i]! * r + Math.abs(r)).sort();
  const back = design.responseForm === "lnPrice" ? Math.exp : (value: number) => value;
  const ranges = levels.flatMap((level): Range[] => {
    const rank = lowRank(level, design.n);
    return rank < 1 ? [] : [{ level, low: back(lows[rank - 1]!), high: back(highs[design.n - rank]!) }];
  });
  const sentence =
    "Whatever the distribution, as long as the next sale is drawn as these were, a range asked for at 90 % holds it at least 80 % of the time, and usually about 90 %.";
  return { ranges, sentence };
}

/** From this leverage on, what is left of 1 − h is rounding. */
const FULL_LEVERAGE = 1 - 1e-10;

function whyNot({ rule, leverages }: Fit): string | null {
  if (rule.weights !== null || rule.penalty !== null)
    return "This range is worked out for least squares with equal weights and without a penalty only.";
  return leverages.some((h) => h > FULL_LEVERAGE)
    ? "A sale is the only one of its kind, so the model cannot be fitted without it, and this range cannot be given."
    : null;
}

/** ⌊α(n + 1)⌋; ⌈(1 − α)(n + 1)⌉ is n + 1 less that. The allowance undoes the rounding of 1 − level. */
function lowRank(level: number, n: number): number {
  return Math.floor((1 - level) * (n + 1) + 1e-9);
}

function pullsOf({ solution, design, columns }: Fit, x: Float64Array): Float64Array {
  const k = columns.length;
  const pulls = new Float64Array(design.n).fill(1 / design.n);
  columns.forEach((index, j) => {
    let factor = 0;
    for (let l = 0; l < k; l++) factor += solution.inverse[j * k + l]! * (x[l]! - solution.means[l]!);
    const values = numbersOf(design.columns[index]!.values);
    for (let i = 0; i < pulls.length; i++) pulls[i] = pulls[i]! + factor * (values[i]! - solution.means[j]!);
  });
  return pulls;
}
