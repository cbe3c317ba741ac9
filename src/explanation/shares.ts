/**
 * Shares of attributes, averaged over all orders in which they can come in: of R² (Lindeman, Merenda & Gold 1980), and of the
 * subject's distance from the average sale, the value of a set being the price of the model with exactly that set (Shapley
 * 1953). Beside the latter the additive rule b(x₀ − x̄) of the fit in use. Each kind adds up.
 */
import type { AttributeShare, AttributeShares } from "../domain/attributeSets.ts";
import { AppError } from "../domain/errors.ts";
import { formatMoney, formatPercent, formatSigned, listWords, lowerStart } from "../domain/format.ts";
import type { ResponseForm } from "../domain/priceModel.ts";
import { partsBy } from "../numerics/accumulateMoments.ts";
import { allSubsets } from "../numerics/allSubsets.ts";
import { type AveragedShares, averagedShares } from "../numerics/averagedShares.ts";
import { mergeMoments } from "../numerics/mergeMoments.ts";
import { buildSetTable, columnsOf, type SetTable, type SetTableInput } from "./setTable.ts";

/** Shares of at most so many attributes are said in words. */
const SAID = 3;

/**
 * Shares among the attributes of the fit in use that can be in or out; what is in every set (market movement) has its part
 * first. Refuses (family "fit", dependent) attributes that depend on each other: their shares in a price are not determined.
 */
export function attributeShares(input: Omit<SetTableInput, "reference">): AttributeShares {
  const sets = buildSetTable({ ...input, reference: input.fit.groups }, false);
  const { table, groups, moments } = sets;
  if (table.smallestPivots.at(-1) === 0) throw dependent();
  const r2 = averagedShares(table.r2, groups.length);
  const mean = moments.means.at(-1)!;
  const distances = sets.notKnown.length > 0 ? null : (table.fitted?.map((value) => value - mean) ?? null);
  const distance = distances === null ? null : averagedShares(distances, groups.length);
  const errors = shareErrors(sets);
  const shares = groups.map((_, g) => ({
    ...shareOf(sets, input, g, r2, distance),
    r2Error: errors === null ? null : errors[g]!,
  }));
  return {
    shares,
    alwaysIn: { r2: table.r2[0]!, distance: distances?.[0] ?? null },
    r2: table.r2.at(-1)!,
    distance: distances?.at(-1) ?? null,
    sentences: sentencesOf(shares, table.r2.at(-1)!),
  };
}

/** Groups of the jackknife, sales dealt out in turn in order of day, and attributes up to which it takes little time. */
const PARTS = 20;
const MOST_ATTRIBUTES = 12;

/**
 * Standard errors of the shares of R², without each twentieth of the sales in turn: √((G − 1)/G · Σ (θ_g − θ̄)²), the delete-a-group
 * jackknife (Kott 2001). Null where a part takes an attribute's whole variation with it.
 */
function shareErrors({ fit, groups, alwaysIn }: SetTable): Float64Array | null {
  const { design, rule } = fit;
  if (design.n < 2 * PARTS || groups.length > MOST_ATTRIBUTES) return null;
  const values = [...design.columns.map((column) => column.values), design.response];
  const codes = Uint16Array.from({ length: design.n }, (_, i) => i % PARTS);
  const parts = partsBy(values, codes, PARTS, rule.weights ?? undefined);
  const options = { alwaysIn: columnsOf(alwaysIn).flat(), penalty: rule.penalty };
  const without: Float64Array[] = [];
  for (const part of parts) {
    const moments = mergeMoments(parts.filter((other) => other !== part && other.rowCount > 0));
    const table = allSubsets(moments, columnsOf(groups), options);
    if (table.smallestPivots.at(-1) === 0) return null;
    without.push(averagedShares(table.r2, groups.length).shares);
  }
  return Float64Array.from(groups, (_, g) => {
    const mean = without.reduce((sum, shares) => sum + shares[g]!, 0) / PARTS;
    return Math.sqrt(((PARTS - 1) / PARTS) * without.reduce((sum, shares) => sum + (shares[g]! - mean) ** 2, 0));
  });
}

function shareOf(
  { groups, fit: { solution, columns } }: SetTable,
  { row }: Pick<SetTableInput, "row">,
  g: number,
  r2: AveragedShares,
  distance: AveragedShares | null,
): Omit<AttributeShare, "r2Error"> {
  const group = groups[g]!;
  const { key, label } = group;
  const additive = group.columns.reduce((sum, column) => {
    const at = columns.indexOf(column);
    return sum + solution.slopes[at]! * ((row?.x[column] ?? Number.NaN) - solution.means[at]!);
  }, 0);
  return {
    key,
    label,
    r2: r2.shares[g]!,
    r2Alone: r2.first[g]!,
    r2Last: r2.last[g]!,
    distance: distance?.shares[g] ?? null,
    additive: distance === null ? null : additive,
  };
}

function dependent(): AppError {
  return new AppError({
    family: "fit",
    code: "dependent",
    what: "Some attributes depend on each other exactly, so how they share a price is not determined.",
    where: "Price model",
    whatToDo: "Leave one of them out.",
  });
}

/** What the shares say, and what they do not. */
function sentencesOf(shares: readonly AttributeShare[], r2: number): string[] {
  if (!(r2 > 0) || shares.length === 0) return [];
  const percent = (share: number): string => formatPercent(share / r2);
  const largest = [...shares].sort((a, b) => b.r2 - a.r2).slice(0, SAID);
  const parts = largest.map(({ label, r2: share }) => `${label} ${percent(share)}`);
  return [
    `Of the spread in prices that the model accounts for, averaged over all orders, ${listWords(parts)}.`,
    "These are shares of the spread in these sales, not of what causes a price.",
  ];
}

/**
 * Where averaging over orders and the plain rule b(x₀ − x̄) part most, and why; null without a subject, with one attribute, or where they agree to
 * half a percent of price (after ln) or a thousandth of the whole distance.
 */
export function distanceSentence(
  { shares, distance }: AttributeShares,
  response: ResponseForm,
  currencyCode: string,
): string | null {
  if (distance === null || shares.length < 2) return null;
  const apart = ({ distance: averaged, additive }: AttributeShare): number => Math.abs(averaged! - additive!);
  const most = [...shares].sort((a, b) => apart(b) - apart(a))[0];
  const enough = response === "lnPrice" ? 0.005 : Math.abs(distance) / 1000;
  if (most === undefined || !(apart(most) > enough)) return null;
  const amount = (part: number): string =>
    response === "lnPrice"
      ? `${formatSigned(100 * Math.expm1(part), 1)}\u00a0%`
      : `${part > 0 ? "+" : ""}${formatMoney(part, currencyCode)}`;
  return `The two rules part most on ${lowerStart(most.label)}: ${amount(most.distance!)} averaged over orders, ${amount(most.additive!)} by its own coefficient alone; averaging shares out what moves together, the plain rule gives all of it to the attribute whose coefficient carries it.`;
}
