/**
 * MM with the bisquare (numerics/mmEstimate.ts): holds when nearly half of the sales are wrong. What its search cannot settle is
 * refused rather than told as an answer.
 */
import { AppError } from "../../domain/errors.ts";
import { type MmEstimate, mmEstimate } from "../../numerics/mmEstimate.ts";
import { NumericsError } from "../../numerics/numericsError.ts";
import type { AttributeGroup, Design } from "../fit.ts";
import type { EstimatorRule, Ground } from "./estimator.ts";
import { inClassWords, modelColumns } from "./modelColumns.ts";
import { sizeWords, toldRobust } from "./robust.ts";

export const mm: EstimatorRule<"mm"> = {
  label: "MM",
  about: "Stands even when nearly half of the sales are wrong, odd items included; takes longer to work out.",
  estimate(design, groups, _setting, ground) {
    const found = search(design, groups, ground);
    if (!found.isReproduced) throw refusal("Five searches for the bulk of the sales ended at different fits");
    const opening =
      found.scale === 0
        ? "MM: more than half of the sales lie on the model exactly; only these count."
        : `MM: sales more than 4.685 usual distances (${sizeWords(design, found.scale)} each) from the bulk of the sales do not count.`;
    return toldRobust(design, groups, found, ground, opening);
  },
};

function search(design: Design, groups: readonly AttributeGroup[], { rule, pooled }: Ground): MmEstimate {
  if (pooled.length > 0) {
    throw new AppError({
      family: "fit",
      code: "robust-and-pooled",
      what: "MM and partially pooled levels do not go together.",
      where: "Price model",
      whatToDo: "Merge rare levels in place of pooling them, or use Huber.",
    });
  }
  const { values } = modelColumns(design, groups, rule);
  return inClassWords(design, groups, () => {
    try {
      return mmEstimate(values, design.response, { weights: rule.weights });
    } catch (cause) {
      if (!(cause instanceof NumericsError)) throw cause;
      if (cause.code === "tooFewRows") throw refusal(`${design.n} sales are too few to set half of them aside`, cause);
      if (cause.code !== "rankDeficient" || cause.columns.length > 0) throw cause;
      throw refusal("Some levels have so few sales that setting sales aside loses them altogether", cause);
    }
  });
}

function refusal(why: string, cause?: unknown): AppError {
  return new AppError({
    family: "fit",
    code: "not-settled",
    what: `${why}, so MM has no answer to stand by.`,
    where: "Price model",
    whatToDo: "Merge rare levels, leave attributes out, or use Huber.",
    cause,
  });
}
