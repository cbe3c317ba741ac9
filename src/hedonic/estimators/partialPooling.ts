/**
 * Partial pooling of a choice (numerics/partialPooling.ts): levels drawn towards the mean over the levels, those with few sales
 * most, under whatever estimator. A pooled choice has a column for *every* level that occurs, in one group whose reference is
 * null: the penalty tells the levels from the intercept, so no level has to stand aside, and none is favoured. With k − 1
 * columns against a reference level the same drawing would need a penalty matrix with entries off its diagonal.
 * Whoever looks for dependent columns leaves a pooled group out: its columns add up to 1 on purpose. Whoever fits uses the
 * rule's penalty for it, also in other attribute sets.
 */
import { formatNumber, formatPercent } from "../../domain/format.ts";
import { isIndicator } from "../../numerics/column.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import { type PooledGroup, poolLevels } from "../../numerics/partialPooling.ts";
import { frameOf, rawCoefficients, weightedStep } from "../../numerics/weightedSteps.ts";
import type { AttributeGroup, Design } from "../fit.ts";
import type { Ground, PooledChoice } from "./estimator.ts";
import { inClassWords, modelColumns } from "./modelColumns.ts";

/** Whether the group's level columns cover every sale: one column for each level, none left out as reference. */
export function isPooled(design: Design, group: AttributeGroup): boolean {
  if (group.form !== "choice" || group.reference !== null || group.columns.length === 0) return false;
  return group.columns.reduce((sum, index) => sum + salesOf(design, index), 0) === design.n;
}

/** Recency weights, and λ for every pooled choice of the design; choices outside `groups` get theirs on the whole design. */
export function groundOf(design: Design, groups: readonly AttributeGroup[]): Ground {
  const plain = { weights: design.weights, penalty: null };
  const all = design.groups.filter((group) => isPooled(design, group));
  if (all.length === 0) return { rule: plain, pooled: [], sentence: "" };
  const penalty = new Float64Array(design.columns.length);
  const isLeftOut = all.some((group) => !groups.some(({ key }) => key === group.key));
  if (isLeftOut) setPenalties(penalty, design, design.groups);
  const found = setPenalties(penalty, design, groups);
  const rule = { weights: design.weights, penalty };
  const pooled = told(design, groups, found, penalty);
  return { rule, pooled, sentence: pooled.map(sentenceOf).join(" ") };
}

interface FoundChoice {
  readonly group: AttributeGroup;
  readonly found: PooledGroup;
}

/** Works out λ of the pooled choices among `groups` and writes it to their columns. */
function setPenalties(penalty: Float64Array, design: Design, groups: readonly AttributeGroup[]): FoundChoice[] {
  const { values, indexes } = modelColumns(design, groups, { weights: null, penalty: null });
  const pooled = groups.filter((group) => isPooled(design, group));
  const sets = pooled.map((group) => group.columns.map((index) => indexes.indexOf(index)));
  if (pooled.length === 0) return [];
  const pooling = inClassWords(design, groups, () =>
    poolLevels(values, design.response, sets, { weights: design.weights }),
  );
  return pooled.map((group, at) => {
    const found = pooling.groups[at]!;
    for (const index of group.columns) penalty[index] = found.penalty;
    return { group, found };
  });
}

/** Effects of the levels before and after. */
function told(
  design: Design,
  groups: readonly AttributeGroup[],
  found: readonly FoundChoice[],
  penalty: Float64Array,
): PooledChoice[] {
  const after = effectsOf(design, groups, penalty);
  const against = groups.map((group) =>
    isPooled(design, group) ? { ...group, columns: group.columns.slice(1) } : group,
  );
  const before = effectsOf(design, against, null);
  return found.map(({ group, found: { penalty: lambda, spread } }) => {
    const plain = before && group.columns.map((index) => before.get(index) ?? 0);
    const mean = plain && plain.reduce((sum, b) => sum + b, 0) / plain.length;
    return {
      key: group.key,
      label: group.label,
      penalty: lambda,
      spread,
      levels: group.columns.map((index, at) => ({
        level: design.columns[index]!.level ?? "",
        sales: salesOf(design, index),
        before: plain && plain[at]! - mean!,
        after: after?.get(index) ?? 0,
      })),
    };
  });
}

/** Slopes by design column at these penalties; null where the columns depend on each other. */
function effectsOf(
  design: Design,
  groups: readonly AttributeGroup[],
  penalty: Float64Array | null,
): Map<number, number> | null {
  const { values, indexes, penalty: own } = modelColumns(design, groups, { weights: null, penalty });
  const frame = frameOf(values, design.n, own);
  try {
    const step = weightedStep(frame, design.weights, design.response, new Float64Array(values.length + 1));
    const { slopes } = rawCoefficients(frame, step);
    return new Map(indexes.map((index, at) => [index, slopes[at]!]));
  } catch (cause) {
    if (cause instanceof NumericsError && cause.code === "rankDeficient") return null;
    throw cause;
  }
}

function salesOf(design: Design, index: number): number {
  const { values } = design.columns[index]!;
  if (!isIndicator(values)) return Number.NaN;
  let count = 0;
  for (let i = 0; i < values.length; i++) if (values.codes[i] === values.level) count++;
  return count;
}

/** What a level with so many sales keeps of its own difference, when nothing else moves with it: m/(m + λ). */
function sentenceOf({ label, levels, penalty, spread }: PooledChoice): string {
  const opening = `${label}: ${levels.length} levels are drawn towards their mean`;
  if (spread === 0) return `${opening} altogether, since they differ by no more than chance.`;
  const sales = levels.map((one) => one.sales).sort((a, b) => a - b);
  const fewest = sales[0]!;
  const most = sales[sales.length - 1]!;
  const kept = (m: number) => formatPercent(m / (m + penalty));
  const named = (m: number) => `${formatNumber(m)} ${m === 1 ? "sale" : "sales"}`;
  return `${opening}: one with ${named(fewest)} keeps about ${kept(fewest)} of its own difference, one with ${named(most)} ${kept(most)}.`;
}
