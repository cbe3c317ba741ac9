/**
 * Is the sale furthest from the model of the others further than chance allows? n·P(|T| > max |t|), at most 1, t externally
 * studentised (Beckman & Trussell 1974) with Bonferroni's bound.
 */
import { tTwoSided } from "../../numerics/studentT.ts";
import { type Diagnostic, verdictOf, worstSales } from "./diagnostic.ts";

export const outlier: Diagnostic = {
  code: "outlier",
  label: "Sale furthest out",
  needs: 2,
  underWeights: false,
  run: (fit, context) => {
    const { externallyStudentised } = context.rows();
    // A sale that is the only one of its kind has no distance from the others.
    const size = (i: number) => Math.abs(externallyStudentised[i]!) || 0;
    let statistic = 0;
    for (let i = 0; i < fit.design.n; i++) statistic = Math.max(statistic, size(i));
    const df = fit.solution.residualDf - 1;
    const chance = (t: number) => Math.min(1, fit.design.n * tTwoSided(t, df));
    const p = chance(statistic);
    return {
      statistic,
      df: [df],
      p,
      verdict: verdictOf(p),
      sentence:
        p < 0.05
          ? `One sale lies ${statistic.toFixed(1)} standard errors from the model of the others: more than chance allows.`
          : "No sale lies further from the model than chance allows.",
      whatToDo:
        p < 0.05
          ? "Check the record of that sale; set it aside only for a reason that can be written down."
          : "Nothing.",
      source: "Beckman & Trussell 1974; Bonferroni",
      sales: worstSales(fit, size, (i) => size(i) > 3 && chance(size(i)) < 0.05),
    };
  },
};
