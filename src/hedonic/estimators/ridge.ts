/**
 * Ridge (numerics/ridge.ts) on standardised columns: one standardised unit is the root mean square deviation of a number, and of
 * a choice the root of the mean variance of its level columns, one for all its levels. Levels standardised one by one would be
 * drawn alike however many sales they have; with one unit a rare level is drawn more, which is what its sales allow.
 * A choice is drawn towards its reference level, so the result depends on which level that is, unless the choice is pooled.
 */
import { AppError } from "../../domain/errors.ts";
import { formatNumber } from "../../domain/format.ts";
import { type Column, isIndicator, numbersOf } from "../../numerics/column.ts";
import { chooseRidgePenalty, type RidgePoint, ridgeErrors } from "../../numerics/ridge.ts";
import { meanOf } from "../../numerics/weightedSteps.ts";
import type { Design } from "../fit.ts";
import { type EstimatorRule, NO_EXTRAS, sentences } from "./estimator.ts";
import { inClassWords, modelColumns } from "./modelColumns.ts";

export const ridge: EstimatorRule<"ridge"> = {
  label: "ridge",
  about: "Draws all effects towards zero, most where attributes move together; steadier prices for a small bias.",
  estimate(design, groups, setting, ground) {
    const { values, indexes, penalty } = modelColumns(design, groups, ground.rule);
    const units = standardUnits(design, ground.rule.weights);
    const scales = Float64Array.from(indexes, (index) => units[index]!);
    const options = { weights: ground.rule.weights, penalty };
    const { best, curve } = inClassWords(design, groups, () =>
      setting.penalty === null
        ? chooseRidgePenalty(values, design.response, scales, options)
        : stated(setting.penalty, (one) => ridgeErrors(values, design.response, scales, [one], options)[0]!),
    );
    const isChosen = setting.penalty === null;
    return {
      rule: {
        weights: ground.rule.weights,
        penalty: units.map((unit, index) => best.penalty * unit ** 2 + (ground.rule.penalty?.[index] ?? 0)),
      },
      scale: null,
      iterations: 0,
      sentence: sentences(words(best, isChosen, indexes.length + 1), ground.sentence),
      exactRange: false,
      whichRange:
        "Effects are drawn towards zero on purpose, so no exact range exists; the jackknife+ range takes the drawing in.",
      extras: { ...NO_EXTRAS, pooled: ground.pooled, ridge: { ...best, isChosen, curve } },
    };
  },
};

function stated(penalty: number, errorAt: (penalty: number) => RidgePoint): { best: RidgePoint; curve: RidgePoint[] } {
  if (Number.isFinite(penalty) && penalty >= 0) return { best: errorAt(penalty), curve: [] };
  throw new AppError({
    family: "fit",
    code: "penalty",
    what: `A ridge penalty of ${penalty} cannot be used: it must be zero or more.`,
    where: "Price model, estimator",
    whatToDo: "Type a number from 0 up, or let leave-one-out error choose it.",
  });
}

function words(best: RidgePoint, isChosen: boolean, count: number): string {
  const by = isChosen ? "chosen by leave-one-out error" : "as stated";
  if (best.penalty === 0) return `Ridge: no penalty, ${by}; this is least squares.`;
  const decimals = Math.max(0, 2 - Math.floor(Math.log10(best.penalty)));
  return (
    `Ridge: a penalty worth ${formatNumber(best.penalty, Math.min(decimals, 12))} sales, ${by}. ` +
    `Of ${count} coefficients ${formatNumber(best.effectiveCount, 1)} are still free to follow the sales.`
  );
}

/** One standardised unit of each column of the design, in raw units; 1 for a column without spread. */
export function standardUnits(design: Design, weights: Float64Array | null): Float64Array {
  const variances = Float64Array.from(design.columns, ({ values }) => variance(values, weights));
  for (const { columns } of design.groups) {
    const levels = columns.filter((index) => isIndicator(design.columns[index]!.values));
    if (levels.length < 2) continue;
    const shared = levels.reduce((sum, index) => sum + variances[index]!, 0) / levels.length;
    for (const index of levels) variances[index] = shared;
  }
  return variances.map((value) => (value > 0 ? Math.sqrt(value) : 1));
}

function variance(column: Column, weights: Float64Array | null): number {
  const values = numbersOf(column);
  const mean = meanOf(values, weights);
  return meanOf(
    values.map((value) => (value - mean) ** 2),
    weights,
  );
}
