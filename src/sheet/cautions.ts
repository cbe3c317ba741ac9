/**
 * The nine standing cautions: fixed text on every sheet, whatever was found. Only the third speaks of the class.
 * Source: product.md "Cautions that the tool itself must print"; valuation-practice.md A9.
 */
import { withArticle } from "./figures.ts";

export function standingCautions(itemWord: string): readonly string[] {
  return [
    "A model price is an aid to a valuer’s judgement, drawn from recorded sales. It is no inspection, and no appraisal until a person signs it.",
    "Nothing here speaks of safety: brakes, lifting gear, pressure parts, structure, emissions, recalls. A price is not fitness for use.",
    `Lifting gear, pressure vessels, vehicles and boats are safety-critical. A competent person must inspect such ${withArticle(itemWord)} before use, whatever it is worth.`,
    "Condition, authenticity, title, theft, finance, registration, export and sanction status are not seen by a model and were not checked by it.",
    "Local law, tax and the rules of the valuer’s own licensing body come first; some uses need a licence or a set form.",
    "Good only for the stated basis, date, market level, currency and tax basis; not after a market break.",
    `The range is for one sale of a like ${itemWord} at the stated coverage. It leaves out errors in what was typed in.`,
    `Not for contaminated, modified, accident-damaged, one-off or historic ${itemWord}s outside the evidence.`,
    `Coefficients describe how prices vary together with attributes in this evidence. They are not what would happen to a price if one changed the ${itemWord}.`,
  ];
}
