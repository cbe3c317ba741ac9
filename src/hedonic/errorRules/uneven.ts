/**
 * No even spread supposed: each sale's own squared residual stands for its variance (White 1980); HC1 times n/(n − p), HC2 over
 * 1 − h, HC3 over (1 − h)² (MacKinnon & White 1985). Robust estimates: ψ in place of e, ψ′ in the inner matrix (Huber 1981).
 */
import { formatNumber } from "../../domain/format.ts";
import type { ErrorRule } from "../../domain/priceModel.ts";
import { pulledCovariance } from "../../numerics/clusterCovariance.ts";
import type { Fit } from "../fit.ts";
import { countedSales, type ErrorContext, errorsFrom, type FitErrors } from "./errors.ts";
import { pullsOf } from "./pulls.ts";
import { loneSale, noDegrees } from "./refusals.ts";

export type HcKind = Extract<ErrorRule["kind"], `HC${number}`>;

/** A leverage this near 1: the sale is the only one of its kind, and its residual is zero whatever it sold for. */
const FULL_LEVERAGE = 1 - 1e-9;
/** Below this many sales the first two are known to be too narrow (Long & Ervin 2000). */
const FEW_SALES = 250;

const SUPPOSED: Readonly<Record<HcKind, string>> = {
  HC0: "takes each sale's residual as it is",
  HC1: "widens all alike for the coefficients spent",
  HC2: "widens each sale's residual for its leverage",
  HC3: "takes each sale's residual about as if it had been left out",
};

export function unevenErrors(fit: Fit, kind: HcKind, { curvature }: ErrorContext): FitErrors {
  const pulls = pullsOf(fit, curvature);
  const n = countedSales(fit);
  const df = n - fit.solution.rank;
  if (df <= 0) throw noDegrees(fit);
  const alone = pulls.leverages.reduce((count, h) => count + (h > FULL_LEVERAGE ? 1 : 0), 0);
  if (alone > 0 && (kind === "HC2" || kind === "HC3")) throw loneSale(kind, alone);
  const scores = pulls.scores.map((score, i) => score * factorOf(kind, pulls.leverages[i]!, n, df));
  const covariance = pulledCovariance(pulls.columns, pulls.outer, scores, null);
  const caution =
    n < FEW_SALES && kind !== "HC3"
      ? `With ${formatNumber(n)} sales ${kind} ranges tend to be too narrow; HC3 is the safer choice below 250.`
      : null;
  return errorsFrom(
    covariance,
    df,
    `Supposes no even spread: ${kind} ${SUPPOSED[kind]}. Sales are independent.`,
    caution,
  );
}

function factorOf(kind: HcKind, h: number, n: number, df: number): number {
  if (kind === "HC0") return 1;
  if (kind === "HC1") return Math.sqrt(n / df);
  return kind === "HC2" ? 1 / Math.sqrt(1 - h) : 1 / (1 - h);
}
