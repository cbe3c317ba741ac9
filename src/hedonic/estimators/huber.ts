/** Huber's M estimate (numerics/huber.ts): sales out of line count less, none is thrown out. */
import { huberEstimate } from "../../numerics/huber.ts";
import type { EstimatorRule } from "./estimator.ts";
import { inClassWords, modelColumns } from "./modelColumns.ts";
import { sizeWords, toldRobust } from "./robust.ts";

export const huber: EstimatorRule<"huber"> = {
  label: "Huber",
  about:
    "Counts a sale less the further its price lies from the model; guards against odd prices, not against odd items.",
  estimate(design, groups, _setting, ground) {
    const { values, penalty } = modelColumns(design, groups, ground.rule);
    const found = inClassWords(design, groups, () =>
      huberEstimate(values, design.response, { weights: ground.rule.weights, penalty }),
    );
    const opening =
      found.scale === 0
        ? "Huber: more than half of the residuals are zero, so there is no usual distance to judge the others by and least squares stands."
        : `Huber: a sale counts less once it lies more than 1.345 usual distances (${sizeWords(design, found.scale)} each) from the model.`;
    return toldRobust(design, groups, found, ground, opening);
  },
};
