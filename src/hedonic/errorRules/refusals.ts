/** What the error rules refuse, in the words of the class. */
import { AppError } from "../../domain/errors.ts";
import { formatNumber } from "../../domain/format.ts";
import type { Fit } from "../fit.ts";

function refusal(code: string, what: string, whatToDo: string): AppError {
  return new AppError({ family: "fit", code, what, where: "Price model, errors", whatToDo });
}

export function noDegrees({ design, solution }: Fit): AppError {
  const sales = design.n === 1 ? "1 sale" : `${formatNumber(design.n)} sales`;
  return refusal(
    "too-few-sales",
    `${sales} spent on ${formatNumber(solution.rank)} coefficients leave nothing to judge errors by.`,
    "Leave attributes out, or bring in more sales.",
  );
}

export function loneSale(kind: string, count: number): AppError {
  const who =
    count === 1
      ? "One sale is the only one of its kind"
      : `${formatNumber(count)} sales are the only ones of their kind`;
  return refusal(
    "lone-sale",
    `${who}, so the model meets ${count === 1 ? "its price" : "their prices"} exactly and ${kind} errors do not exist.`,
    "Merge or pool rare levels, leave that attribute out, or use HC1.",
  );
}

export function oneCluster(label: string): AppError {
  return refusal(
    "one-cluster",
    `All sales are alike in ${label}, so errors cannot be judged between clusters.`,
    "Cluster by something that differs, or use HC3.",
  );
}

export function noSuchCluster(label: string): AppError {
  return refusal(
    "no-clusters",
    `Sales cannot be put into clusters by ${label}: it is no choice of the reference set.`,
    "Cluster by the source or by a choice of the reference set.",
  );
}
