/**
 * Which attributes move together, and what it costs. Generalised inflation G of an attribute's d columns (Fox & Monette 1992): the
 * others share 1 − G^(−1/d) of its variation, and its range is G^(1/2d) times as wide as it would be alone; its companion has the
 * largest partial correlation with it. Beside it the largest condition index, and the attributes with half or more of a
 * coefficient's variance tied to it (Belsley, Kuh & Welsch 1980).
 * A look from G^(1/d) = 4 on, trouble from 10 on: common practice, no source.
 */
import type { DiagnosisDetail, Verdict } from "../../domain/diagnosis.ts";
import { formatNumber, formatPercent, lowerStart } from "../../domain/format.ts";
import { accumulateMoments } from "../../numerics/accumulateMoments.ts";
import { partialCorrelation } from "../../numerics/collinearity.ts";
import { type ConditionIndices, conditionIndices, generalisedInflation } from "../../numerics/conditionIndices.ts";
import type { AttributeGroup, Fit } from "../fit.ts";
import { centredProduct, columnsOf, type Diagnostic } from "./diagnostic.ts";

export const collinearity: Diagnostic = {
  code: "collinearity",
  label: "Attributes that move together",
  needs: 1,
  underWeights: true,
  run: (fit) => {
    if (fit.rule.penalty !== null) return "The effects are drawn in, which is what moving together is met with.";
    if (fit.groups.length < 2) return "The model has one attribute only.";
    const crossProducts = crossProductsOf(fit);
    const shared = fit.groups
      .map((group) => sharedBy(fit, group, crossProducts))
      .sort((a, b) => b.inflation - a.inflation);
    const worst = shared[0]!;
    const k = fit.columns.length;
    const indices = conditionIndices(
      fit.solution,
      crossProducts.filter((_, at) => at % (k + 1) === 0),
    );
    const verdict = verdictOn(worst.inflation);
    return {
      statistic: worst.inflation,
      df: [],
      p: null,
      verdict,
      sentence: sentenceOf(fit, worst, verdict),
      whatToDo:
        verdict === "fine"
          ? "Nothing."
          : "Read these effects together, not one by one; leave one out or blend them if single effects are wanted.",
      source: "Fox & Monette 1992; Belsley, Kuh & Welsch 1980",
      attributes: shared.filter(({ inflation }) => verdictOn(inflation) !== "fine").map(({ group }) => group.key),
      details: [
        ...shared.map(({ group, inflation }) => ({ label: group.label, value: Math.sqrt(inflation), limit: 2 })),
        ...indexDetails(fit, indices),
      ],
    };
  },
};

export interface Shared {
  readonly group: AttributeGroup;
  /** G^(1/d). */
  readonly inflation: number;
}

function verdictOn(inflation: number): Verdict {
  return inflation >= 10 ? "trouble" : inflation >= 4 ? "look" : "fine";
}

/** Σw(x − x̄)(x − x̄)′ of the fit's columns, k × k. */
export function crossProductsOf({ design, columns, rule, ...fit }: Fit): Float64Array {
  const k = columns.length;
  const isAtHand = rule.weights === design.weights;
  const moments = isAtHand
    ? design.moments
    : accumulateMoments(columnsOf({ design, columns, rule, ...fit }), { weights: rule.weights ?? undefined });
  return Float64Array.from({ length: k * k }, (_, at) => {
    const [a, b] = [Math.floor(at / k), at % k];
    return isAtHand ? centredProduct(moments, columns[a]!, columns[b]!) : centredProduct(moments, a, b);
  });
}

function placesOf(fit: Fit, group: AttributeGroup): number[] {
  return group.columns.map((index) => fit.columns.indexOf(index));
}

export function sharedBy(fit: Fit, group: AttributeGroup, crossProducts: Float64Array): Shared {
  const places = placesOf(fit, group);
  const inflation = generalisedInflation(crossProducts, fit.solution.inverse, fit.columns.length, places);
  return { group, inflation: inflation ** (1 / places.length) };
}

export function companionOf(fit: Fit, group: AttributeGroup): AttributeGroup {
  const closeness = (other: AttributeGroup) =>
    Math.max(
      ...placesOf(fit, group).flatMap((a) =>
        placesOf(fit, other).map((b) => Math.abs(partialCorrelation(fit.solution.inverse, fit.columns.length, a, b))),
      ),
    );
  const others = fit.groups.filter((other) => other !== group);
  return others.reduce((nearest, other) => (closeness(other) > closeness(nearest) ? other : nearest));
}

function sentenceOf(fit: Fit, { group, inflation }: Shared, verdict: Verdict): string {
  if (verdict === "fine") {
    return `No attribute moves with the others much: the range of ${lowerStart(group.label)}, the widest for it, is ${formatNumber(Math.sqrt(inflation), 1)} × as wide as alone.`;
  }
  const companion = companionOf(fit, group).label;
  return `${group.label} shares ${shareWords(1 - 1 / inflation)} of its variation with other attributes, most with ${lowerStart(companion)}: the range of its effect is ${formatNumber(Math.sqrt(inflation), 1)} × as wide as it would be alone; the price of an item like the sales is hardly affected.`;
}

function shareWords(share: number): string {
  if (share > 0.99995) return `more than ${formatPercent(0.9999, 2)}`;
  return formatPercent(share, share > 0.995 ? 2 : 0);
}

/** The largest index, and each attribute's largest share of a coefficient's variance tied to it where that is half or more. */
function indexDetails(fit: Fit, { indices, proportions }: ConditionIndices): DiagnosisDetail[] {
  const q = indices.length;
  const shares = fit.groups.map((group) => ({
    group,
    share: Math.max(...placesOf(fit, group).map((j) => proportions[(j + 1) * q + q - 1]!)),
  }));
  return [
    { label: "Largest condition index", value: indices[q - 1]!, limit: 30 },
    ...shares
      .filter(({ share }) => share >= 0.5)
      .map(({ group, share }) => ({ label: `Tied to it: ${group.label}`, value: share, limit: 0.5 })),
  ];
}
