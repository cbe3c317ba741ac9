/**
 * Residuals spread evenly and independently. Plain: s²C⁻¹, s² = Σe²/(n − p). Recency weights are preferences, not precisions:
 * then C⁻¹(Σ w²dd′)C⁻¹·s² with s² = Σwe²/Σw(1 − h), which keeps E s² = σ². Penalties: s²C⁻¹ with C the penalised matrix, the
 * covariance of effect less estimate when effects are draws themselves (Henderson 1975), s² over n − Σh.
 * Robust estimates: K²·[Σψ²/(n − p)]/ψ̄′²·(X′X)⁻¹, K = 1 + (p/n)·var ψ′/ψ̄′² (Huber 1981, equation 6.5 in chapter 7, from memory).
 */
import { breadOfCurvature, evenCovariance, pulledCovariance } from "../../numerics/clusterCovariance.ts";
import { inClassWords } from "../estimators/modelColumns.ts";
import type { Fit } from "../fit.ts";
import { countedSales, type ErrorContext, errorsFrom, type FitErrors } from "./errors.ts";
import { type Pulls, pullsOf } from "./pulls.ts";
import { noDegrees } from "./refusals.ts";

/** Below this many sales HC3 is the safer choice (Long & Ervin 2000). */
const FEW_SALES = 250;

export function evenErrors(fit: Fit, { curvature }: ErrorContext): FitErrors {
  const pulls = pullsOf(fit, null);
  if (curvature !== null) return ofRobust(fit, pulls, curvature);
  const { weights, penalty } = fit.rule;
  const n = countedSales(fit);
  const effective = pulls.leverages.reduce((sum, h) => sum + h, 0);
  const df = penalty === null ? n - fit.solution.rank : n - effective;
  if (!(df > 0)) throw noDegrees(fit);
  const squares = pulls.scores.reduce((sum, score, i) => sum + score * fit.solution.residuals[i]!, 0);
  const advice = n < FEW_SALES ? ADVICE : null;
  if (weights !== null && penalty === null) {
    const free = pulls.leverages.reduce((sum, h, i) => sum + weights[i]! * (1 - h), 0);
    const s = Math.sqrt(squares / free);
    const covariance = pulledCovariance(
      pulls.columns,
      pulls.own,
      weights.map((w) => s * w),
      null,
    );
    return errorsFrom(covariance, df, `${SUPPOSED} Recency weights are taken as preferences.`, advice);
  }
  const told =
    penalty === null ? SUPPOSED : `${SUPPOSED} Effects that are drawn in are taken as draws around their centre.`;
  return errorsFrom(evenCovariance(pulls.own, squares / df), df, told, advice);
}

const SUPPOSED = "Supposes that residuals spread evenly and that sales are independent.";
const ADVICE =
  "With fewer than 250 sales HC3 is the safer choice for the ranges of effects, since an uneven spread would hardly show.";

function ofRobust(fit: Fit, pulls: Pulls, curvature: Float64Array): FitErrors {
  const { design, solution, columns, rule } = fit;
  const n = design.n;
  const df = n - solution.rank;
  if (df <= 0) throw noDegrees(fit);
  const told = "Supposes that residuals spread evenly, those out of line included, and that there are many sales.";
  if (design.weights !== null) {
    const scores = pulls.scores.map((score) => score * Math.sqrt(n / df));
    const covariance = pulledCovariance(pulls.columns, pullsOf(fit, curvature).outer, scores, null);
    return errorsFrom(covariance, df, `${told} With recency weights each sale's own residual is taken.`);
  }
  const mean = curvature.reduce((sum, c) => sum + c, 0) / n;
  const spread = curvature.reduce((sum, c) => sum + (c - mean) ** 2, 0) / n;
  const correction = 1 + ((solution.rank / n) * spread) / mean ** 2;
  const scoreVariance = pulls.scores.reduce((sum, score) => sum + score * score, 0) / df;
  const penalty = rule.penalty && Float64Array.from(columns, (index) => rule.penalty![index]! / mean);
  const plain = new Float64Array(n).fill(1);
  const outer = inClassWords(design, fit.groups, () => breadOfCurvature(pulls.columns, plain, penalty));
  return errorsFrom(evenCovariance(outer, (correction ** 2 * scoreVariance) / mean ** 2), df, told);
}
