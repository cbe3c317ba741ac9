/** Several items priced together, as plain data: each on its own, and their average and sum with the errors they share. */
import type { Range } from "./appraisal.ts";
import type { Subject } from "./subject.ts";

export interface PricedLot {
  readonly currencyCode: string;
  readonly items: readonly {
    readonly subject: Subject;
    readonly amount: number;
    readonly rangeForOneSale: readonly Range[];
  }[];
  /** Null where weights or a penalty leave no exact range; `jointRefused` says so. */
  readonly joint: {
    readonly average: number;
    readonly rangesOfAverage: readonly Range[];
    readonly sum: number;
    readonly rangesOfSum: readonly Range[];
    readonly sentence: string;
  } | null;
  readonly jointRefused: string | null;
  /** Attributes that at least one item is not known in: all items are priced without them. */
  readonly notKnown: readonly { readonly key: string; readonly label: string }[];
  readonly notKnownSentence: string | null;
}
