/**
 * Sales of one cluster may be alike, those of different clusters are independent (Liang & Zeger 1986), with the small-sample
 * factor G/(G − 1)·(n − 1)/(n − p) (CR1) and t with G − 1 degrees of freedom. With few clusters ranges come out too narrow:
 * below about 40 to 50 (Cameron & Miller 2015, from memory).
 */
import { formatNumber } from "../../domain/format.ts";
import { pulledCovariance } from "../../numerics/clusterCovariance.ts";
import type { Fit } from "../fit.ts";
import { clustersOf } from "./clusters.ts";
import { countedSales, type ErrorContext, errorsFrom, type FitErrors } from "./errors.ts";
import { pullsOf } from "./pulls.ts";
import { noDegrees, oneCluster } from "./refusals.ts";

const FEW_CLUSTERS = 40;

export function clusteredErrors(fit: Fit, by: string, { curvature, sources }: ErrorContext): FitErrors {
  const clusters = clustersOf(fit, by, sources);
  const { count, label } = clusters;
  if (count < 2) throw oneCluster(label);
  const n = countedSales(fit);
  const p = fit.solution.rank;
  if (n <= p) throw noDegrees(fit);
  const pulls = pullsOf(fit, curvature);
  const factor = Math.sqrt((count / (count - 1)) * ((n - 1) / (n - p)));
  const scores = pulls.scores.map((score) => factor * score);
  const covariance = pulledCovariance(pulls.columns, pulls.outer, scores, clusters);
  const few = `${formatNumber(count)} clusters are few: below about ${FEW_CLUSTERS} the ranges tend to be too narrow.`;
  const df = count - 1;
  const many = `They judge at most ${formatNumber(df)} ${df === 1 ? "effect" : "effects"} together.`;
  return errorsFrom(
    covariance,
    df,
    `Sales alike in ${label} may share their errors: ${formatNumber(count)} clusters, t with ${formatNumber(df)} ${df === 1 ? "degree" : "degrees"} of freedom.`,
    count < FEW_CLUSTERS ? (df < p - 1 ? `${few} ${many}` : few) : null,
  );
}
