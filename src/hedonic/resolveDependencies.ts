/**
 * Attributes that repeat each other exactly: found over the whole reference set, written as equations in the class's own
 * labels, and resolved by leaving one out — the person's choice first, else the later attribute. A level of a choice that
 * other columns already say loses only its own column. The fitted prices are the same whichever is left out.
 */
import type { DependencyNotice } from "../domain/appraisal.ts";
import { formatNumber, listWords, lowerStart } from "../domain/format.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import { type Dependency, findDependencies } from "../numerics/findDependencies.ts";
import { isPooled } from "./estimators/partialPooling.ts";
import type { AttributeGroup, Design } from "./fit.ts";
import { dependentIn, rememberDependencies } from "./knownDependencies.ts";

export interface ResolvedSet {
  readonly notices: readonly DependencyNotice[];
  /** Groups that can be fitted together, levels that repeat others taken out. */
  readonly referenceGroups: readonly AttributeGroup[];
  /** Attributes left out whole because they repeat others, with a sentence. */
  readonly exactOut: readonly { readonly key: string; readonly sentence: string }[];
}

/** `notKnown`: attributes the subject has no value for; of two that say the same, the known one stays. */
export function resolveDependencies(design: Design, model: PriceModel, notKnown: readonly string[] = []): ResolvedSet {
  const order = columnOrder(design, model.leftOut, notKnown);
  const found = findDependencies(
    order.map((index) => design.columns[index]!.values),
    { intercept: true },
  );
  rememberDependencies(design, order, found.dependent);
  const referenceGroups = groupsWithout(design, new Set(found.dependent.map((one) => order[one.column]!)));
  const standing = new Set(referenceGroups.map((group) => group.key));
  const notices = [
    ...design.groups.filter((group) => group.columns.length === 0).map((group) => singleLevelNotice(design, group)),
    ...found.dependent.map((one) => noticeOf(design, model, order, one, standing)),
  ];
  const exactOut = design.groups
    .filter((group) => !standing.has(group.key))
    .map((group) => ({ key: group.key, sentence: exactSentence(design, group, notices) }));
  return { notices, referenceGroups, exactOut };
}

/** The same reference groups from the dependencies found before in this design; null while none were looked for. */
export function resolvedBefore(
  design: Design,
  model: PriceModel,
  notKnown: readonly string[],
): readonly AttributeGroup[] | null {
  const dependent = dependentIn(design, columnOrder(design, model.leftOut, notKnown));
  return dependent === null ? null : groupsWithout(design, dependent);
}

function groupsWithout({ groups }: Design, dropped: ReadonlySet<number>): AttributeGroup[] {
  return groups
    .map((group) => ({ ...group, columns: group.columns.filter((index) => !dropped.has(index)) }))
    .filter((group) => group.columns.length > 0);
}

/**
 * Columns in model order, but attributes that the person left out come late and not-known ones last: what comes later is
 * what is found dependent, so the person's choice of what to leave out is what stands. Pooled choices are not searched: their
 * levels add up to 1 on purpose, and their penalty tells them from whatever repeats them.
 */
function columnOrder(design: Design, leftOut: readonly string[], notKnown: readonly string[]): number[] {
  const rank = (group: AttributeGroup) => (notKnown.includes(group.key) ? 2 : leftOut.includes(group.key) ? 1 : 0);
  const searched = design.groups.filter((group) => !isPooled(design, group));
  return searched.sort((a, b) => rank(a) - rank(b)).flatMap((group) => [...group.columns]);
}

function noticeOf(
  design: Design,
  model: PriceModel,
  order: readonly number[],
  dependency: Dependency,
  standing: ReadonlySet<string>,
): DependencyNotice {
  const dependentColumn = design.columns[order[dependency.column]!]!;
  const owner = groupOf(design, dependentColumn.attribute);
  const isWhole = !standing.has(owner.key);
  const keys = [
    ...new Set([owner.key, ...dependency.terms.map((term) => design.columns[order[term.column]!]!.attribute)]),
  ];
  const choices = keys.map((key) => ({ key, label: groupOf(design, key).label }));
  const equation = equationOf(design, order, dependency);
  const by = model.leftOut.includes(owner.key) ? ("person" as const) : ("program" as const);
  const resolvedBy = { key: owner.key, label: nameOf(design, order[dependency.column]!), chosenBy: by };
  return {
    equation,
    sentence: sentenceOf(design, dependency, resolvedBy.label, isWhole, by),
    attributes: keys,
    choices: dependency.terms.length === 0 ? choices.slice(0, 1) : choices,
    resolvedBy,
  };
}

/** A choice of which only one level occurs makes no column at all: it is said like any other constant. */
function singleLevelNotice(design: Design, { key, label, reference }: AttributeGroup): DependencyNotice {
  return {
    equation: `${label} = ${reference ?? "nothing"}`,
    sentence: constantSentence(design, label),
    attributes: [key],
    choices: [{ key, label }],
    resolvedBy: { key, label, chosenBy: "program" },
  };
}

function constantSentence(design: Design, label: string): string {
  const sales = design.n === 1 ? "the one sale" : `all ${formatNumber(design.n)} sales`;
  return `${label} has the same value in ${sales}, so nothing can be read from it; it is left out.`;
}

function sentenceOf(
  design: Design,
  dependency: Dependency,
  label: string,
  isWhole: boolean,
  by: "person" | "program",
): string {
  const sales = design.n === 1 ? "the one sale" : `all ${formatNumber(design.n)} sales`;
  if (dependency.terms.length === 0) return constantSentence(design, label);
  const what = isWhole ? label : `the column ${label}`;
  const who = by === "person" ? `You left ${lowerStart(what)} out` : `The program left ${lowerStart(what)} out`;
  return `This holds exactly in ${sales}. With all of them in, no unique answer exists. ${who}; the price is the same whichever is left out.`;
}

function exactSentence(design: Design, group: AttributeGroup, notices: readonly DependencyNotice[]): string {
  const notice = notices.find((one) => one.resolvedBy?.key === group.key);
  const others = (notice?.attributes ?? []).filter((key) => key !== group.key).map((key) => groupOf(design, key).label);
  if (others.length === 0) return `${group.label} is the same in every sale.`;
  return `${group.label} is already said by ${listWords(others.map(lowerStart))}.`;
}

/** "Power (hp) = 1.341 × Power (kW)", "Hours total = hours work + hours idle", "Build year = 2,024 − months used ÷ 12" */
function equationOf(design: Design, order: readonly number[], { column, constant, terms }: Dependency): string {
  const left = nameOf(design, order[column]!);
  const parts = terms.map((term) => ({
    negative: term.coefficient < 0,
    text: timesWords(
      Math.abs(term.coefficient),
      term.ratio?.denominator ?? 1,
      term.ratio,
      nameOf(design, order[term.column]!),
    ),
  }));
  if (constant !== 0 || parts.length === 0) {
    const decimals = Number.isInteger(constant) ? 0 : 4;
    const text = Math.abs(constant) < 10_000 ? plain(Math.abs(constant)) : formatNumber(Math.abs(constant), decimals);
    parts.unshift({ negative: constant < 0, text });
  }
  const right = parts.map(({ negative, text }, at) =>
    at === 0 ? `${negative ? "−" : ""}${text}` : `${negative ? "−" : "+"} ${text}`,
  );
  return `${left} = ${right.join(" ")}`;
}

function timesWords(size: number, denominator: number, ratio: { numerator: number } | null, name: string): string {
  if (size === 1) return name;
  if (ratio !== null && Math.abs(ratio.numerator) === 1 && denominator <= 1000)
    return `${name} ÷ ${plain(denominator)}`;
  return `${plain(size)} × ${name}`;
}

/** Up to six significant digits, no grouping: factors and years, not money. */
function plain(value: number): string {
  return String(Number(value.toPrecision(6)));
}

/** "Hours", or "Make Orveld" for a level. */
function nameOf(design: Design, index: number): string {
  const { attribute, level } = design.columns[index]!;
  const group = groupOf(design, attribute);
  return level === null || group.form === "yesNo" ? group.label : `${group.label} ${level}`;
}

function groupOf(design: Design, key: string): AttributeGroup {
  return design.groups.find((group) => group.key === key)!;
}
