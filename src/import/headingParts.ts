/** A heading apart into its name and its unit: "Hours (h)", "power_kW", "lift height m". */
import { unitName } from "./conversions/unit.ts";

export interface HeadingParts {
  /** Lower case, accents and marks off, words apart by one space; without the unit. */
  readonly name: string;
  /** Unit's usual name, or as typed in brackets; null where the heading has none. */
  readonly unit: string | null;
}

export function plainWords(text: string): string {
  return text
    .replace(/([a-z])([A-Z][a-z])/g, "$1 $2")
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .toLowerCase()
    .replace(/[^\p{L}\p{N}%]+/gu, " ")
    .trim();
}

/**
 * Brackets hold a unit whatever it is; without them the last word is one only if it is known and not all there is: "hours" is
 * a name, "power kW" a name and a unit.
 */
export function headingParts(heading: string): HeadingParts {
  const bracketed = /^(.*?)\s*[([]\s*([^)\]]{1,12})\s*[)\]]\s*$/.exec(heading);
  if (bracketed !== null && bracketed[1]!.trim() !== "") {
    return { name: plainWords(bracketed[1]!), unit: unitName(bracketed[2]!) ?? bracketed[2]!.trim() };
  }
  const words = plainWords(heading).split(" ");
  const last = words.at(-1)!;
  const unit = words.length > 1 && last.length <= 3 && last !== "in" ? unitName(last) : null;
  return unit === null ? { name: words.join(" "), unit: null } : { name: words.slice(0, -1).join(" "), unit };
}
