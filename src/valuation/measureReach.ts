/**
 * Reach: does the subject lie inside the evidence? Each value against lowest and highest and against the gap it may sit
 * in; jointly the subject's leverage against the largest of the evidence — hidden extrapolation (Montgomery, Peck &
 * Vining 2012, §3.8). Edge: outside the middle 98 % of values, or in a gap wider than a tenth of their span.
 */

import type { Reach, ReachVerdict } from "../domain/appraisal.ts";
import { formatNumber, listWords, lowerStart } from "../domain/format.ts";
import type { Subject } from "../domain/subject.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { quantileOfSorted, sortedOf } from "../numerics/quantile.ts";
import { subjectLeverage } from "./estimatePrice.ts";
import { rawValue } from "./rawValue.ts";

const EDGE_SHARE = 0.01;
const GAP_SHARE = 0.1;
/** A level with fewer sales than this is at the edge of the evidence. */
const FEW_SALES = 5;

type AttributeReach = Reach["attributes"][number];

export function measureReach(fit: Fit, row: SubjectRow, subject: Subject, itemWord: string): Reach {
  const attributes = fit.groups
    .filter((group) => !group.isMarket && group.product === null)
    .map((group) =>
      group.stored !== null ? reachOfNumber(group, group.stored, row, subject) : reachOfLevel(fit, group, subject),
    );
  const joint = reachJointly(fit, row, itemWord);
  const worst = worstOf([...attributes.map((one) => one.verdict), joint.verdict]);
  return { verdict: worst, sentence: overall(attributes, joint, fit.design.n), attributes, joint };
}

function reachOfNumber(group: AttributeGroup, stored: Float64Array, row: SubjectRow, subject: Subject): AttributeReach {
  // Judged on the column's own scale, where a logarithm spreads values as the model sees them.
  const isLn = group.form === "ln";
  const scale = isLn ? Math.log : (value: number) => value;
  const undo = (value: number) => (group.form === "ln" ? Math.exp(value) : value);
  const sorted = isLn ? sortedOf(stored).map(Math.log) : sortedOf(stored);
  const value = group.blend !== null ? row.x[group.columns[0]!]! : scale(rawValue(group, subject));
  const [low, high] = [sorted[0]!, sorted[sorted.length - 1]!];
  const verdict: ReachVerdict = value < low || value > high ? "beyond" : isAtEdge(sorted, value) ? "edge" : "inside";
  const text = (one: number) =>
    `${formatNumber(undo(one), group.decimals)}${group.unit === null ? "" : `\u00a0${group.unit}`}`;
  const name = group.label;
  const range = `${formatNumber(undo(low), group.decimals)}–${text(high)}`;
  const sentence =
    verdict === "beyond"
      ? `${name} ${text(value)} lies beyond the evidence, which runs ${range}.`
      : verdict === "edge"
        ? `${name} ${text(value)} lies at the edge of the evidence, ${range}, where few sales stand.`
        : `${name} ${text(value)} lies inside the evidence, ${range}.`;
  const beyondKnots = group.knots.length > 0 && (value < group.knots[0]! || value > group.knots.at(-1)!);
  const straight = " Out there its curve goes on as a straight line.";
  return {
    key: group.key,
    label: group.label,
    verdict,
    value: undo(value),
    low: undo(low),
    high: undo(high),
    sentence: beyondKnots ? `${sentence}${straight}` : sentence,
  };
}

function isAtEdge(sorted: Float64Array, value: number): boolean {
  if (sorted.length >= 100) {
    if (value < quantileOfSorted(sorted, EDGE_SHARE) || value > quantileOfSorted(sorted, 1 - EDGE_SHARE)) return true;
  }
  const above = firstFrom(sorted, value);
  if (above <= 0 || sorted[above] === value) return false;
  const span = sorted[sorted.length - 1]! - sorted[0]!;
  return sorted[above]! - sorted[above - 1]! > GAP_SHARE * span;
}

/** Place of the first value that is not below; −1 when all are. */
function firstFrom(sorted: Float64Array, value: number): number {
  let [low, high] = [0, sorted.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low === sorted.length ? -1 : low;
}

function reachOfLevel(fit: Fit, group: AttributeGroup, subject: Subject): AttributeReach {
  const asked = subject.values[group.key];
  const stated = group.form === "yesNo" ? (asked === true || asked === "yes" ? "yes" : "no") : String(asked);
  const level = group.merged?.levels.includes(stated) ? group.merged.name : stated;
  const counts = group.columns.map((index) => fit.design.columns[index]!);
  const column = counts.find((one) => one.level === level);
  const countOf = ({ mean }: { mean: number }): number => Math.round(mean * fit.design.n);
  const others = counts.reduce((sum, one) => sum + countOf(one), 0);
  const count = column === undefined ? fit.design.n - others : countOf(column);
  const verdict: ReachVerdict = count === 0 ? "beyond" : count < FEW_SALES ? "edge" : "inside";
  const sales = count === 1 ? "1 sale" : `${formatNumber(count)} sales`;
  const sentence = `${sales} of the evidence ${count === 1 ? "has" : "have"} ${lowerStart(group.label)} ${level}.`;
  return { key: group.key, label: group.label, verdict, value: level, low: null, high: null, sentence };
}

function reachJointly(fit: Fit, row: SubjectRow, itemWord: string): Reach["joint"] {
  const leverage = subjectLeverage(fit, row);
  let highest = 0;
  let further = 0;
  for (const h of fit.leverages) {
    highest = Math.max(highest, h);
    if (h > leverage) further++;
  }
  const verdict: ReachVerdict =
    leverage > highest ? "beyond" : further <= fit.design.n * EDGE_SHARE ? "edge" : "inside";
  const sentence =
    verdict === "beyond"
      ? `Taken together, the values lie beyond the evidence: no sale lies as far from the middle as this ${itemWord}.`
      : `Taken together, ${further === 1 ? "1 sale lies" : `${formatNumber(further)} sales lie`} further from the middle than this ${itemWord}.`;
  return { leverage, highestInEvidence: highest, further, verdict, sentence };
}

function worstOf(verdicts: readonly ReachVerdict[]): ReachVerdict {
  if (verdicts.includes("beyond")) return "beyond";
  return verdicts.includes("edge") ? "edge" : "inside";
}

function overall(attributes: readonly AttributeReach[], joint: Reach["joint"], n: number): string {
  const named = (verdict: ReachVerdict) =>
    attributes.filter((one) => one.verdict === verdict).map((one) => lowerStart(one.label));
  const [beyond, edge] = [named("beyond"), named("edge")];
  if (beyond.length > 0) return `Beyond the evidence in ${listWords(beyond)}. ${joint.sentence}`;
  if (joint.verdict === "beyond")
    return `Each value lies within those of the ${formatNumber(n)} sales, but not the combination. ${joint.sentence}`;
  if (edge.length > 0) return `At the edge of the evidence in ${listWords(edge)}. ${joint.sentence}`;
  return `Inside the evidence. Each value lies within those of the ${formatNumber(n)} sales. ${joint.sentence}`;
}
