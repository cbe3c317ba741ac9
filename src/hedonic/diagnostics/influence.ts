/**
 * Do single sales hold the model? Cook's distance D (1977) moves the coefficients to the edge of their joint region that holds
 * P(F ≤ D), F with p and n − p: half of it and more is much, a fifth is worth a look (Cook 1977; the fifth is common practice).
 * Counts beside it: leverage above 2p/n and 3p/n (Hoaglin & Welsch 1978), |t| above 3, |DFFITS| above 2√(p/n), |COVRATIO − 1| above
 * 3p/n (Belsley, Kuh & Welsch 1980).
 */

import type { DiagnosisDetail } from "../../domain/diagnosis.ts";
import { formatNumber, formatPercent } from "../../domain/format.ts";
import { fUpperTail } from "../../numerics/fDistribution.ts";
import { covarianceRatios, type RowDiagnostics } from "../../numerics/rowDiagnostics.ts";
import type { Fit } from "../fit.ts";
import { type Diagnostic, worstSales } from "./diagnostic.ts";

export const influence: Diagnostic = {
  code: "influence",
  label: "Sales that hold the model",
  needs: 2,
  underWeights: true,
  run: (fit, context) => {
    const rows = context.rows();
    const { rank, residualDf } = fit.solution;
    // A sale that is the only one of its kind has no distance; it is counted by its leverage.
    const size = (i: number) => rows.cooksDistances[i]! || 0;
    let statistic = 0;
    for (let i = 0; i < fit.design.n; i++) statistic = Math.max(statistic, size(i));
    const share = 1 - fUpperTail(statistic, rank, residualDf);
    const limit = 2 * Math.sqrt(rank / fit.design.n);
    const isLarge = (i: number) => Math.abs(rows.dffits[i]!) > limit;
    const verdict = share >= 0.5 ? "trouble" : share >= 0.2 ? "look" : "fine";
    return {
      statistic,
      df: [rank, residualDf],
      p: null,
      verdict,
      sentence:
        verdict === "fine"
          ? "No single sale moves the effects much; the model does not hang on any one."
          : `One sale alone moves the effects to the edge of the region that holds them ${formatPercent(share)} of the time.`,
      whatToDo:
        verdict === "fine"
          ? "Nothing."
          : "Check the record of that sale and look at the price without it; set it aside only for a reason that can be written down.",
      source: "Cook 1977; Belsley, Kuh & Welsch 1980",
      sales: worstSales(fit, size, isLarge),
      details: countsOf(fit, rows),
    };
  },
};

function countsOf({ solution, design }: Fit, rows: RowDiagnostics): DiagnosisDetail[] {
  const { rank } = solution;
  const { n } = design;
  const ratios = covarianceRatios(rows, solution);
  const count = (values: Float64Array, middle: number, limit: number, words: string): DiagnosisDetail => ({
    label: `Sales with ${words} ${formatNumber(limit, limit < 1 ? 3 : 2)}`,
    value: values.reduce((sum, value) => sum + (Math.abs(value - middle) > limit ? 1 : 0), 0),
    limit: null,
  });
  return [
    count(rows.leverages, 0, (2 * rank) / n, "leverage above"),
    count(rows.leverages, 0, (3 * rank) / n, "leverage above"),
    count(rows.externallyStudentised, 0, 3, "a distance in standard errors above"),
    count(rows.cooksDistances, 0, 4 / n, "Cook's distance above"),
    count(rows.dffits, 0, 2 * Math.sqrt(rank / n), "their own price moved by standard errors above"),
    count(ratios, 1, (3 * rank) / n, "ranges changed (COVRATIO from 1) by more than"),
  ];
}
