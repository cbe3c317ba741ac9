/**
 * Does one attribute bend where the model has it straight? Each number enters once more as its square about the mean, alone:
 * t² = (q′e)²/(q′Mq)/s₁², q′Mq = q′q − q′X C⁻¹X′q what the other columns leave of the square, s₁² with one column more
 * (the test beside component-plus-residual plots: Ezekiel 1924; Larsen & McCleary 1972). Of m attributes the worst, times m
 * (Bonferroni).
 */
import { type Column, numbersOf, rowsOf } from "../../numerics/column.ts";
import { quadraticForm } from "../../numerics/leverages.ts";
import { tTwoSided } from "../../numerics/studentT.ts";
import type { AttributeGroup, Fit } from "../fit.ts";
import { centredProduct, columnsOf, type Diagnostic, momentsOfMade, SMALL_SHARE, verdictOf } from "./diagnostic.ts";

export const bends: Diagnostic = {
  code: "bends",
  label: "Attributes that bend",
  needs: 3,
  underWeights: false,
  run: (fit) => {
    const straight = fit.groups.filter(
      ({ form, columns, product }) => (form === "line" || form === "ln") && columns.length === 1 && product === null,
    );
    const df = fit.solution.residualDf - 1;
    const found = bendsOf(fit, straight)
      .map((bend) => ({ ...bend, p: Math.min(1, straight.length * tTwoSided(bend.t, df)) }))
      .sort((a, b) => Math.abs(b.t) - Math.abs(a.t));
    const worst = found[0];
    if (worst === undefined)
      return "No number enters the model as a straight line or logarithm with more than two values.";
    const { t, p, group } = worst;
    const [ends, middle] = t > 0 ? ["higher", "lower"] : ["lower", "higher"];
    return {
      statistic: t,
      df: [df],
      p,
      verdict: verdictOf(p, t * t < SMALL_SHARE * (t * t + df)),
      sentence:
        p < 0.05
          ? `${group.label} bends: prices lie ${ends} at both ends of it than the model says, and ${middle} in between.`
          : "No number bends where the model has it straight.",
      whatToDo: p < 0.05 ? `Try a curve or a logarithm for ${group.label}.` : "Nothing.",
      source: "Larsen & McCleary 1972; Bonferroni",
      attributes: found.filter((bend) => bend.p < 0.05).map((bend) => bend.group.key),
      details: found.map((bend) => ({ label: bend.group.label, value: bend.t, limit: null })),
    };
  },
};

/** A square that the other columns leave less than this share of is one of them: a number of two values, or a curve already there. */
const LEAST_LEFT = 1e-9;

function bendsOf(fit: Fit, groups: readonly AttributeGroup[]): { group: AttributeGroup; t: number }[] {
  const { solution, design } = fit;
  if (groups.length === 0) return [];
  const columns = columnsOf(fit);
  const k = columns.length;
  const bases = groups.map((group) => fit.columns.indexOf(group.columns[0]!));
  const moments = momentsOfMade(design.n, (start, size) => [
    ...columns.map((column) => rowsOf(column, start, start + size)),
    solution.residuals.subarray(start, start + size),
    ...bases.map((j) => squares(columns[j]!, solution.means[j]!, start, size)),
  ]);
  return groups.flatMap((group, at) => {
    const q = k + 1 + at;
    const square = centredProduct(moments, q, q);
    const shared = Float64Array.from({ length: k }, (_, j) => centredProduct(moments, j, q));
    const left = square - quadraticForm(solution.rootInverse, shared);
    if (!(left > LEAST_LEFT * square)) return [];
    const withRest = centredProduct(moments, k, q);
    const explained = withRest ** 2 / left;
    const rest = Math.max(0, solution.residualSumOfSquares - explained) / (solution.residualDf - 1);
    return [{ group, t: Math.sign(withRest) * Math.sqrt(explained / rest) }];
  });
}

function squares(column: Column, mean: number, start: number, size: number): Float64Array {
  return numbersOf(rowsOf(column, start, start + size)).map((x) => (x - mean) ** 2);
}
