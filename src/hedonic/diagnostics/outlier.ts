/** Is the sale furthest from the model of the others further than chance allows? n·P(|T| > max |t|), at most 1 (Bonferroni). */
import { rowDiagnostics } from "../../numerics/rowDiagnostics.ts";
import { tTwoSided } from "../../numerics/studentT.ts";
import { columnsOf, type Diagnostic, verdictOf } from "./diagnostic.ts";

export const outlier: Diagnostic = {
  code: "outlier",
  needs: 2,
  run: (fit) => {
    const { externallyStudentised } = rowDiagnostics(columnsOf(fit), fit.design.response, fit.solution);
    // A sale that is the only one of its kind has no distance from the others.
    const statistic = externallyStudentised.reduce(
      (most, t) => (Number.isNaN(t) ? most : Math.max(most, Math.abs(t))),
      0,
    );
    const df = fit.solution.residualDf - 1;
    const p = Math.min(1, fit.design.n * tTwoSided(statistic, df));
    return {
      code: "outlier",
      label: "Sale furthest out",
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
      source: "Belsley, Kuh & Welsch 1980; Bonferroni",
    };
  },
};
