/** Do powers 2 and 3 of ŷ explain what the columns left over? F with 2 and n − p − 2 (Ramsey 1969). */

import { fUpperTail } from "../../numerics/fDistribution.ts";
import { solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import { columnsOf, type Diagnostic, SMALL_SHARE, standardisedFitted, verdictOf } from "./diagnostic.ts";

export const curvature: Diagnostic = {
  code: "curvature",
  label: "Missing curvature",
  needs: 3,
  underWeights: false,
  run: (fit) => {
    const z = standardisedFitted(fit);
    const columns = [...columnsOf(fit), z.map((value) => value ** 2), z.map((value) => value ** 3)];
    // The residuals are at right angles to the columns, so they leave the same rest as the response does.
    const longer = solveLeastSquares(columns, fit.solution.residuals, { intercept: true });
    const explained = longer.totalSumOfSquares - longer.residualSumOfSquares;
    const statistic = explained / 2 / (longer.residualSumOfSquares / longer.residualDf);
    const p = fUpperTail(statistic, 2, longer.residualDf);
    return {
      statistic,
      df: [2, longer.residualDf],
      p,
      verdict: verdictOf(p, explained < SMALL_SHARE * longer.totalSumOfSquares),
      sentence:
        p < 0.05
          ? "The price bends in a way that the forms of the attributes do not follow."
          : "No bend is left that the forms of the attributes do not follow.",
      whatToDo: p < 0.05 ? "Try a logarithm or a curve for the numbers, or a product of two attributes." : "Nothing.",
      source: "Ramsey 1969",
    };
  },
};
