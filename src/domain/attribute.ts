/**
 * An attribute is a characteristic of an item: a number with a unit, a choice from a list, yes/no, or a built day that is
 * read as age at sale in years.
 */

export type AttributeKind = "number" | "choice" | "yesNo" | "built";

export interface Attribute {
  /** Stable key within its class: [a-z][a-z0-9_]*; never shown where the label can be. */
  readonly key: string;
  readonly label: string;
  readonly kind: AttributeKind;
  /** "h", "kW", "m", "%" …; "years" for built (its age); null for choice and yes/no. */
  readonly unit: string | null;
  /** Size of "one more" in words and ledgers: 1000 for hours, 10 for kW. Positive; 1 for choice, yes/no. */
  readonly step: number;
  /** Levels of a choice in their stated order; empty otherwise. */
  readonly levels: readonly string[];
  /** Allowed values of a number (built: of the age in years); null = open. */
  readonly lowest: number | null;
  readonly highest: number | null;
  /** Which way a price is expected to go when the value rises. */
  readonly expectedDirection: "up" | "down" | null;
  readonly notes: string;
  /** Decimals that values are shown with. */
  readonly decimals: number;
  readonly archived: boolean;
}

/** An attribute with nothing said of it but what is given: no unit, no limits, steps of one. */
export function plainAttribute(given: Pick<Attribute, "key" | "label" | "kind"> & Partial<Attribute>): Attribute {
  return {
    unit: null,
    step: 1,
    levels: [],
    lowest: null,
    highest: null,
    expectedDirection: null,
    notes: "",
    decimals: 0,
    archived: false,
    ...given,
  };
}

/** Value of one attribute: number, level name, yes/no, ISO day for built; null = not known. */
export type AttributeValue = number | string | boolean | null;

/** Built-in attributes of every sale that may enter a model beside the class's own. */
export const CHANNEL_KEY = "channel";
export const MARKET_KEY = "market";

/** A key made of a label: "Power (kW)" → "power_kw". Empty labels give "attribute". */
export function keyOf(label: string): string {
  const base = label
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "_")
    .replace(/^_+|_+$/g, "");
  if (base === "") return "attribute";
  return /^[a-z]/.test(base) ? base : `a_${base}`;
}
