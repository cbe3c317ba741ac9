/** The kinds of range for one sale. */
import type { RangeKind } from "../../domain/priceModel.ts";
import { cvPlus } from "./cvPlus.ts";
import { exact } from "./exact.ts";
import { jackknifePlus } from "./jackknifePlus.ts";
import type { RangeRule } from "./rangeRule.ts";
import { variance } from "./variance.ts";

export const RANGE_RULES: { readonly [Kind in RangeKind]: RangeRule } = {
  exact,
  "jackknife+": jackknifePlus,
  "cv+": cvPlus,
  variance,
};
