/**
 * CV+ with K = 10 folds (Barber, Candès, Ramdas & Tibshirani 2021, §3 and theorem 4): sale i is priced by the fit without its
 * fold, r_i = y_i − ŷ_i, and m_i is the subject's value in that fit; ranges from the order statistics of m ∓ |r| as in jackknife+.
 * It holds 1 − 2α − min(2(1 − 1/K)/(n/K + 1), (1 − K/n)/(K + 1)) or more of exchangeable sales.
 * A sale's fold is its place in the design's order, (i mod K).
 */
import { AppError } from "../../domain/errors.ts";
import type { Fit, FitRule } from "../../hedonic/fit.ts";
import { type Moments, mergeMoments, partsBy } from "../../numerics/accumulateMoments.ts";
import type { Column } from "../../numerics/column.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../numerics/solveLeastSquares.ts";
import {
  fittedAt,
  leastLevels,
  orderedRanges,
  type RangeRule,
  type RefitRule,
  whatIsHeld,
  withoutRanges,
} from "./rangeRule.ts";

const FOLDS = 10;

/**
 * Weights and penalties are held as the fit has them, unless `refitRule` finds them anew for every fold: then the promise holds
 * for any estimator without recency weights.
 */
export const cvPlus: RangeRule = (fit, row, levels, askedRule) => {
  const { design } = fit;
  // Plain least squares has no rule to find, and its folds are sums of parts.
  const refitRule = whatIsHeld(fit.rule) === null ? undefined : askedRule;
  const counted = design.weights?.reduce((sum, w) => sum + (w > 0 ? 1 : 0), 0) ?? design.n;
  if (counted < 2 * FOLDS) return withoutRanges("cv+", "Fewer than 20 sales are too few to set a tenth aside in turn.");
  const lows = new Float64Array(design.n);
  const highs = new Float64Array(design.n);
  let n = 0;
  try {
    for (const { rows, solution } of refits(fit, refitRule)) {
      const subject = fittedAt({ solution, columns: fit.columns }, row);
      for (const i of rows) {
        const r = Math.abs(solution.residuals[i]!);
        lows[n] = subject - r;
        highs[n++] = subject + r;
      }
    }
  } catch (cause) {
    // An estimator refuses in the words of the class, numerics in its own.
    if (!(cause instanceof NumericsError || cause instanceof AppError)) throw cause;
    return withoutRanges(
      "cv+",
      "Without one tenth of the sales the model cannot be fitted, so this range cannot be given.",
    );
  }
  const held = promiseLost(fit, refitRule);
  return {
    kind: "cv+",
    ranges: orderedRanges(fit, lows.subarray(0, n), highs.subarray(0, n), levels),
    sentence: `The sales are priced a tenth at a time by the other nine, and the subject with them; the range comes from these errors, whatever their distribution.${held === null ? "" : ` ${held}`}`,
    guarantee:
      held === null
        ? `If the next sale is drawn as these were, the range holds it: asked ${leastLevels(levels, smallTerm(n))}; usually about what is asked.`
        : null,
  };
};

function smallTerm(n: number): number {
  return Math.min((2 * (1 - 1 / FOLDS)) / (n / FOLDS + 1), (1 - FOLDS / n) / (FOLDS + 1));
}

function promiseLost({ design, rule }: Fit, refitRule: RefitRule | undefined): string | null {
  if (refitRule === undefined) return whatIsHeld(rule);
  return design.weights === null ? null : "Sales do not count alike, so the usual promise holds nearly, not exactly.";
}

interface Refit {
  /** The fold's sales that count. */
  readonly rows: readonly number[];
  readonly solution: LeastSquaresSolution;
}

function* refits(fit: Fit, refitRule: RefitRule | undefined): Generator<Refit> {
  const { design } = fit;
  const columns = fit.columns.map((index) => design.columns[index]!.values);
  const parts = refitRule === undefined ? partsOf(fit, columns) : null;
  for (let fold = 0; fold < FOLDS; fold++) {
    const kept = Float64Array.from({ length: design.n }, (_, i) => (i % FOLDS === fold ? 0 : 1));
    const rule = refitRule?.(kept) ?? heldRule(fit.rule, kept);
    const moments = parts === null ? undefined : mergeMoments(parts.filter((_, other) => other !== fold));
    const rows: number[] = [];
    for (let i = fold; i < design.n; i += FOLDS) if (design.weights?.[i] !== 0) rows.push(i);
    yield { rows, solution: solve(fit, columns, rule, moments) };
  }
}

function heldRule({ weights, penalty }: FitRule, kept: Float64Array): FitRule {
  return { weights: weights === null ? kept : kept.map((one, i) => one * weights[i]!), penalty };
}

/** Moments of each fold, so that no fold is summed ten times. */
function partsOf({ design, rule }: Fit, columns: readonly Column[]): Moments[] {
  const folds = Uint16Array.from({ length: design.n }, (_, i) => i % FOLDS);
  return partsBy([...columns, design.response], folds, FOLDS, rule.weights ?? undefined);
}

function solve(
  { design, columns }: Fit,
  values: readonly Column[],
  { weights, penalty }: FitRule,
  moments: Moments | undefined,
): LeastSquaresSolution {
  return solveLeastSquares(values, design.response, {
    intercept: true,
    ...(moments === undefined ? {} : { moments }),
    ...(weights === null ? {} : { weights }),
    ...(penalty === null ? {} : { penalty: Float64Array.from(columns, (column) => penalty[column]!) }),
  });
}
