/** What the two robust estimators say alike: who counts less, levels that hang on sales set aside, and which range holds. */
import { formatNumber, formatPercent, listWords } from "../../domain/format.ts";
import { numbersOf } from "../../numerics/column.ts";
import type { MEstimate } from "../../numerics/huber.ts";
import type { AttributeGroup, Design } from "../fit.ts";
import { type Estimate, type Ground, NO_EXTRAS, sentences } from "./estimator.ts";

/** A level whose sales together count for less than this part of one is named. */
const LEAST_SALES = 0.5;

/** The estimate as told, from the numbers and the words that begin it. */
export function toldRobust(
  design: Design,
  groups: readonly AttributeGroup[],
  found: MEstimate,
  { rule, pooled, sentence }: Ground,
  opening: string,
): Estimate {
  const { scale, robustness, curvature, iterations } = found;
  return {
    rule: { weights: found.weights, penalty: rule.penalty },
    scale,
    iterations,
    sentence: sentences(
      opening,
      scale > 0 ? whoCountsLess(robustness) : "",
      hanging(design, groups, robustness),
      found.hasSettled ? "" : "The steps did not settle to ten digits; the last ones stand.",
      sentence,
    ),
    exactRange: false,
    whichRange:
      "Sales out of line count less, so no exact range for one sale exists; the jackknife+ range is the honest one, and coefficient ranges hold for many sales only.",
    extras: { ...NO_EXTRAS, robustness, curvature, pooled },
  };
}

/** "0.183" in price units, or "18 %" for a ln response. */
export function sizeWords(design: Design, size: number): string {
  return design.responseForm === "lnPrice" ? formatPercent(Math.expm1(size), 1) : formatNumber(size, size < 10 ? 2 : 0);
}

function whoCountsLess(robustness: Float64Array): string {
  const n = robustness.length;
  const less = robustness.reduce((count, w) => count + (w < 1 - 1e-12 ? 1 : 0), 0);
  if (less === 0) return "All sales count in full.";
  const out = robustness.reduce((count, w) => count + (w === 0 ? 1 : 0), 0);
  const half = robustness.reduce((count, w) => count + (w < 0.5 ? 1 : 0), 0);
  const least = robustness.reduce((smallest, w) => Math.min(smallest, w), 1);
  const all = formatNumber(n);
  // The bisquare takes a little off every sale: then only the halves are news.
  const first =
    less < n
      ? `${formatNumber(less)} of ${all} sales count less than in full, ${formatNumber(half)} of them for less than half`
      : `${formatNumber(half)} of ${all} sales count for less than half`;
  return out > 0
    ? `${first}; ${formatNumber(out)} do not count at all.`
    : `${first}; the least counts ${formatPercent(least)}.`;
}

/** Levels whose sales are nearly all set aside: their effects rest on almost nothing. */
function hanging(design: Design, groups: readonly AttributeGroup[], robustness: Float64Array): string {
  const names = groups.flatMap((group) =>
    group.columns.flatMap((index) => {
      const { level, values } = design.columns[index]!;
      if (level === null) return [];
      const kept = numbersOf(values).reduce((sum, value, i) => sum + value * robustness[i]!, 0);
      return kept < LEAST_SALES ? [`${group.label} ${level}`] : [];
    }),
  );
  if (names.length === 0) return "";
  return `The sales of ${listWords(names)} together count for less than half a sale: do not rely on ${names.length === 1 ? "its effect" : "their effects"}.`;
}
