/**
 * Every attribute set at once for an item, and the shares of its attributes, cut to what a picture and a table need. The look
 * at all sets is kept for the question last asked, so that moving the rule asks for no new one.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { AttributeShares, EverySet, ListedSet, SetFigures } from "../domain/attributeSets.ts";
import { AppError } from "../domain/errors.ts";
import { listWords, lowerStart } from "../domain/format.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import { judgeSets, type LookedAtSets, lookAtSets } from "../explanation/attributeSets.ts";
import { akaikeWeights } from "../explanation/averagedPrice.ts";
import { attributeShares, distanceSentence } from "../explanation/shares.ts";
import { type ComputedAppraisal, fitInUse } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** The last look, and the question it answers. */
export interface SetMemory {
  last: { readonly question: string; readonly looked: LookedAtSets; readonly shares: SharesOrWhy } | null;
}

interface SharesOrWhy {
  readonly shares: AttributeShares | null;
  readonly sharesRefused: string | null;
}

export function rememberSets(): SetMemory {
  return { last: null };
}

const LISTED = 24;
const PRICE_DIGITS = 11;
const ERROR_DIGITS = 5;

/** Refuses (no-subject) without an item, and what `appraise` refuses. */
export function everySet(
  ports: Ports,
  memory: EvidenceMemory,
  sets: SetMemory,
  input: RequestInput<"everySet">,
): RequestOutput<"everySet"> {
  const { classId, model, subject, rule } = input;
  if (subject === null) throw noSubject();
  const pins = { alwaysIn: input.alwaysIn ?? [], alwaysOut: input.alwaysOut ?? [] };
  if (pins.alwaysIn.some((key) => pins.alwaysOut.includes(key))) throw heldBothWays();
  const assetClass = ports.store.assetClasses.get(classId);
  const question = JSON.stringify([classId, assetClass.dataVersion, assetClass.currencyCode, model, subject, pins]);
  if (sets.last?.question !== question) {
    const asked = { assetClass, model, subject, levels: [] };
    const { sales, prepared } = memory.recall(assetClass, asked, () => ports.store.sales.readColumns(classId));
    const computed = fitInUse({ ...asked, sales }, prepared);
    const { fit, row, reference } = computed;
    const looked = lookAtSets({ reference, fit, row, currencyCode: assetClass.currencyCode, pins });
    sets.last = { question, looked, shares: sharesOrWhy(computed, assetClass.currencyCode) };
  }
  return everySetOf(sets.last.looked, sets.last.shares, model, rule);
}

function noSubject(): AppError {
  return new AppError({
    family: "request",
    code: "no-subject",
    what: "No item is described yet, so no set of attributes can price it.",
    where: "Every attribute set",
    whatToDo: "Give at least one of its attributes.",
  });
}

function heldBothWays(): AppError {
  return new AppError({
    family: "request",
    code: "held-both-ways",
    what: "An attribute cannot be held in every set and out of every set at once.",
    where: "Every attribute set",
    whatToDo: "Hold it in, hold it out, or leave it free.",
  });
}

function sharesOrWhy({ fit, row }: Pick<ComputedAppraisal, "fit" | "row">, currencyCode: string): SharesOrWhy {
  if (fit.groups.every(({ isMarket }) => isMarket))
    return { shares: null, sharesRefused: "No attribute is in the set in use, so there is nothing to share out." };
  try {
    const shares = attributeShares({ fit, row });
    const difference = distanceSentence(shares, fit.design.responseForm, currencyCode);
    const sentences = difference === null ? shares.sentences : [...shares.sentences, difference];
    return { shares: { ...shares, sentences }, sharesRefused: null };
  } catch (cause) {
    if (cause instanceof AppError && cause.code === "dependent") return { shares: null, sharesRefused: cause.what };
    throw cause;
  }
}

function everySetOf(
  looked: LookedAtSets,
  shares: SharesOrWhy,
  model: PriceModel,
  rule: RequestInput<"everySet">["rule"],
): EverySet {
  const { figures, leaveOneOut: _, ...found } = judgeSets(looked, rule);
  const weights = akaikeWeights(looked.prices.aicc, (set) => Number.isFinite(looked.prices.fitted[set]!));
  const stacking = new Map(found.stacked?.weights.map(({ set, weight }) => [set, weight]));
  const listedOf = (set: number): ListedSet => ({
    set,
    price: figures.price[set]!,
    low: figures.low[set]!,
    high: figures.high[set]!,
    error: figures.error[set]!,
    weight: found.averaged === null ? null : (weights?.[set] ?? null),
    stackingWeight: found.stacked === null ? null : (stacking.get(set) ?? 0),
  });
  return {
    ...found,
    marks: { price: cut(figures.price, PRICE_DIGITS), error: cut(figures.error, ERROR_DIGITS) },
    listed: weighty(figures, weights, found.defensible, found.current).map(listedOf),
    ...shares,
    cautions: cautionsOf(model, looked),
    currencyCode: looked.currencyCode,
    response: looked.sets.fit.design.responseForm,
  };
}

function cut(values: readonly (number | null)[], digits: number): (number | null)[] {
  return values.map((value) => (value === null ? null : Number(value.toPrecision(digits))));
}

/** By Akaike weight, or by error where there are no weights; the current set is always among them. */
function weighty(
  figures: SetFigures,
  weights: Float64Array | null,
  defensible: readonly number[],
  current: number,
): number[] {
  const sets =
    weights === null
      ? [...defensible]
      : [...figures.price.keys()].filter((set) => weights[set]! > 0).sort((a, b) => weights[b]! - weights[a]!);
  const first = sets.slice(0, LISTED);
  return first.includes(current) ? first : [...first, current];
}

/** Where a set by itself would be fitted a little otherwise than here. */
function cautionsOf({ estimator = { kind: "leastSquares" } }: PriceModel, { sets }: LookedAtSets): string[] {
  const cautions: string[] = [];
  if (estimator.kind !== "leastSquares") {
    const kept = estimator.kind === "ridge" ? "the pull toward zero" : "the weights of the sales";
    cautions.push(
      `All sets are fitted at ${kept} that the model in use was found with; by itself a set would be given its own, and its price would differ a little.`,
    );
  }
  const isInUse = ({ key }: { readonly key: string }): boolean => sets.fit.groups.some((group) => group.key === key);
  const otherwise = [...sets.heldIn.filter((group) => !isInUse(group)), ...sets.heldOut.filter(isInUse)];
  if (otherwise.length > 0) {
    const names = listWords(otherwise.map(({ label }) => lowerStart(label)));
    cautions.push(`The set in use has ${names} the other way; marked as in use is the same set with what is held.`);
  }
  const whole = new Map(sets.fit.design.groups.map(({ key, columns }) => [key, columns.length]));
  const cutShort = [...sets.groups, ...sets.alwaysIn].filter(({ key, columns }) => columns.length < whole.get(key)!);
  if (cutShort.length > 0) {
    cautions.push(
      `Some levels of ${listWords(cutShort.map(({ label }) => lowerStart(label)))} are already said by other attributes; they stay out here in sets without those too.`,
    );
  }
  return cautions;
}
