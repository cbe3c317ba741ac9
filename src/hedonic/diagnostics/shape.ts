/** Are the residuals normal? n/6·(S² + (K − 3)²/4), S skewness, K kurtosis; chi-squared with 2 (Jarque & Bera 1987). */
import { chiSquaredUpperTail } from "../../numerics/chiSquared.ts";
import { type Diagnostic, verdictOf } from "./diagnostic.ts";

export const shape: Diagnostic = {
  code: "shape",
  label: "Normal residuals",
  needs: 1,
  underWeights: false,
  run: ({ solution: { residuals } }) => {
    const n = residuals.length;
    const moment = (power: number) => residuals.reduce((sum, e) => sum + e ** power, 0) / n;
    const variance = moment(2);
    const skewness = moment(3) / variance ** 1.5;
    const excess = moment(4) / variance ** 2 - 3;
    const statistic = (n / 6) * (skewness ** 2 + excess ** 2 / 4);
    const p = chiSquaredUpperTail(statistic, 2);
    return {
      statistic,
      df: [2],
      p,
      verdict: verdictOf(p, Math.abs(skewness) < 0.5 && Math.abs(excess) < 1),
      sentence:
        p < 0.05
          ? `Distances from the model are not normal: skewness ${skewness.toFixed(2)}, excess kurtosis ${excess.toFixed(2)}.`
          : "Distances from the model agree with a normal distribution.",
      whatToDo: p < 0.05 ? "Prefer the range that needs no distribution for the price of one sale." : "Nothing.",
      source: "Jarque & Bera 1987",
    };
  },
};
