/**
 * What moves together, and each way on worked out before it is applied: keep, leave one out, blend; and exact dependencies resolved
 * in every way there is, to show that the price is the same. Each is the price that the changed model gives, nothing nearer.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { Appraisal, DependencyNotice } from "../domain/appraisal.ts";
import type { Attribute } from "../domain/attribute.ts";
import { blendOf } from "../domain/blendOf.ts";
import { AppError } from "../domain/errors.ts";
import { formatMoney, listWords, lowerStart } from "../domain/format.ts";
import type { MovingGroup, ResolvedWays, WayOn } from "../domain/movingTogether.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import { movingTogether } from "../explanation/movingTogether.ts";
import { type AppraisalInput, computeAppraisal, type PreparedEvidence, priceOf } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** Prices of one thing further apart than this are not the same price. */
const SAME = 1e-8;

/** Refuses what `appraise` refuses. */
export function previewWaysOn(
  ports: Ports,
  memory: EvidenceMemory,
  { classId, model, subject, level }: RequestInput<"waysOn">,
): RequestOutput<"waysOn"> {
  const assetClass = ports.store.assetClasses.get(classId);
  const asked = { assetClass, model, subject, levels: [level] };
  const { sales, prepared } = memory.recall(assetClass, asked, () => ports.store.sales.readColumns(classId));
  const input = { ...asked, sales };
  const { appraisal, fit, row } = computeAppraisal(input, prepared);
  const moving = movingTogether(fit, row);
  const strongest = moving.groups[0];
  return {
    ...moving,
    currencyCode: assetClass.currencyCode,
    level,
    ways: strongest === undefined ? [] : waysOf(input, prepared, strongest, appraisal),
    dependencies: appraisal.report.dependencies.map((one) => resolvedWays(input, prepared, one)),
  };
}

function waysOf(input: AppraisalInput, prepared: PreparedEvidence, { members }: MovingGroup, now: Appraisal): WayOn[] {
  const keys = members.map(({ key }) => key);
  const { model, assetClass } = input;
  const offered = members.filter(({ key }) => model.attributes.some((one) => one.key === key));
  const blended = keys.flatMap((key) => assetClass.attributes.filter((one) => one.key === key));
  const keep: WayOn = { kind: "keep", label: "Keep them all", model, refused: null, ...figuresOf(now, keys) };
  const { dependencies } = now.report;
  const without = offered.map((one) => {
    const gone = [one, ...copiesOf(dependencies, [one.key])];
    const changed = { ...model, leftOut: [...model.leftOut, ...gone.map(({ key }) => key)] };
    return tried("leaveOut", `Leave out ${namesOf(gone)}`, changed, keys, () =>
      computeAppraisal({ ...input, model: changed }, prepared),
    );
  });
  return [keep, ...without, ...blendsOf(input, blended, copiesOf(dependencies, keys), keys.length)];
}

/** What would say the same again in the place of attributes that are no longer there: scaled copies that exact dependencies name. */
function copiesOf(dependencies: readonly DependencyNotice[], keys: readonly string[]): DependencyNotice["choices"] {
  const copies = dependencies.flatMap(({ choices }) =>
    choices.length === 2 && choices.some(({ key }) => keys.includes(key)) ? choices : [],
  );
  return copies.filter(({ key }, at) => !keys.includes(key) && copies.findIndex((one) => one.key === key) === at);
}

function namesOf(attributes: readonly { readonly label: string }[]): string {
  return listWords(attributes.map(({ label }) => lowerStart(label)));
}

function blendsOf(
  input: AppraisalInput,
  attributes: readonly Attribute[],
  copies: DependencyNotice["choices"],
  count: number,
): WayOn[] {
  const canBlend = attributes.length === count && attributes.every(({ kind }) => kind === "number" || kind === "built");
  if (!canBlend) return [];
  return (["equal", "firstComponent"] as const).map((weighting) => {
    const blend = blendOf(attributes, weighting);
    const { blends = [], leftOut } = input.model;
    const gone = copies.map(({ key }) => key);
    const changed: PriceModel = { ...input.model, blends: [...blends, blend], leftOut: [...leftOut, ...gone] };
    const how = weighting === "equal" ? "Blend them, equal weights" : "Blend them, first component";
    const label = copies.length === 0 ? how : `${how}, without ${namesOf(copies)}`;
    return tried("blend", label, changed, [blend.key], () => computeAppraisal({ ...input, model: changed }));
  });
}

function tried(
  kind: WayOn["kind"],
  label: string,
  model: PriceModel,
  keys: readonly string[],
  compute: () => { readonly appraisal: Appraisal },
): WayOn {
  try {
    return { kind, label, model, refused: null, ...figuresOf(compute().appraisal, keys) };
  } catch (cause) {
    if (!(cause instanceof AppError)) throw cause;
    return { kind, label, model, refused: cause.what, price: null, looTypicalError: null, reads: [] };
  }
}

function figuresOf(
  { report, priced }: Appraisal,
  keys: readonly string[],
): Pick<WayOn, "price" | "looTypicalError" | "reads"> {
  const range = priced?.price.rangeForOneSale[0];
  const reads = report.coefficients
    .filter(({ attribute }) => keys.includes(attribute))
    .map((one) => ({
      key: one.attribute,
      label: one.level === null || one.level === "yes" ? one.label : `${one.label}: ${one.level}`,
      stepWords: one.stepWords,
      money: one.moneyPerStep,
      low95: one.moneyLow95,
      high95: one.moneyHigh95,
    }));
  const price =
    priced === null || range === undefined ? null : { amount: priced.price.amount, low: range.low, high: range.high };
  return { price, looTypicalError: report.looTypicalError, reads };
}

function resolvedWays(input: AppraisalInput, prepared: PreparedEvidence, notice: DependencyNotice): ResolvedWays {
  const { assetClass, model } = input;
  const keys = notice.choices.map(({ key }) => key);
  const choices = notice.choices.map((choice) => {
    const leftOut = [...model.leftOut.filter((key) => !keys.includes(key)), choice.key];
    return { ...choice, price: priceOr(() => priceOf({ ...input, model: { ...model, leftOut } }, prepared)) };
  });
  const prices = choices.flatMap(({ price }) => (price === null ? [] : [price]));
  const apart = prices.length < 2 ? null : Math.max(...prices) / Math.min(...prices) - 1;
  return {
    equation: notice.equation,
    choices,
    apart,
    sentence: resolvedWords(notice, prices, apart, assetClass.currencyCode),
  };
}

function priceOr(price: () => number | null): number | null {
  try {
    return price();
  } catch (cause) {
    if (cause instanceof AppError) return null;
    throw cause;
  }
}

function resolvedWords(
  { choices, resolvedBy }: DependencyNotice,
  prices: readonly number[],
  apart: number | null,
  currencyCode: string,
): string {
  const staying = choices.filter(({ key }) => key !== resolvedBy?.key).map(({ label }) => lowerStart(label));
  const meant =
    staying.length === 0 || resolvedBy === null
      ? ""
      : `What ${listWords(staying)} ${staying.length === 1 ? "reads" : "read"} speaks for ${lowerStart(resolvedBy.label)} too.`;
  if (apart === null) return meant;
  if (apart > SAME)
    return `Leaving out a whole attribute takes more than the repetition away here: the prices run from ${formatMoney(Math.min(...prices), currencyCode)} to ${formatMoney(Math.max(...prices), currencyCode)}.`;
  return `Worked out with each left out in turn, the price is ${formatMoney(prices[0]!, currencyCode)} each time. ${meant}`;
}
