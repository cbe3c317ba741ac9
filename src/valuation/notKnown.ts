/**
 * What not knowing an attribute does. The price is that of the model without it; the range is compared with the one the
 * model with it would give at the attribute's typical value. Per value the model with it says what the price would read.
 */

import type { NotKnownEffect, PriceEstimate } from "../domain/appraisal.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import { formatMoney, formatNumber, listWords, lowerStart, niceStep, roundTo } from "../domain/format.ts";
import type { AttributeGroup, Design, Fit, SubjectRow } from "../hedonic/fit.ts";
import { fitColumns } from "../hedonic/fitPriceModel.ts";
import { numbersOf } from "../numerics/column.ts";
import { quantileOfSorted, sortedOf } from "../numerics/quantile.ts";
import { estimatePrice } from "./estimatePrice.ts";

const LEVEL = 0.9;

interface Typical {
  readonly value: string;
  /** Numbers on the group's columns. */
  readonly x: readonly number[];
}

/** One effect per not-known group of the reference set, in order. `fit` is the fit without them. */
export function notKnownEffects(
  fit: Fit,
  row: SubjectRow,
  notKnown: readonly AttributeGroup[],
  assetClass: NewAssetClass,
): NotKnownEffect[] {
  const now = estimatePrice(fit, row, [LEVEL], null);
  return notKnown.map((group) => effectOf(fit, row, group, now, assetClass));
}

function effectOf(
  fit: Fit,
  row: SubjectRow,
  group: AttributeGroup,
  now: PriceEstimate,
  assetClass: NewAssetClass,
): NotKnownEffect {
  const withIt = fitColumns(fit.design, [...fit.groups, group], fit.rule);
  const priced = valuesOf(fit.design, group).map((typical) => {
    const x = Float64Array.from(row.x);
    group.columns.forEach((index, at) => {
      x[index] = typical.x[at]!;
    });
    return { typical, estimate: estimatePrice(withIt, { x, notKnown: [] }, [LEVEL], null) };
  });
  const middle = priced[Math.floor((priced.length - 1) / 2)]!;
  const widthNow = widthOf(now);
  const widthIfKnown = widthOf(middle.estimate);
  const wouldRead = priced.map(({ typical, estimate }) => ({ value: typical.value, amount: estimate.amount }));
  const sentence = sentenceOf(group, widthNow, widthIfKnown, wouldRead, assetClass.currencyCode);
  return { key: group.key, label: group.label, widthNow, widthIfKnown, wouldRead, sentence };
}

function widthOf(estimate: PriceEstimate): number {
  const range = estimate.rangeForOneSale[0];
  return range === undefined ? 0 : range.high - range.low;
}

/** Levels of a choice in order of frequency's list, no and yes, or the quarter, middle and three-quarter values. */
function valuesOf(design: Design, group: AttributeGroup): Typical[] {
  const columns = group.columns.map((index) => design.columns[index]!);
  if (group.form === "choice") {
    const own = columns.map((column) => column.level!);
    const levels = group.reference === null ? own : [group.reference, ...own];
    return levels.map((level) => ({ value: level, x: columns.map((column) => (column.level === level ? 1 : 0)) }));
  }
  if (group.form === "yesNo")
    return [
      { value: "no", x: [0] },
      { value: "yes", x: [1] },
    ];
  const isCurve = group.form === "spline";
  const sorted = sortedOf(isCurve ? group.stored! : numbersOf(columns[0]!.values));
  return [0.25, 0.5, 0.75].map((p) => {
    const value = quantileOfSorted(sorted, p);
    const shown = formatNumber(group.form === "ln" ? Math.exp(value) : value, group.decimals);
    const x = isCurve ? group.numbersAt(value) : [value];
    return { value: group.unit === null ? shown : `${shown}\u00a0${group.unit}`, x };
  });
}

/** Adverse selection is common practice, no source: what is not told is often not good. */
function sentenceOf(
  group: AttributeGroup,
  widthNow: number,
  widthIfKnown: number,
  wouldRead: NotKnownEffect["wouldRead"],
  currencyCode: string,
): string {
  const wider = widthNow - widthIfKnown;
  const step = Math.max(1, niceStep(widthNow / 100));
  const money = (amount: number) => formatMoney(roundTo(amount, step), currencyCode);
  const width =
    roundTo(wider, step) > 0
      ? `which widens the range by about ${money(wider)}`
      : "which leaves the range about as wide as it would be";
  const reads = listWords(wouldRead.map(({ value, amount }) => `${money(amount)} with ${value}`));
  return `Not known: ${lowerStart(group.label)}, ${width}. The price would read ${reads}. What is not known is often bad news: find out where you can.`;
}
