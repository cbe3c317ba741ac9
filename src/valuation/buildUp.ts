/**
 * From the average sale to the subject, one step per attribute, in money. Start = e^ȳ after ln (the geometric average),
 * else ȳ. The running totals use the very sum that the price is made of, so the last one is the price to the last bit.
 */
import type { BuiltUp, BuiltUpStep } from "../domain/appraisal.ts";
import { DAYS_PER_MONTH, dayOf } from "../domain/day.ts";
import { formatDay, formatNumber, formatPercent } from "../domain/format.ts";
import type { Subject } from "../domain/subject.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { builtUpOrder, contributionOf } from "./estimatePrice.ts";
import { rawValue } from "./rawValue.ts";

export function buildUp(fit: Fit, row: SubjectRow, subject: Subject): BuiltUp {
  const isLn = fit.design.responseForm === "lnPrice";
  const back = isLn ? Math.exp : (value: number) => value;
  let sum = fit.solution.responseMean;
  let standsAt = back(sum);
  const start = standsAt;
  const steps = builtUpOrder(fit).map((group): BuiltUpStep => {
    const contribution = contributionOf(fit, row, group);
    const before = standsAt;
    sum += contribution;
    standsAt = back(sum);
    return {
      key: group.key,
      label: group.label,
      averageWords: averageWords(fit, group),
      subjectWords: subjectWords(fit, group, row, subject),
      contribution,
      factor: isLn ? Math.exp(contribution) : null,
      step: standsAt - before,
      standsAt,
    };
  });
  return { start, steps, end: standsAt };
}

function averageWords(fit: Fit, group: AttributeGroup): string {
  const column = fit.design.columns[group.columns[0]!]!;
  if (group.isMarket && group.form === "line") {
    return formatDay(dayOf(fit.design.soldOn[0]! + column.mean * DAYS_PER_MONTH));
  }
  if (group.form === "choice" || group.isMarket || group.product !== null) return "mixed";
  if (group.form === "yesNo") return `${formatPercent(column.mean)} yes`;
  if (group.form === "spline") return withUnit(meanOf(group.stored!), group);
  return withUnit(group.form === "ln" ? Math.exp(column.mean) : column.mean, group);
}

function subjectWords(fit: Fit, group: AttributeGroup, row: SubjectRow, subject: Subject): string {
  const value = row.x[group.columns[0]!]!;
  if (group.isMarket) {
    const last = fit.design.soldOn[fit.design.n - 1]!;
    const held = subject.effectiveOn > dayOf(last);
    return held ? `${formatDay(dayOf(last))}, held` : formatDay(subject.effectiveOn);
  }
  if (group.product !== null) return "as both are";
  if (group.form === "choice") return String(subject.values[group.key]);
  if (group.form === "yesNo") return value === 1 ? "yes" : "no";
  if (group.form === "spline") return withUnit(rawValue(group, subject), group);
  return withUnit(group.form === "ln" ? Math.exp(value) : value, group);
}

function meanOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function withUnit(value: number, group: AttributeGroup): string {
  const decimals = Number.isInteger(Number(value.toFixed(group.decimals))) && group.decimals > 1 ? 1 : group.decimals;
  return group.unit === null ? formatNumber(value, decimals) : `${formatNumber(value, decimals)}\u00a0${group.unit}`;
}
