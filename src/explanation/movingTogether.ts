/**
 * Groups of attributes that move together, and whether the price suffers for it. A group is what a condition index from 10 on ties
 * together: attributes with half or more of a coefficient's variance in it (Belsley, Kuh & Welsch 1980); where no index tells, the
 * attribute whose range is widened most with its nearest companion, from twice as wide on. The price: h₀ = 1/W + d′C⁻¹d of the
 * item against p/n of an average sale; more than 3p/n suffers (common practice, no source).
 */
import { formatNumber, formatPercent, listWords, lowerStart } from "../domain/format.ts";
import type { MovingGroup, MovingTogether } from "../domain/movingTogether.ts";
import { companionOf, crossProductsOf, sharedBy } from "../hedonic/diagnostics/collinearity.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { conditionIndices } from "../numerics/conditionIndices.ts";

const STRONG_INDEX = 10;
const TIED = 0.5;
const WIDE = 2;
const FAR_TIMES = 3;

/** Of the fit in use; `row` is the item on its columns. */
export function movingTogether(fit: Fit, row: SubjectRow | null): MovingTogether {
  const priceSentence = row === null ? null : priceWords(fit, row);
  if (fit.rule.penalty !== null)
    return {
      groups: [],
      sentence: "Coefficients are drawn in, which is what moving together is met with.",
      priceSentence,
    };
  if (fit.groups.length < 2)
    return { groups: [], sentence: "Fewer than two attributes are in the model.", priceSentence };
  const groups = groupsOf(fit);
  const sentence =
    groups[0]?.sentence ?? "No attributes move together so much that single coefficients cannot be told.";
  return { groups, sentence, priceSentence };
}

function groupsOf(fit: Fit): MovingGroup[] {
  const crossProducts = crossProductsOf(fit);
  const k = fit.columns.length;
  const times = new Map(
    fit.groups.map((group) => [group.key, Math.sqrt(sharedBy(fit, group, crossProducts).inflation)]),
  );
  const squared = crossProducts.filter((_, at) => at % (k + 1) === 0);
  const { indices, proportions } = conditionIndices(fit.solution, squared);
  const q = indices.length;
  const found: MovingGroup[] = [];
  for (let at = q - 1; at >= 0 && indices[at]! >= STRONG_INDEX; at--) {
    const tied = fit.groups.flatMap((group) => {
      const share = Math.max(...group.columns.map((one) => proportions[(fit.columns.indexOf(one) + 1) * q + at]!));
      return share >= TIED ? [{ group, share }] : [];
    });
    if (tied.length > 1) found.push(groupOf(tied, times, indices[at]!));
  }
  const widest = fit.groups.reduce((most, one) => (times.get(one.key)! > times.get(most.key)! ? one : most));
  const isSaid = found.some(({ members }) => members.some(({ key }) => key === widest.key));
  if (!isSaid && times.get(widest.key)! >= WIDE)
    found.push(
      groupOf(
        [widest, companionOf(fit, widest)].map((group) => ({ group, share: null })),
        times,
        null,
      ),
    );
  return found.sort((a, b) => widestOf(b) - widestOf(a));
}

function widestOf({ members }: MovingGroup): number {
  return Math.max(...members.map(({ times }) => times));
}

function groupOf(
  tied: readonly { group: AttributeGroup; share: number | null }[],
  times: ReadonlyMap<string, number>,
  conditionIndex: number | null,
): MovingGroup {
  const members = tied.map(({ group: { key, label }, share }) => ({ key, label, times: times.get(key)!, tied: share }));
  const names = listWords(members.map(({ label }, at) => (at === 0 ? label : lowerStart(label))));
  const wide = listWords(members.map((one) => formatNumber(one.times, 1)));
  const sentence = `${names} move together: the ranges of their coefficients are ${wide} × as wide as they would be alone.`;
  return { members, conditionIndex, sentence };
}

/** h₀ of the item; the average of w·h over the sales is p/n. */
export function leverageOf({ solution, columns }: Fit, { x }: SubjectRow): number {
  const k = columns.length;
  const d = columns.map((index, j) => x[index]! - solution.means[j]!);
  let sum = 1 / solution.weightSum;
  for (let a = 0; a < k; a++) for (let b = 0; b < k; b++) sum += d[a]! * solution.inverse[a * k + b]! * d[b]!;
  return sum;
}

function priceWords(fit: Fit, row: SubjectRow): string {
  const own = leverageOf(fit, row);
  const average = (fit.columns.length + 1) / fit.design.n;
  const adds = formatPercent(Math.sqrt(1 + own) - 1, 1);
  const ratio = formatNumber(own / average, 1);
  return own > FAR_TIMES * average
    ? `The price suffers: with ${ratio} × the leverage of an average sale, not knowing the coefficients exactly widens its range by ${adds}.`
    : `The price does not suffer: with ${ratio} × the leverage of an average sale, not knowing the coefficients exactly widens its range by ${adds} only.`;
}
