/**
 * A price model as plain data: response form, reference set with forms, what is left out of it, market movement and the
 * evidence filter. Fitting it is hedonic's work.
 */
import type { Attribute } from "./attribute.ts";
import type { Day } from "./day.ts";
import type { Channel } from "./sale.ts";

export type ResponseForm = "price" | "lnPrice";
export type AttributeForm = "line" | "ln" | "spline" | "choice" | "yesNo";
/** How a choice's coefficients read: against one level, or against the mean over its levels. */
export type ChoiceReading = "reference" | "sumToZero";
/** What becomes of levels with fewer sales than RARE_LEVEL: kept, merged into one, or partially pooled. */
export type RareLevels = "keep" | "merge" | "pool";
export type MarketForm = "none" | "line" | "quarters" | "spline";
/** How coefficients are found. Settings with a meaning of their own are told with each. */
export type Estimator =
  | { readonly kind: "leastSquares" }
  | { readonly kind: "huber" }
  | { readonly kind: "mm" }
  /** `penalty` null: chosen by leave-one-out error. */
  | { readonly kind: "ridge"; readonly penalty: number | null };
/** What the coefficients' errors suppose: an even spread; none (HC); sales of one source or attribute value alike (CR1). */
export type ErrorRule =
  | { readonly kind: "even" }
  | { readonly kind: "HC0" | "HC1" | "HC2" | "HC3" }
  /** `by`: "source" or the key of a choice. */
  | { readonly kind: "cluster"; readonly by: string };
/** Which range for one sale stands as the price's own; jackknife+ and CV+ ask for nothing but exchangeable sales. */
export type RangeKind = "exact" | "jackknife+" | "cv+" | "variance";

export interface ModelAttribute {
  /** Attribute key, or CHANNEL_KEY. */
  readonly key: string;
  readonly form: AttributeForm;
  /** Choice: the level the others are read against; null = the most frequent one. */
  readonly reference: string | null;
  /** Spline: 3 to 7 knots; 4 unless said. */
  readonly knots?: number;
  /** Choice: "reference" unless said. */
  readonly reading?: ChoiceReading;
  /** Choice: "keep" unless said. */
  readonly rare?: RareLevels;
}

/** Attributes that enter the model as one: a standardised mean, the first principal component, or own weights. */
export interface Blend {
  /** Begins with "blend_". */
  readonly key: string;
  readonly label: string;
  readonly members: readonly { readonly key: string; readonly sign: 1 | -1; readonly weight: number }[];
  readonly weighting: "equal" | "firstComponent" | "own";
}

export interface EvidenceFilter {
  /** Channels that count; null = all. */
  readonly channels: readonly Channel[] | null;
  readonly soldFrom: Day | null;
  readonly soldTo: Day | null;
  readonly verifiedOnly: boolean;
}

export interface PriceModel {
  readonly response: ResponseForm;
  /** The reference set, in the order it is shown. Evidence = sales that have a value for every one of these. */
  readonly attributes: readonly ModelAttribute[];
  /** Keys of the reference set that are not in the model now. */
  readonly leftOut: readonly string[];
  readonly market: MarketForm;
  readonly filter: EvidenceFilter;
  /** Pairs of attribute keys whose centred product enters too; key of the group: "a*b". */
  readonly interactions?: readonly { readonly a: string; readonly b: string }[];
  /** A blend enters in place of its members. */
  readonly blends?: readonly Blend[];
  /** Weight of a sale halves with each so many months before the effective date (or the last sale). */
  readonly halfLifeMonths?: number | null;
  /** leastSquares unless said. */
  readonly estimator?: Estimator;
  /** even unless said. */
  readonly errors?: ErrorRule;
  /** exact unless said. */
  readonly range?: RangeKind;
}

export const EVERYTHING: EvidenceFilter = { channels: null, soldFrom: null, soldTo: null, verifiedOnly: false };

/** The form an attribute takes when nobody has chosen one. */
export function usualForm(attribute: Pick<Attribute, "kind">): AttributeForm {
  if (attribute.kind === "choice") return "choice";
  return attribute.kind === "yesNo" ? "yesNo" : "line";
}

/** One numbered, saved, immutable fit of a price model on fixed evidence. */
export interface Edition {
  readonly id: number;
  readonly assetClassId: number;
  /** 1, 2, 3 … within the class. */
  readonly number: number;
  readonly savedAtUtc: string;
  readonly savedBy: string;
  readonly model: PriceModel;
  /** SHA-256 over the evidence rows in canonical form (domain/fingerprint.ts). */
  readonly evidenceFingerprint: string;
  readonly saleCount: number;
  readonly summary: EditionSummary;
}

export interface EditionSummary {
  readonly n: number;
  readonly p: number;
  readonly s: number | null;
  readonly r2: number | null;
  readonly looR2: number | null;
  readonly coefficients: readonly { attribute: string; level: string | null; estimate: number }[];
}
