/**
 * Is the spread of the sales around the model the same everywhere? n·R² of e² on the columns (Koenker 1981, the studentised
 * Breusch & Pagan 1979), and on ŷ and ŷ² (White 1980, special form); chi-squared.
 */
import { chiSquaredUpperTail } from "../../numerics/chiSquared.ts";
import {
  columnsOf,
  type Diagnostic,
  explainedSquares,
  SMALL_SHARE,
  standardisedFitted,
  verdictOf,
} from "./diagnostic.ts";

const WHAT_TO_DO =
  "Read coefficient ranges with the errors that allow for uneven spread, or model the logarithm of the price.";

export const spread: Diagnostic = {
  code: "spread",
  label: "Even spread",
  needs: 1,
  underWeights: false,
  run: (fit) => {
    const statistic = explainedSquares(columnsOf(fit), fit.solution);
    const p = chiSquaredUpperTail(statistic, fit.columns.length);
    return {
      statistic,
      df: [fit.columns.length],
      p,
      verdict: verdictOf(p, statistic < SMALL_SHARE * fit.design.n),
      sentence:
        p < 0.05
          ? "Sales lie further from the model at some values of the attributes than at others."
          : "Sales lie about equally far from the model at all values of the attributes.",
      whatToDo: p < 0.05 ? WHAT_TO_DO : "Nothing.",
      source: "Breusch & Pagan 1979; Koenker 1981",
    };
  },
};

export const spreadWithPrice: Diagnostic = {
  code: "spreadWithPrice",
  label: "Spread and price",
  needs: 1,
  underWeights: false,
  run: (fit) => {
    const z = standardisedFitted(fit);
    const statistic = explainedSquares([z, z.map((value) => value * value)], fit.solution);
    const p = chiSquaredUpperTail(statistic, 2);
    return {
      statistic,
      df: [2],
      p,
      verdict: verdictOf(p, statistic < SMALL_SHARE * fit.design.n),
      sentence:
        p < 0.05
          ? "The distance of sales from the model changes with the price itself."
          : "The distance of sales from the model does not change with the price.",
      whatToDo: p < 0.05 ? WHAT_TO_DO : "Nothing.",
      source: "White 1980",
    };
  },
};
