/**
 * Attributes that move together, what it costs, and the ways on, as plain data for screen and command line. Money in major units
 * of the class's currency, unrounded.
 */
import type { PriceModel } from "./priceModel.ts";

export interface MovingGroup {
  readonly members: readonly {
    readonly key: string;
    readonly label: string;
    /** √ of the generalised inflation: how many times as wide its range is as it would be alone. */
    readonly times: number;
    /** Largest share of a coefficient's variance tied to the index; null where the group was found by inflation. */
    readonly tied: number | null;
  }[];
  /** Null where no condition index tells of the group. */
  readonly conditionIndex: number | null;
  readonly sentence: string;
}

export interface MovingTogether {
  /** Strongest first. */
  readonly groups: readonly MovingGroup[];
  readonly sentence: string;
  /** Whether the price suffers; null without an item. */
  readonly priceSentence: string | null;
}

/** The strongest group met in one way, worked out before it is applied. */
export interface WayOn {
  readonly kind: "keep" | "leaveOut" | "blend";
  readonly label: string;
  readonly model: PriceModel;
  readonly price: { readonly amount: number; readonly low: number; readonly high: number } | null;
  readonly looTypicalError: number | null;
  /** What the members that stay, or the blend, then read: money per step at the average sale, with a range of 19 in 20. */
  readonly reads: readonly {
    readonly key: string;
    readonly label: string;
    readonly stepWords: string;
    readonly money: number | null;
    readonly low95: number | null;
    readonly high95: number | null;
  }[];
  /** Why this way cannot be gone. */
  readonly refused: string | null;
}

/** An exact dependency resolved in each way there is. */
export interface ResolvedWays {
  readonly equation: string;
  readonly choices: readonly { readonly key: string; readonly label: string; readonly price: number | null }[];
  /** Largest difference of the prices as a share of the price; null where fewer than two are priced. */
  readonly apart: number | null;
  readonly sentence: string;
}

export interface MovingReport extends MovingTogether {
  readonly currencyCode: string;
  readonly level: number;
  /** Of the strongest group; empty where nothing moves together. */
  readonly ways: readonly WayOn[];
  readonly dependencies: readonly ResolvedWays[];
}
