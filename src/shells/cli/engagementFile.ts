/** What a sheet says about the assignment: the subject file's own words, the practice's settings, else nothing said. */
import type { Settings } from "../../contract/requests.ts";
import type { PriceBasis } from "../../domain/sale.ts";
import { priceBasisWords } from "../../domain/sale.ts";
import { refuse } from "./verb.ts";

const WORDS = [
  "client",
  "intendedUsers",
  "intendedUse",
  "interest",
  "basisOfValue",
  "basisDefinition",
  "premise",
  "marketLevel",
  "priceBasisWords",
  "inspected",
  "exposureTime",
  "earlierSales",
  "equipment",
  "practice",
  "practiceLine",
  "valuer",
] as const;
type Words = Record<(typeof WORDS)[number], string>;

/** A sheet must not be silent on these; where the file is, the sheet says that nobody stated them. */
export const TO_BE_STATED = ["basisOfValue", "premise", "marketLevel"] as const;
const NOT_STATED = "not stated (issued from the command line)";

/** Which of them the file leaves open. */
export function leftUnstated(given: unknown): string[] {
  const file = (given ?? {}) as Record<string, unknown>;
  return TO_BE_STATED.filter((word) => typeof file[word] !== "string" || file[word].trim() === "");
}

export interface Surroundings {
  readonly today: string;
  readonly settings: Settings;
  readonly priceBasis: PriceBasis;
}

/** An empty word is printed as "not stated"; a word that the sheet does not know is refused rather than lost. */
export function engagementOf(
  given: unknown,
  { today, settings, priceBasis }: Surroundings,
): Words & { reportOn: string; ownCaveats: string[] } {
  const file = (given ?? {}) as Record<string, unknown>;
  const unknown = Object.keys(file).find((name) => ![...WORDS, "reportOn", "ownCaveats"].includes(name));
  if (unknown !== undefined) {
    throw refuse(
      "unknown-word",
      `The sheet has no place for "${unknown}".`,
      "engagement",
      `Use: ${WORDS.join(", ")}, reportOn, ownCaveats.`,
    );
  }
  const empty = Object.fromEntries(WORDS.map((word) => [word, ""])) as Words;
  const known = {
    ...empty,
    priceBasisWords: priceBasisWords(priceBasis),
    practice: settings.practice,
    practiceLine: settings.practiceLine,
    valuer: [settings.person, settings.credentials].filter((word) => word !== "").join(", "),
  };
  const open = Object.fromEntries(leftUnstated(file).map((word) => [word, NOT_STATED]));
  return { ...known, reportOn: today, ownCaveats: [], ...(file as Partial<Words>), ...open };
}
