/**
 * Which range for one sale stands: the kind the model asks for, else the exact one where it is exact and jackknife+ where it is
 * not. Another kind stands beside it, and a marked difference in width is said.
 */
import type { Range, RangeAccount } from "../domain/appraisal.ts";
import { formatNumber } from "../domain/format.ts";
import type { PriceModel, RangeKind } from "../domain/priceModel.ts";
import type { Fit, SubjectRow } from "../hedonic/fit.ts";
import { RANGE_RULES } from "./ranges/index.ts";
import type { RefitRule } from "./ranges/rangeRule.ts";

/** With more sales than this the range beside is not waited for. */
const MANY_SALES = 100_000;
/** Widths that differ by more than this factor are worth a sentence. Common practice, no source. */
const MARKED = 1.25;
const LEVEL = 0.9;

export const RANGE_NAMES: Readonly<Record<RangeKind, string>> = {
  exact: "the exact range",
  "jackknife+": "the jackknife+ range",
  "cv+": "the CV+ range",
  variance: "the range whose width follows the price",
};

export interface ChosenRange {
  readonly ranges: readonly Range[];
  readonly account: RangeAccount;
}

export interface RangeQuestion {
  readonly fit: Fit;
  readonly row: SubjectRow;
  readonly levels: readonly number[];
  readonly model: PriceModel;
  /** Whether Student's t is exact under the model's estimator. */
  readonly isExact: boolean;
  /** The estimator on part of the sales. */
  readonly refitRule: RefitRule;
}

export function chooseRange({ fit, row, levels, model, isExact, refitRule }: RangeQuestion): ChosenRange {
  const find = (kind: RangeKind) => RANGE_RULES[kind](fit, row, levels, refitRule);
  const asked = model.range ?? (isExact ? "exact" : "jackknife+");
  const wanted = find(asked);
  const isGiven = wanted.ranges.length > 0 || levels.length === 0;
  const found = isGiven ? wanted : find("exact");
  const { kind, sentence, guarantee, ranges } = found;
  const other = kind === "exact" ? "jackknife+" : "exact";
  const isWaitedFor = fit.design.n <= MANY_SALES && levels.length > 0;
  const beside = isWaitedFor ? find(other) : null;
  const hasBeside = beside !== null && beside.ranges.length > 0;
  return {
    ranges,
    account: {
      kind,
      sentence,
      guarantee,
      insteadOf: isGiven ? null : wanted.sentence,
      beside: hasBeside ? { kind: other, ranges: beside.ranges } : null,
      disagreement: hasBeside ? disagreement(kind, ranges, other, beside.ranges) : null,
    },
  };
}

function widthAt(ranges: readonly Range[]): number | null {
  const range = ranges.find(({ level }) => level === LEVEL) ?? ranges.at(-1);
  return range === undefined ? null : range.high - range.low;
}

function disagreement(
  kind: RangeKind,
  ranges: readonly Range[],
  other: RangeKind,
  beside: readonly Range[],
): string | null {
  const [own, second] = [widthAt(ranges), widthAt(beside)];
  if (own === null || second === null || !(own > 0) || !(second > 0)) return null;
  const ratio = second / own;
  if (ratio < MARKED && ratio > 1 / MARKED) return null;
  const [times, word] = ratio > 1 ? [ratio, "wider"] : [1 / ratio, "narrower"];
  const start = RANGE_NAMES[other].charAt(0).toUpperCase() + RANGE_NAMES[other].slice(1);
  return `${start} is ${formatNumber(times, 1)} times ${word} than ${RANGE_NAMES[kind]}: look at how the distances from the model are spread before relying on either.`;
}
