/** Every attribute set in brief: what a page of paper has room for. */
import type { AttributeSets, SetSummary } from "../domain/attributeSets.ts";
import { type AttributeSetsInput, attributeSets } from "./attributeSets.ts";

/** Null where no attribute can be in or out. */
export function summariseSets(input: AttributeSetsInput): SetSummary | null {
  const found = attributeSets(input);
  return found.attributes.length === 0 ? null : summaryOf(found);
}

function summaryOf(found: AttributeSets): SetSummary {
  const { attributes, defensible, rule, step, price, switches, current, headline, sentences } = found;
  return {
    attributes: attributes.length,
    defensible: defensible.length,
    rule,
    step,
    price,
    averaged: withoutWeights(found.averaged),
    stacked: withoutWeights(found.stacked),
    switched: switches.map(({ label, priceSwitched }, g) => ({
      label,
      isIn: ((current >> g) & 1) === 1,
      price: priceSwitched,
    })),
    headline,
    sentences: sentences.filter((one) => one !== headline),
  };
}

function withoutWeights<T extends { readonly weights: unknown }>(price: T | null): Omit<T, "weights"> | null {
  if (price === null) return null;
  const { weights: _, ...rest } = price;
  return rest;
}
