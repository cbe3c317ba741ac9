/**
 * How coefficients are read: one by one, or, for a choice against the mean over its levels, as differences a_l = b_l − Σ b/L
 * with b = 0 for the reference level, L levels. The same fit either way; errors by the same combination of its covariance.
 */
import type { AttributeGroup, Fit } from "./fit.ts";

export interface Reading {
  readonly attribute: string;
  readonly label: string;
  readonly level: string | null;
  readonly stepWords: string;
  readonly step: number;
  /** What is read: Σ weight · slope, `at` counting as fit.columns do. */
  readonly terms: readonly { readonly at: number; readonly weight: number }[];
}

/** In the order of the fit's columns; a choice read against its mean begins with its reference level. */
export function readingsOf(fit: Fit): Reading[] {
  return fit.groups.flatMap((group) => {
    const at = group.columns.map((index) => fit.columns.indexOf(index));
    const { key: attribute, label, step } = group;
    if (group.reading === "sumToZero" && group.form === "choice" && group.reference !== null) {
      return againstMean(fit, group, at);
    }
    return group.columns.map((index, j): Reading => {
      const { level } = fit.design.columns[index]!;
      const terms = [{ at: at[j]!, weight: 1 }];
      return { attribute, label, level, stepWords: stepWordsOf(group, level), step, terms };
    });
  });
}

function againstMean(fit: Fit, group: AttributeGroup, at: readonly number[]): Reading[] {
  const share = 1 / (at.length + 1);
  const levels = [group.reference, ...group.columns.map((index) => fit.design.columns[index]!.level)];
  return levels.map((level, l) => ({
    attribute: group.key,
    label: group.label,
    level,
    stepWords: "against the mean of levels",
    step: group.step,
    terms: at.map((place, j) => ({ at: place, weight: (j + 1 === l ? 1 : 0) - share })),
  }));
}

/** "1,000 h", "against Brannock", "from 2,000 to 5,000 h", "against the mean of levels" */
export function stepWordsOf(group: AttributeGroup, level: string | null): string {
  if (group.stepWords !== null) return group.stepWords;
  if (group.form === "spline") return `from ${level}`;
  if (group.form === "yesNo") return "yes against no";
  return group.reference === null ? "against the mean of levels" : `against ${group.reference}`;
}

/** Σ weight · value. */
export function readOff({ terms }: Reading, values: ArrayLike<number>): number {
  return terms.length === 1 && terms[0]!.weight === 1
    ? values[terms[0]!.at]!
    : terms.reduce((sum, { at, weight }) => sum + weight * values[at]!, 0);
}

/** Variance of what is read, from a k × k covariance. */
export function varianceOf({ terms }: Reading, covariance: Float64Array, k: number): number {
  let variance = 0;
  for (const a of terms) for (const b of terms) variance += a.weight * b.weight * covariance[a.at * k + b.at]!;
  return variance;
}
