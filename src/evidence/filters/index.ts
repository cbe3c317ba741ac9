/** The filters in the order they are asked. */
import { afterEffectiveDate } from "./afterEffectiveDate.ts";
import { channel } from "./channel.ts";
import { tooEarly, tooLate } from "./dates.ts";
import type { EvidenceFilterRule } from "./filter.ts";
import { noLogarithm, valueMissing } from "./missingValue.ts";
import { notVerified } from "./notVerified.ts";
import { otherCurrency, otherPriceBasis } from "./otherMoney.ts";
import { setAside } from "./setAside.ts";

export const EVIDENCE_FILTERS: readonly EvidenceFilterRule[] = [
  setAside,
  otherCurrency,
  otherPriceBasis,
  channel,
  tooEarly,
  tooLate,
  afterEffectiveDate,
  notVerified,
  valueMissing,
  noLogarithm,
];
