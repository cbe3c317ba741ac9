/**
 * Two price models side by side: two attribute sets on the same sales, or two editions. Plain JSON data; money in major units of
 * the class's currency, unrounded. Differences read second less first.
 */
import type { Day } from "./day.ts";

export interface ComparedSide {
  /** "Edition 12", "the model on the table". */
  readonly name: string;
  readonly editionNumber: number | null;
  readonly saleCount: number;
  /** Columns including the intercept. */
  readonly p: number;
  readonly r2: number | null;
  /** Typical error on a sale not yet seen, as a fraction of price. */
  readonly looTypicalError: number | null;
  readonly included: readonly { key: string; label: string }[];
  readonly leftOut: readonly { key: string; label: string }[];
  readonly price: {
    readonly amount: number;
    readonly low: number;
    readonly high: number;
    readonly level: number;
  } | null;
}

/** A coefficient in money per step at the average sale of its side; null where the side has none. */
export interface ComparedCoefficient {
  readonly attribute: string;
  readonly label: string;
  readonly level: string | null;
  readonly stepWords: string;
  readonly first: number | null;
  readonly second: number | null;
  readonly firstRange95: { readonly low: number; readonly high: number } | null;
  readonly secondRange95: { readonly low: number; readonly high: number } | null;
  /** second − first, where both have it. */
  readonly difference: number | null;
  /** The difference split over the attributes that only one side includes, adding up; empty when the sales differ. */
  readonly parts: readonly { readonly from: string; readonly label: string; readonly amount: number }[];
}

/** What moved the price from the first side's to the second's; amounts add up to the whole move. */
export interface PriceCause {
  readonly kind: "attribute" | "attributes" | "sales" | "settings";
  readonly label: string;
  readonly amount: number;
}

/** A sale that only one side rests on, and what it does to that side's price. */
export interface ComparedSale {
  readonly side: 1 | 2;
  readonly sale: number;
  readonly reference: string | null;
  readonly title: string;
  readonly soldOn: Day;
  readonly price: number;
  /** Price with it less price without it; null where it is the only one of its kind, or nothing is priced. */
  readonly moves: number | null;
}

export interface Comparison {
  readonly className: string;
  readonly currencyCode: string;
  readonly subjectTitle: string | null;
  readonly sides: readonly [ComparedSide, ComparedSide];
  readonly coefficients: readonly ComparedCoefficient[];
  readonly causes: readonly PriceCause[];
  readonly sales: {
    readonly both: number;
    readonly onlyFirst: number;
    readonly onlySecond: number;
    /** Those that move the price most, first; at most twenty. */
    readonly listed: readonly ComparedSale[];
  };
  /** What cannot be compared and why, each a sentence. */
  readonly cautions: readonly string[];
  /** The difference in one or two sentences. */
  readonly headline: string;
}
