/**
 * The sheet as plain data: every heading, sentence, cell and picture, already in words and figures. Drawing it adds nothing but
 * places. Pictures keep money unrounded for their lengths; whatever is printed beside them is a text made by domain/format.ts.
 */

/** A piece of a sentence. */
export interface Piece {
  readonly text: string;
  readonly bold?: boolean;
  readonly italic?: boolean;
}
export type Words = string | readonly Piece[];

export interface Sheet {
  readonly lang: string;
  /** Title of the document: "Appraisal sheet 2025-0317: Tessaly TH-740". */
  readonly documentTitle: string;
  readonly practice: string;
  readonly practiceLine: string;
  readonly numberLine: string;
  readonly stateLine: string;
  readonly isDraft: boolean;
  /** "Invented example", or null. */
  readonly exampleLabel: string | null;
  readonly footer: string;
  readonly runningHead: string;
  readonly first: FirstPage;
  readonly sections: readonly Section[];
}

export interface FirstPage {
  readonly title: string;
  readonly identification: string;
  readonly basisLine: string;
  readonly price: string;
  readonly priceInWords: string;
  readonly terms: Words;
  /** What the price rests on, in a few lines beside it. */
  readonly restsOn: readonly Fact[];
  readonly gauge: Gauge;
  readonly facts: readonly (readonly Fact[])[];
  readonly caveatHeading: string;
  readonly caveats: readonly CaveatRow[];
  readonly signatureLines: readonly string[];
  readonly certificationNote: string;
  readonly certificationTopics: readonly string[];
}

export interface Fact {
  readonly label: string;
  readonly words: string;
  /** What stands on page 1 where the whole has no room. */
  readonly short: string;
}

export interface CaveatRow {
  readonly number: number;
  readonly headline: string;
  readonly text: string;
  readonly wouldRead: readonly string[];
}

export interface GaugeRange {
  readonly label: string;
  readonly words: string;
  readonly low: number;
  readonly high: number;
  readonly lowText: string;
  readonly highText: string;
}

export interface Gauge {
  readonly currencyCode: string;
  readonly price: number;
  readonly priceText: string;
  /** Widest first. */
  readonly oneSale: readonly GaugeRange[];
  /** Narrowest first. */
  readonly average: readonly GaugeRange[];
  readonly oneSaleHeading: string;
  readonly averageHeading: string;
  readonly averageWords: string;
  /** Numbers of the picture in words, for who cannot see it. */
  readonly alt: string;
}

export interface Section {
  readonly heading: string;
  readonly lead: Words | null;
  readonly parts: readonly Part[];
  readonly freshPage?: boolean;
}

export type Part =
  | { readonly kind: "steps"; readonly table: StepsTable }
  | { readonly kind: "ledger"; readonly table: LedgerTable }
  | { readonly kind: "note"; readonly text: string }
  | { readonly kind: "paragraphs"; readonly items: readonly Words[]; readonly size: "small" | "usual" }
  | { readonly kind: "numbered"; readonly items: readonly string[] }
  | { readonly kind: "counts"; readonly counts: Counts }
  | { readonly kind: "pull"; readonly table: PullTable }
  | { readonly kind: "reach"; readonly table: ReachTable }
  | { readonly kind: "caveats"; readonly rows: readonly CaveatRow[] }
  | { readonly kind: "rework"; readonly rows: readonly ReworkRow[]; readonly aside: readonly Words[] };

export type StepKind = "start" | "step" | "median" | "adjustment" | "rounding" | "price";

export interface StepRow {
  readonly kind: StepKind;
  readonly label: string;
  readonly average: string;
  readonly subject: string;
  readonly factor: string;
  readonly step: string;
  readonly standsAt: string;
  /** Money that the row's bar runs from and to. */
  readonly from: number;
  readonly to: number;
}

export interface StepsTable {
  readonly heads: readonly [
    label: string,
    average: string,
    subject: string,
    factor: string,
    step: string,
    standsAt: string,
  ];
  readonly rows: readonly StepRow[];
  readonly hasFactors: boolean;
  readonly alt: string;
}

export interface LedgerLine {
  readonly label: string;
  readonly unit: string;
  readonly coefficient: string;
  readonly range: string;
  readonly own: string;
  /** One text for each head of LedgerTable.carriedHeads. */
  readonly carried: readonly string[];
  readonly sentence: string;
  readonly ownMoney: number;
  readonly carriedMoney: readonly number[];
  readonly coefficientMoney: number;
}

export interface LedgerTable {
  readonly currencySign: string;
  readonly rangeHead: string;
  readonly carriedHeads: readonly string[];
  readonly lines: readonly LedgerLine[];
  readonly alt: string;
}

export interface Counts {
  readonly cameIn: string;
  readonly used: string;
  readonly restHead: string;
  readonly rest: readonly { readonly count: string; readonly words: string }[];
}

export interface PullLine {
  readonly sale: string;
  readonly soldOn: string;
  readonly title: string;
  /** One text for each of PullTable.attributeHeads. */
  readonly values: readonly string[];
  readonly channel: string;
  readonly price: string;
  readonly pull: string;
  readonly priceWithout: string;
  readonly moves: string;
  readonly movesMoney: number | null;
  readonly verified: string;
}

export interface PullTable {
  readonly currencySign: string;
  readonly attributeHeads: readonly string[];
  readonly lines: readonly PullLine[];
  readonly rest: { readonly words: string; readonly pull: string } | null;
  readonly total: { readonly words: string; readonly pull: string; readonly price: string };
  readonly alt: string;
}

export interface ReachLine {
  readonly label: string;
  readonly subject: string;
  readonly evidence: string;
  readonly verdict: string;
  readonly beyond: boolean;
}

export interface Scatter {
  readonly xDecimals: number;
  readonly yDecimals: number;
  readonly xLabel: string;
  readonly yLabel: string;
  readonly points: readonly (readonly [number, number])[];
  readonly subject: readonly [number, number];
  readonly subjectWords: string;
  readonly alt: string;
}

export interface ReachTable {
  readonly subjectHead: string;
  readonly lines: readonly ReachLine[];
  readonly note: string;
  readonly scatter: Scatter | null;
}

export interface ReworkRow {
  readonly label: string;
  readonly lines: readonly string[];
  readonly note: string | null;
}
