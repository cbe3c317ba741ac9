/**
 * The one result object: everything that screen, command line and sheet show about a model and a price.
 * Plain JSON data (no typed arrays), so that it crosses shells and is embedded in the sheet as it is.
 * Money is in major units of `currencyCode`, unrounded; rounding happens only in domain/format.ts.
 * "Reads" in ln models: coefficients are in ln; money per step is read at the average sale, P̄(e^(b·step) − 1).
 */
import type { AttributeKind } from "./attribute.ts";
import type { SetSummary } from "./attributeSets.ts";
import type { Day } from "./day.ts";
import type { AttributeForm, PriceModel, RangeKind, ResponseForm } from "./priceModel.ts";
import type { Subject } from "./subject.ts";

export interface Range {
  /** 0.5, 0.8, 0.9, 0.95 */
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/** Why a sale is not evidence. */
export type OutReason =
  | "set-aside"
  | "channel"
  | "too-early"
  | "too-late"
  | "after-effective-date"
  | "not-verified"
  | "other-currency"
  | "other-price-basis"
  | "value-missing"
  | "no-logarithm";

export interface EvidenceAccount {
  /** All sales in the register (or rows read, for a file). */
  readonly read: number;
  readonly used: number;
  /** read = used + Σ count. `detail`: the attribute or the person's reason. */
  readonly out: readonly { reason: OutReason; detail: string | null; sentence: string; saleIds: readonly number[] }[];
  readonly firstSoldOn: Day | null;
  readonly lastSoldOn: Day | null;
  readonly channels: readonly { channel: string; count: number }[];
  readonly verifiedCount: number;
}

export interface Coefficient {
  /** Attribute key, "market", or "intercept". */
  readonly attribute: string;
  readonly label: string;
  readonly level: string | null;
  /** "1,000 h", "against Brannock", "12 months": the step or comparison that `moneyPerStep` speaks of. */
  readonly stepWords: string;
  readonly estimate: number;
  readonly standardError: number | null;
  readonly hc3StandardError: number | null;
  readonly low95: number | null;
  readonly high95: number | null;
  /** At the average sale; null for the intercept. */
  readonly moneyPerStep: number | null;
  readonly moneyLow95: number | null;
  readonly moneyHigh95: number | null;
}

/** An exact dependency among the columns of the reference set. */
export interface DependencyNotice {
  /** In the user's labels: "Power (hp) = 1.341 × Power (kW)". */
  readonly equation: string;
  readonly sentence: string;
  /** Attribute keys that take part; leaving out any of `choices` resolves it. */
  readonly attributes: readonly string[];
  readonly choices: readonly { key: string; label: string }[];
  /** Which one is out now, and who says so. */
  readonly resolvedBy: { key: string; label: string; chosenBy: "person" | "program" } | null;
}

export interface ModelReport {
  readonly model: PriceModel;
  readonly response: ResponseForm;
  readonly attributes: readonly string[];
  /** Left out by the person or because of a dependency or because the subject's value is not known. */
  readonly leftOut: readonly {
    key: string;
    label: string;
    why: "person" | "exact" | "not-known";
    sentence: string;
  }[];
  readonly n: number;
  /** Columns including the intercept. */
  readonly p: number;
  readonly rank: number;
  readonly residualDf: number;
  readonly s: number | null;
  readonly r2: number | null;
  readonly adjustedR2: number | null;
  readonly looR2: number | null;
  /** Typical error on a sale not yet seen, as a fraction of price: leave-one-out. */
  readonly looTypicalError: number | null;
  readonly digitsToTrust: number;
  readonly condition: number;
  readonly path: "moments" | "careful";
  readonly fitted?: FitAccount;
  readonly averagePrice: number;
  readonly smearing: number | null;
  readonly coefficients: readonly Coefficient[];
  readonly dependencies: readonly DependencyNotice[];
  /** How the reference-set attributes look in the evidence: for hairlines and forms. */
  readonly attributeEvidence: readonly AttributeEvidence[];
  /** Pairs that move together: partial correlation, the others alike. Strongest first. */
  readonly movingTogether: readonly { a: string; b: string; partialCorrelation: number; correlation: number }[];
  /** √VIF per included attribute: how many times wider its coefficient's range is for standing beside the others. */
  readonly widening: readonly { key: string; label: string; times: number }[];
}

/** How the fit was come by, in words for screen and sheet. Absent on what was worked out before there was a choice. */
export interface FitAccount {
  readonly estimator: NonNullable<PriceModel["estimator"]>["kind"];
  /** What the estimator did to these sales. */
  readonly sentence: string;
  /** What the errors of coefficients and averages suppose. */
  readonly errorsSentence: string;
  readonly errorsCaution: string | null;
  /** Degrees of freedom of the ranges of coefficients. */
  readonly errorsDf: number | null;
  /** Which range for one sale can honestly be given. */
  readonly whichRange: string;
  /** Ridge: the penalty in sales and how it was come by; null otherwise. */
  readonly ridge: {
    readonly penalty: number;
    readonly isChosen: boolean;
    readonly curve: readonly { penalty: number; looError: number }[];
  } | null;
  /** Choices whose levels are drawn together, in response units from the mean over levels. */
  readonly pooled: readonly {
    readonly key: string;
    readonly label: string;
    readonly levels: readonly { level: string; sales: number; before: number | null; after: number }[];
  }[];
  /** Robust estimates: sales that count for less than half, least first, at most twenty. */
  readonly countedLess: readonly { readonly sale: number; readonly weight: number }[];
  /** Levels merged, weights by recency and the like, each a sentence. */
  readonly notes: readonly string[];
}

export interface AttributeEvidence {
  readonly key: string;
  readonly label: string;
  readonly kind: AttributeKind | "channel" | "market";
  readonly form: AttributeForm | "line";
  readonly unit: string | null;
  readonly decimals: number;
  readonly included: boolean;
  /** Numbers: lowest, quarter, median, three quarters, highest, mean. */
  readonly spread: { low: number; q1: number; median: number; q3: number; high: number; mean: number } | null;
  /** Choices and yes/no: counts by level. */
  readonly levels: readonly { level: string; count: number }[];
  readonly reference: string | null;
}

export interface PriceEstimate {
  /** Which centre `amount` is: the median after a ln response, the mean after a plain one. */
  readonly centre: "median" | "mean";
  readonly amount: number;
  /** Duan (1983) smearing mean; equals amount for a plain response. */
  readonly meanAmount: number;
  /** Fitted value and its standard errors on the response's scale. */
  readonly fitted: number;
  readonly standardErrorOfAverage: number | null;
  readonly leverage: number;
  readonly rangeForOneSale: readonly Range[];
  readonly rangeForAverage: readonly Range[];
  /** Which kind the ranges for one sale are of, what it takes for granted and promises. */
  readonly range?: RangeAccount;
  /** 1/Σw²: how many equal sales the price rests on. */
  readonly effectiveSales: number;
  /** Where the market movement is held because the effective date lies after the last sale. */
  readonly marketHeldAt: Day | null;
}

/** A price from moments alone, shown only until the refined one comes. */
export interface GlancedPrice {
  readonly price: Pick<PriceEstimate, "amount" | "rangeForOneSale">;
  /** Raw units of the response; the standard error under an even spread. */
  readonly coefficients: readonly {
    readonly attribute: string;
    readonly level: string | null;
    readonly value: number;
    readonly standardError: number;
  }[];
  readonly isFinal: false;
}

export interface RangeAccount {
  readonly kind: RangeKind;
  readonly sentence: string;
  readonly guarantee: string | null;
  /** The kind that the model asked for could not be given; why. */
  readonly insteadOf: string | null;
  /** Another kind to judge it by, and what to make of a difference in width; null where there is none, or too many sales to wait for it. */
  readonly beside: { readonly kind: RangeKind; readonly ranges: readonly Range[] } | null;
  readonly disagreement: string | null;
}

export interface NotKnownEffect {
  readonly key: string;
  readonly label: string;
  /** Width of the 90 % range for one sale now, and if the value were known (at its typical value), in money. */
  readonly widthNow: number;
  readonly widthIfKnown: number;
  /** What the price would read for stated values (levels, or low/typical/high of the evidence). */
  readonly wouldRead: readonly { value: string; amount: number }[];
  readonly sentence: string;
}

/** The range split by what it comes from, and what assuming values for the unknown attributes would do. */
export interface NotKnowing {
  readonly level: number;
  /** Width of the range for one sale now, and with the unknown attributes at typical values, in money. */
  readonly width: number;
  readonly widthIfKnown: number;
  /** Shares of the squared half-range; they add up to 1. */
  readonly shares: { readonly noise: number; readonly notKnowing: number; readonly estimation: number };
  readonly assumed: readonly {
    readonly code: "low" | "typical" | "high";
    readonly label: string;
    readonly amount: number;
    readonly low: number;
    readonly high: number;
  }[];
  readonly sentence: string;
}

export interface BuiltUpStep {
  readonly key: string;
  readonly label: string;
  readonly averageWords: string;
  readonly subjectWords: string;
  /** Contribution on the response's scale: Σ b(x₀ − x̄). */
  readonly contribution: number;
  /** e^contribution for ln, null otherwise. */
  readonly factor: number | null;
  /** In money along the path, in the stated order; start + Σ step = price exactly. */
  readonly step: number;
  readonly standsAt: number;
}

export interface BuiltUp {
  readonly start: number;
  readonly steps: readonly BuiltUpStep[];
  readonly end: number;
}

export interface LedgerRow {
  readonly attribute: string;
  readonly label: string;
  readonly level: string | null;
  readonly stepWords: string;
  /** On the response's scale per unit: coefficient = ownPart + Σ carriedParts, exactly. */
  readonly coefficient: number;
  readonly ownPart: number;
  readonly carriedParts: readonly { from: string; fromLabel: string; amount: number }[];
  /** The same in money per step at the average sale; shares of the exact one-step change, adding up. */
  readonly money: { coefficient: number; own: number; carried: readonly { from: string; amount: number }[] };
  readonly moneyRange95: { low: number; high: number } | null;
  /** Standard errors of the parts, on the response's scale and in money per step; null where no spread is known. */
  readonly errors?: {
    readonly own: number;
    readonly carried: readonly { from: string; amount: number }[];
    readonly moneyOwn: number;
    readonly moneyCarried: readonly { from: string; amount: number }[];
    /** How many standard errors half a 95 % range is: t at the degrees of freedom that the errors have. */
    readonly t95: number;
  } | null;
  readonly signTurned: boolean;
  readonly sentence: string;
}

export interface Ledger {
  /** Keys of the reference set that could be fitted (after exact dependencies). */
  readonly referenceSet: readonly string[];
  readonly leftOut: readonly { key: string; label: string }[];
  readonly rows: readonly LedgerRow[];
  /** Coefficients of the left-out attributes beside the full reference set. */
  readonly leftOutOwn: readonly {
    key: string;
    label: string;
    level: string | null;
    estimate: number;
    money: number;
    stepWords: string;
  }[];
  readonly headline: string;
  /** max |coefficient − own − Σ carried| / |coefficient|, found. */
  readonly identityError: number;
}

export interface Pull {
  readonly sale: number;
  readonly reference: string | null;
  readonly title: string;
  readonly soldOn: Day;
  readonly price: number;
  readonly channel: string;
  readonly verified: boolean;
  /** Exact weight: fitted = Σ weight·response; Σ weight = 1 with an intercept. */
  readonly weight: number;
  readonly priceWithout: number | null;
  /** Differences sale − subject for numeric attributes in the model, by key. */
  readonly differences: Readonly<Record<string, number>>;
}

export interface PullReport {
  readonly top: readonly Pull[];
  /** Sum of the weights not listed, their number. */
  readonly restWeight: number;
  readonly restCount: number;
  readonly negativeCount: number;
  readonly sentence: string;
  /** Sources that weigh most first; empty where there is one only. */
  readonly bySource?: readonly SourcePull[];
}

export interface SourcePull {
  readonly source: string;
  /** Its sales among the evidence, and their weight together. */
  readonly count: number;
  readonly weight: number;
  /** Null where the other sales cannot carry the coefficients; not there where fitting again would take long. */
  readonly priceWithout?: number | null;
}

/** A sale much like the subject, adjusted to it by the model. */
export interface NearSale {
  readonly sale: number;
  readonly reference: string | null;
  readonly title: string;
  readonly soldOn: Day;
  readonly price: number;
  readonly channel: string;
  readonly verified: boolean;
  /** Weight on the subject's price. */
  readonly weight: number;
  /** Adjustments added up without their signs: a share of price after ln, money otherwise. */
  readonly gross: number;
  /** Its price with every attribute of the model adjusted to the subject's. */
  readonly adjusted: number;
  /** Adjustment per attribute: a share of price after ln, money otherwise; those that are zero are not listed. */
  readonly adjustments: readonly { readonly key: string; readonly label: string; readonly amount: number }[];
}

export interface NearReport {
  /** Least gross adjustment first. */
  readonly sales: readonly NearSale[];
  readonly sentence: string;
}

export type ReachVerdict = "inside" | "edge" | "beyond";

export interface Reach {
  readonly verdict: ReachVerdict;
  readonly sentence: string;
  readonly attributes: readonly {
    key: string;
    label: string;
    verdict: ReachVerdict;
    value: number | string | null;
    low: number | null;
    high: number | null;
    sentence: string;
  }[];
  /** Joint reach: leverage of the subject against the largest of the evidence (Montgomery, Peck & Vining). */
  readonly joint: {
    leverage: number;
    highestInEvidence: number;
    further: number;
    verdict: ReachVerdict;
    sentence: string;
  };
}

export interface PricePart {
  readonly subject: Subject;
  readonly price: PriceEstimate;
  readonly builtUp: BuiltUp;
  readonly pull: PullReport;
  readonly near?: NearReport;
  readonly reach: Reach;
  readonly notKnown: readonly NotKnownEffect[];
  readonly notKnowing?: NotKnowing | null;
  /** Worked out for a sheet; null where there is no attribute to be in or out. */
  readonly sets?: SetSummary | null;
}

export interface Caveat {
  readonly code: string;
  readonly headline: string;
  readonly text: string;
  /** What the price would read instead: "€37,190 if ex hire fleet". */
  readonly wouldRead: readonly string[];
  /** Size of effect in money, for choosing the three that matter. */
  readonly size: number;
}

export interface Appraisal {
  readonly assetClass: { name: string; itemWord: string; currencyCode: string; invented: boolean };
  readonly evidence: EvidenceAccount;
  readonly report: ModelReport;
  readonly ledger: Ledger;
  /** Null while there is no subject. */
  readonly priced: PricePart | null;
  readonly caveats: readonly Caveat[];
}
