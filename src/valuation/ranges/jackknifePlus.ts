/**
 * Range for one sale that needs no distribution: jackknife+ (Barber, Candès, Ramdas & Tibshirani 2021). With r_i = e_i/(1 − h_i) and
 * m_i = ŷ₀ − g_i·r_i the subject's value without sale i (Cook & Weisberg 1982, §2.2), g_i = ω_i(1/Σω + d_i′C⁻¹d₀), the ranges go
 * from the ⌊α(n + 1)⌋-th smallest of m − |r| to the ⌈(1 − α)(n + 1)⌉-th smallest of m + |r|: 1 − 2α or more of exchangeable sales.
 */

import type { Fit, SubjectRow } from "../../hedonic/fit.ts";
import { isIndicator } from "../../numerics/column.ts";
import { fittedAt, leastLevels, orderedRanges, type RangeRule, whatIsHeld, withoutRanges } from "./rangeRule.ts";

/** From this leverage on, what is left of 1 − h is rounding. */
const FULL_LEVERAGE = 1 - 1e-10;

/**
 * In closed form at the weights and penalties of the fit. Sales that a robust estimate sets aside are sales all the same; only
 * those of no recency weight do not count. O(n·k + n ln n).
 */
export const jackknifePlus: RangeRule = (fit, row, levels) => {
  const { solution, leverages, rule, design } = fit;
  if (leverages.some((h) => h > FULL_LEVERAGE)) {
    return withoutRanges(
      "jackknife+",
      "A sale is the only one of its kind, so the model cannot be fitted without it, and this range cannot be given.",
    );
  }
  const fitted = fittedAt(fit, row);
  const pulls = pullsOf(fit, row);
  const rows = pulls.length;
  const lows = new Float64Array(rows);
  const highs = new Float64Array(rows);
  let n = 0;
  for (let i = 0; i < rows; i++) {
    if (design.weights?.[i] === 0) continue;
    const r = solution.residuals[i]! / (1 - leverages[i]!);
    const without = fitted - pulls[i]! * r;
    lows[n] = without - Math.abs(r);
    highs[n++] = without + Math.abs(r);
  }
  const held = whatIsHeld(rule);
  return {
    kind: "jackknife+",
    ranges: orderedRanges(fit, lows.subarray(0, n), highs.subarray(0, n), levels),
    sentence: `Each sale in turn is priced without itself, and the subject with it; the range comes from these errors, whatever their distribution.${held === null ? "" : ` ${held}`}`,
    guarantee:
      held === null
        ? `If the next sale is drawn as these were, the range holds it: asked ${leastLevels(levels)}; usually about what is asked.`
        : null,
  };
};

/** g, n long in the design's row order. */
function pullsOf({ solution, design, columns, rule }: Fit, { x }: SubjectRow): Float64Array {
  const { inverse, means, weightSum } = solution;
  const k = columns.length;
  const pulls = new Float64Array(design.n).fill(1 / weightSum);
  columns.forEach((index, j) => {
    let factor = 0;
    for (let l = 0; l < k; l++) factor += inverse[j * k + l]! * (x[columns[l]!]! - means[l]!);
    const mean = means[j]!;
    const column = design.columns[index]!.values;
    if (isIndicator(column)) {
      const { codes, level } = column;
      const [inside, outside] = [factor * (1 - mean), -factor * mean];
      for (let i = 0; i < pulls.length; i++) pulls[i] = pulls[i]! + (codes[i] === level ? inside : outside);
    } else for (let i = 0; i < pulls.length; i++) pulls[i] = pulls[i]! + factor * (column[i]! - mean);
  });
  if (rule.weights !== null) for (let i = 0; i < pulls.length; i++) pulls[i] = pulls[i]! * rule.weights[i]!;
  return pulls;
}
