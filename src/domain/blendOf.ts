/** A new blend of attributes: those that are expected to move the price the other way than the first enter turned round. */
import type { Attribute } from "./attribute.ts";
import { lowerStart } from "./format.ts";
import type { Blend } from "./priceModel.ts";

export function blendOf(attributes: readonly Attribute[], weighting: Blend["weighting"]): Blend {
  const first = attributes[0]?.expectedDirection ?? null;
  const members = attributes.map(({ key, expectedDirection }) => ({
    key,
    sign: expectedDirection !== null && first !== null && expectedDirection !== first ? (-1 as const) : (1 as const),
    weight: 1,
  }));
  const label = attributes.map((one, at) => (at === 0 ? one.label : lowerStart(one.label))).join(" and ");
  return { key: `blend_${attributes.map((one) => one.key).join("_")}`, label, members, weighting };
}
