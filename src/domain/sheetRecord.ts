/** What a sheet is made of, what is embedded in it, and what verifying one says. */
import type { Appraisal } from "./appraisal.ts";
import type { AssetClass } from "./assetClass.ts";
import type { Day } from "./day.ts";
import type { EvidenceTable } from "./evidenceTable.ts";
import type { PriceModel } from "./priceModel.ts";
import type { Engagement, Subject } from "./subject.ts";

export type SheetState = "issued" | "withdrawn" | "superseded";

/** Reach overridden by the valuer: the written reason prints on the sheet. */
export interface SheetRequest {
  readonly model: PriceModel;
  readonly subject: Subject;
  readonly engagement: Engagement;
  readonly levels: readonly number[];
  readonly overrideReason: string | null;
  /** Valuer's own adjustments in money, after the model's price. */
  readonly adjustments: readonly { label: string; amount: number; reason: string }[];
}

/** Everything the PDF shows and everything needed to work it out again. Embedded as JSON, in this key order. */
export interface SheetEvidence {
  readonly schema: "lotwright-sheet/1";
  readonly program: string;
  readonly programVersion: string;
  readonly sheetNumber: string;
  readonly issuedOn: Day;
  readonly editionNumber: number;
  readonly assetClass: Omit<AssetClass, "id" | "dataVersion">;
  readonly request: SheetRequest;
  readonly evidence: EvidenceTable;
  readonly evidenceFingerprint: string;
  /** The full result object, doubles at full precision. */
  readonly appraisal: Appraisal;
  readonly conclusion: Conclusion;
}

/** From the model's price to the printed one. */
export interface Conclusion {
  readonly modelAmount: number;
  readonly adjusted: number;
  /** Rounding step in money: about a tenth of half the 90 % range, of the form 1, 2 or 5 × 10^k. */
  readonly roundingStep: number;
  readonly amount: number;
  /** Ends rounded outward. */
  readonly rangeForOneSale: readonly { level: number; low: number; high: number }[];
  readonly rangeForAverage: readonly { level: number; low: number; high: number }[];
}

export interface SheetRecord {
  readonly id: number;
  readonly assetClassId: number;
  readonly number: string;
  readonly state: SheetState;
  readonly title: string;
  readonly amount: number;
  readonly low: number;
  readonly high: number;
  readonly currencyCode: string;
  readonly effectiveOn: Day;
  readonly issuedAtUtc: string;
  readonly issuedBy: string;
  readonly digest: string;
  readonly editionNumber: number;
  readonly stateReason: string | null;
}

export interface VerifiedFigure {
  /** "price, unrounded", "range for one sale 90 %, low", "Hours: own part" … */
  readonly name: string;
  readonly printed: number | string | null;
  readonly recomputed: number | string | null;
  /** Equal to the last bit. */
  readonly equal: boolean;
}

export interface VerificationReport {
  readonly verdict: "stands" | "altered" | "unreadable";
  readonly sentence: string;
  /** The file's bytes against the digest it carries. */
  readonly bytesIntact: boolean;
  readonly fingerprintEqual: boolean;
  /** Numbers in the page text against the embedded result. */
  readonly textEqual: boolean;
  readonly figures: readonly VerifiedFigure[];
  readonly equalCount: number;
  readonly differentCount: number;
  readonly programVersion: string | null;
  readonly sameProgramVersion: boolean;
  /** What this store's journal knows; null when no store was asked. */
  readonly knownToJournal: boolean | null;
  readonly sheetNumber: string | null;
  readonly title: string | null;
  /** Each problem in a sentence. */
  readonly problems: readonly string[];
}
