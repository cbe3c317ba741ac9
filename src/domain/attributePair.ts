/** How two attributes move together among the evidence: what a small picture, its caption and its table need. */

/** One attribute of the pair on its own axis. */
export interface PairAxis {
  readonly key: string;
  readonly label: string;
  /** Null for a choice. */
  readonly unit: string | null;
  readonly decimals: number;
}

export type PairPicture =
  /** Two numbers: sales one by one, at most MOST_POINTS of them, evenly taken; x and y side by side. */
  | { readonly kind: "points"; readonly points: readonly (readonly [x: number, y: number])[] }
  /** Two numbers of many sales: counts of sales in a grid of `across` × `down` equal cells, row by row from the lowest y. */
  | {
      readonly kind: "cells";
      readonly across: number;
      readonly down: number;
      readonly counts: readonly number[];
      readonly x: Ends;
      readonly y: Ends;
    }
  /** A choice and a number: the mean of the number per level, with counts. */
  | { readonly kind: "levels"; readonly levels: readonly { level: string; count: number; mean: number }[] };

export interface Ends {
  readonly low: number;
  readonly high: number;
}

export const MOST_POINTS = 2000;

export interface AttributePair {
  readonly a: PairAxis;
  readonly b: PairAxis;
  readonly picture: PairPicture;
  readonly sales: number;
  /** Two numbers: as they stand; with the other attributes in use alike; b per step of a, those alike. Null where undefined. */
  readonly correlation: number | null;
  readonly partialCorrelation: number | null;
  readonly slope: number | null;
  /** "1,000 h" */
  readonly stepWords: string | null;
  /** The item on the two axes; null where it is not a number or not known. */
  readonly subject: readonly [x: number, y: number] | null;
  readonly sentence: string;
}
