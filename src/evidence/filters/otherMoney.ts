/** Prices in another currency or on another basis than the class's: not comparable until converted. */
import { priceBasisWords } from "../../domain/sale.ts";
import { type EvidenceFilterRule, salesWords } from "./filter.ts";

export const otherCurrency: EvidenceFilterRule = {
  reason: "other-currency",
  out: ({ sales, assetClass }, at) =>
    sales.currencyCodes.at(at) === assetClass.currencyCode ? null : (sales.currencyCodes.at(at) ?? "unknown"),
  sentence: (count, detail, { assetClass }) =>
    `${salesWords(count)} in ${detail}, and the class is priced in ${assetClass.currencyCode}.`,
};

export const otherPriceBasis: EvidenceFilterRule = {
  reason: "other-price-basis",
  out: ({ sales, assetClass }, at) => {
    const own = sales.priceBases.at(at) ?? "";
    return isComparable(own, priceBasisWords(assetClass.priceBasis)) ? null : own;
  },
  sentence: (count, detail, { assetClass }) =>
    `${salesWords(count)} priced with ${detail}, and the class is priced with ${priceBasisWords(assetClass.priceBasis)}.`,
};

/** A channel without a premium compares with either premium basis; tax must be the same. */
function isComparable(own: string, wanted: string): boolean {
  if (own === wanted) return true;
  const [ownPremium, ownTax] = own.split(", ");
  const [wantedPremium, wantedTax] = wanted.split(", ");
  return ownTax === wantedTax && (ownPremium === "no premium" || wantedPremium === "no premium");
}
