/**
 * A price model as plain data: response form, reference set with forms, what is left out of it, market movement and the
 * evidence filter. Fitting it is hedonic's work.
 */
import type { Attribute } from "./attribute.ts";
import type { Day } from "./day.ts";
import type { Channel } from "./sale.ts";

export type ResponseForm = "price" | "lnPrice";
export type AttributeForm = "line" | "ln" | "choice" | "yesNo";

export interface ModelAttribute {
  /** Attribute key, or CHANNEL_KEY. */
  readonly key: string;
  readonly form: AttributeForm;
  /** Choice: the level the others are read against; null = the most frequent one. */
  readonly reference: string | null;
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
  readonly market: "none" | "line";
  readonly filter: EvidenceFilter;
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
