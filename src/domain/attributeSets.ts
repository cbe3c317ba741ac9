/**
 * Every attribute set at once, as plain JSON data: what each would price the subject at, how well it prices sales not yet
 * seen, which sets are defensible, and how far price and coefficients move over those. Money in major units, unrounded.
 * A set is a number: bit g stands for attributes[g]; lists over sets are in the order of these numbers.
 */

import { listWords, lowerStart } from "./format.ts";

/** Which sets count: within a share of the least error out of sample, or within a distance of the least AICc. */
export type DefensibleRule =
  | { readonly kind: "error"; readonly share: number }
  | { readonly kind: "aicc"; readonly distance: number };

/** Common practice, no source: an error a tenth larger than the best one is no reason to rule a set out. */
export const USUAL_RULE: DefensibleRule = { kind: "error", share: 0.1 };

type PerSet = readonly (number | null)[];

export interface SetFigures {
  /** Null without a subject, and for sets whose columns depend on each other or cannot be carried by the sales. */
  readonly price: PerSet;
  /** Range for one sale, nine in ten; null as the price, and under a penalty. */
  readonly low: PerSet;
  readonly high: PerSet;
  /** Typical error on a sale not yet seen, as a fraction of price; `errorKind` says how it was found. */
  readonly error: PerSet;
  readonly r2: PerSet;
  /** Akaike 1974, corrected for few sales (Hurvich & Tsai 1989), and Schwarz 1978; null under a penalty. */
  readonly aicc: PerSet;
  readonly bic: PerSet;
  /** √(n·RSS)/(n − p) on the response's scale: generalised cross-validation, an approximation to what `error` finds. */
  readonly generalisedError: PerSet;
}

export interface Span {
  readonly low: number;
  readonly high: number;
}

/** One coefficient over the sets that have it, on the response's scale per unit of its column. */
export interface CoefficientSpan {
  readonly attribute: string;
  readonly label: string;
  readonly level: string | null;
  readonly stepWords: string | null;
  readonly all: Span;
  /** Null when no defensible set has it. */
  readonly defensible: Span | null;
  readonly now: number | null;
  /** The same per step at the average sale, in money. */
  readonly money: { readonly all: Span; readonly defensible: Span | null; readonly now: number | null };
  /** Sets, and defensible sets, in which it is above and below zero. */
  readonly signs: { readonly above: number; readonly below: number };
  readonly defensibleSigns: { readonly above: number; readonly below: number };
}

/** What putting one attribute in does to the price, over pairs of sets that differ by it alone. */
export interface SetSwitch {
  readonly key: string;
  readonly label: string;
  readonly pairs: number;
  readonly mean: number | null;
  readonly span: Span | null;
  /** Over pairs of which both are defensible; null without one. */
  readonly meanDefensible: number | null;
  /** In every defensible set, in none, or in some. */
  readonly inDefensible: "always" | "never" | "sometimes";
  /** Price of the current set with this one switched. */
  readonly priceSwitched: number | null;
}

/** Prices averaged by Akaike weights; doubt about the set is in the range (Burnham & Anderson 2002, section 4.3). */
export interface AveragedPrice {
  readonly price: number;
  readonly low: number;
  readonly high: number;
  /** How much wider the range is for the doubt about the set. */
  readonly addedWidth: number;
  /** Weights over 0.01, largest first. */
  readonly weights: readonly { readonly set: number; readonly weight: number }[];
}

/**
 * Prices averaged by stacking: weights, none negative, that make the squared error of the mixture least with each sale priced
 * without itself (Yao, Vehtari, Simpson & Gelman 2018, section 2; of means: Breiman 1996).
 */
export interface StackedPrice extends AveragedPrice {
  /** How many of the best defensible sets were weighed. */
  readonly over: number;
  /** Typical error of the mixture, and of the best set alone, each sale priced without itself. */
  readonly error: number;
  readonly errorOfBest: number;
}

export interface AttributeSets {
  readonly attributes: readonly { readonly key: string; readonly label: string }[];
  /** In every set: the market movement, and what is beyond the fifteen that can be in or out. */
  readonly alwaysIn: readonly { readonly key: string; readonly label: string }[];
  /** Those of `alwaysIn` that the fit can least do without, where more than fifteen could be in or out. */
  readonly pinned: readonly { readonly key: string; readonly label: string }[];
  /** Held in every set, or out of every set, by wish; absent: nothing is. */
  readonly heldIn?: readonly { readonly key: string; readonly label: string }[];
  readonly heldOut?: readonly { readonly key: string; readonly label: string }[];
  /** In no set, because the subject's value is not known. */
  readonly notKnown: readonly { readonly key: string; readonly label: string }[];
  readonly sales: number;
  readonly figures: SetFigures;
  /** Each sale priced without itself, exactly; or each tenth of the sales priced by the other nine, exactly. */
  readonly errorKind: "leave-one-out" | "ten-folds";
  /**
   * After ten folds: the exact error with each sale priced without itself, of the current set and the best defensible ones, as
   * many as take little time. Empty where `figures.error` is that already.
   */
  readonly leaveOneOut: readonly { readonly set: number; readonly error: number }[];
  readonly rule: DefensibleRule;
  /** Step that prices are rounded to: that of the averaged price, else of the best set; the same whichever set is in use. */
  readonly step: number;
  /** Sets that count, the least error (or AICc) first. */
  readonly defensible: readonly number[];
  readonly current: number;
  readonly price: Span | null;
  readonly coefficients: readonly CoefficientSpan[];
  readonly switches: readonly SetSwitch[];
  /** Key of the attribute whose switching moves the current price most. */
  readonly movesMost: string | null;
  readonly averaged: AveragedPrice | null;
  readonly stacked: StackedPrice | null;
  /** The span of the price in words, or what is in its place. */
  readonly headline: string;
  /** Which coefficients change sign, over all sets and over the defensible ones. */
  readonly turns: string;
  /** How much of the averaged price's range is doubt about the set; null without an average. */
  readonly doubt: string | null;
  /** Everything there is to say, these three among it. */
  readonly sentences: readonly string[];
}

/** What a sheet says of every attribute set: prices in words, and what switching each attribute alone would do. */
export interface SetSummary {
  readonly attributes: number;
  readonly defensible: number;
  readonly rule: DefensibleRule;
  readonly step: number;
  readonly price: Span | null;
  readonly averaged: Omit<AveragedPrice, "weights"> | null;
  readonly stacked: Omit<StackedPrice, "weights"> | null;
  /** Money that the price would read with this attribute alone put in or left out; null where no such set can be fitted. */
  readonly switched: readonly { readonly label: string; readonly isIn: boolean; readonly price: number | null }[];
  readonly headline: string;
  /** Everything else there is to say. */
  readonly sentences: readonly string[];
}

/** One attribute's shares; both kinds add up over attributes. */
export interface AttributeShare {
  readonly key: string;
  readonly label: string;
  /** Of R²: averaged over all orders, alone, and after all others. */
  readonly r2: number;
  readonly r2Alone: number;
  readonly r2Last: number;
  /** Standard error of `r2`, by jackknife over twentieths of the sales; null with few sales or more than twelve attributes. */
  readonly r2Error: number | null;
  /** Of the subject's distance from the average, on the response's scale: averaged over orders, and b(x₀ − x̄). */
  readonly distance: number | null;
  readonly additive: number | null;
}

export interface AttributeShares {
  readonly shares: readonly AttributeShare[];
  /** What is in every set has its part first: R² and distance of the set of these alone. */
  readonly alwaysIn: { readonly r2: number; readonly distance: number | null };
  readonly r2: number;
  readonly distance: number | null;
  readonly sentences: readonly string[];
}

/** One set with all that is said of it by name. */
export interface ListedSet {
  readonly set: number;
  readonly price: number | null;
  readonly low: number | null;
  readonly high: number | null;
  readonly error: number | null;
  /** Akaike weight, and stacking weight; null where there is none. */
  readonly weight: number | null;
  readonly stackingWeight: number | null;
}

/** Every attribute set as a screen or command needs it: figures of all sets cut to the digits a picture can show. */
export interface EverySet extends Omit<AttributeSets, "figures" | "leaveOneOut"> {
  /** Per set: eleven digits of the price, five of the error; null as in `SetFigures`. */
  readonly marks: { readonly price: PerSet; readonly error: PerSet };
  /** The current set, and those that weigh most or err least. */
  readonly listed: readonly ListedSet[];
  /** Null where shares are not determined; `sharesRefused` says why. */
  readonly shares: AttributeShares | null;
  readonly sharesRefused: string | null;
  /** What holds for this picture only: weights and penalties kept from the fit in use. */
  readonly cautions: readonly string[];
  readonly currencyCode: string;
  readonly response: "price" | "lnPrice";
}

/** Whether attribute g is in the set. */
export function hasAttribute(set: number, g: number): boolean {
  return Math.floor(set / 2 ** g) % 2 === 1;
}

/**
 * What a model leaves out so that its attribute set is this one. An attribute that others already say exactly goes as soon as
 * any goes, else it would come back in place of one of them; what is not known for the item stays as it was.
 */
export function leftOutFor(
  {
    attributes,
    alwaysIn,
    notKnown,
    heldOut = [],
  }: Pick<AttributeSets, "attributes" | "alwaysIn" | "notKnown" | "heldOut">,
  set: number,
  model: { readonly attributes: readonly { readonly key: string }[]; readonly leftOut: readonly string[] },
): string[] {
  const out = attributes.flatMap(({ key }, g) => (hasAttribute(set, g) ? [] : [key]));
  const held = heldOut.map(({ key }) => key);
  const looked = new Set([...attributes, ...alwaysIn, ...notKnown, ...heldOut].map(({ key }) => key));
  const repeating = model.attributes.map(({ key }) => key).filter((key) => !looked.has(key));
  const stay = model.leftOut.filter((key) => notKnown.some((one) => one.key === key) || repeating.includes(key));
  const fewer = out.length + held.length > 0;
  return [...new Set([...stay, ...held, ...out, ...(fewer ? repeating : [])])];
}

const NAMED = 3;

/** "all ten attributes", "without age and hours", "only make and hours", "no attribute". */
export function setName({ attributes }: Pick<AttributeSets, "attributes">, set: number): string {
  const inside = attributes.filter((_, g) => hasAttribute(set, g)).map(({ label }) => lowerStart(label));
  const out = attributes.filter((_, g) => !hasAttribute(set, g)).map(({ label }) => lowerStart(label));
  if (out.length === 0) return `all ${attributes.length} attributes`;
  if (inside.length === 0) return "no attribute";
  return inside.length < out.length ? `only ${shortened(inside)}` : `without ${shortened(out)}`;
}

function shortened(names: readonly string[]): string {
  if (names.length <= NAMED + 1) return listWords(names);
  return listWords([...names.slice(0, NAMED), `${names.length - NAMED} more`]);
}
