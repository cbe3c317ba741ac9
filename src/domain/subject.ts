/** The item being priced. */
import type { AttributeValue } from "./attribute.ts";
import type { Day } from "./day.ts";

export interface Subject {
  /** "Tessaly TH-740" */
  readonly title: string;
  readonly serial: string | null;
  /** How it was identified: "plate read and photographed". */
  readonly identifiedBy: string | null;
  /** By attribute key; missing or null = not known. Channel too, under CHANNEL_KEY. Built as ISO day. */
  readonly values: Readonly<Record<string, AttributeValue>>;
  /** The day the price speaks of. */
  readonly effectiveOn: Day;
}

/** What a sheet says about the assignment. All words are the valuer's; null or "" prints as "not stated". */
export interface Engagement {
  readonly client: string;
  readonly intendedUsers: string;
  readonly intendedUse: string;
  readonly interest: string;
  readonly basisOfValue: string;
  readonly basisDefinition: string;
  readonly premise: string;
  readonly marketLevel: string;
  readonly priceBasisWords: string;
  readonly inspected: string;
  readonly reportOn: Day;
  readonly exposureTime: string;
  readonly earlierSales: string;
  readonly equipment: string;
  readonly practice: string;
  readonly practiceLine: string;
  readonly valuer: string;
  /** The valuer's own caveats, printed after the tool's. */
  readonly ownCaveats: readonly string[];
}
