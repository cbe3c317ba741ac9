/** What a column of a file may be, as options of a list and back. */
import type { Attribute, AttributeKind } from "../../../domain/attribute.ts";
import type { ColumnMatch, ColumnTarget } from "../../../domain/importRecord.ts";

type Plain = Exclude<ColumnTarget["to"], "attribute" | "newAttribute" | "nothing">;

export const PLAIN_TARGETS: readonly { readonly to: Plain; readonly label: string }[] = [
  { to: "price", label: "price" },
  { to: "soldOn", label: "sold on" },
  { to: "title", label: "maker and model" },
  { to: "reference", label: "reference, lot" },
  { to: "channel", label: "sold through" },
  { to: "currency", label: "currency" },
  { to: "source", label: "source" },
  { to: "notes", label: "notes" },
  { to: "premium", label: "premium in or out" },
  { to: "tax", label: "tax in or out" },
];

export const KIND_LABELS: Readonly<Record<AttributeKind, string>> = {
  number: "number",
  choice: "choice from a list",
  yesNo: "yes or no",
  built: "built day or year",
};

export const KINDS = Object.keys(KIND_LABELS) as readonly AttributeKind[];

export function optionOf(target: ColumnTarget): string {
  if (target.to === "attribute") return `attribute ${target.key}`;
  if (target.to === "newAttribute") return `new ${target.kind}`;
  return target.to;
}

/** "Hours (h)" → label "Hours", unit "h" for a new attribute. */
export function labelAndUnit(heading: string): { readonly label: string; readonly unit: string | null } {
  const found = /^(.*?)\s*[([]([^)\]]{1,12})[)\]]\s*$/.exec(heading.trim());
  const label = (found?.[1] ?? heading).replaceAll("_", " ").trim();
  return {
    label: label === "" ? "Attribute" : label.charAt(0).toUpperCase() + label.slice(1),
    unit: found?.[2] ?? null,
  };
}

export function targetOf(option: string, heading: string): ColumnTarget {
  const [word = "", rest = ""] = option.split(" ");
  if (word === "attribute") return { to: "attribute", key: rest };
  if (word === "nothing") return { to: "nothing" };
  if (word !== "new") return { to: word as Plain };
  const kind = rest as AttributeKind;
  const { label, unit } = labelAndUnit(heading);
  return { to: "newAttribute", label, kind, unit: kind === "built" ? "years" : kind === "number" ? unit : null };
}

/** The match with one column's target replaced. A column that had the same single-use target gives it up. */
export function withTarget(match: ColumnMatch, at: number, target: ColumnTarget): ColumnMatch {
  const isSame = (other: ColumnTarget): boolean =>
    target.to !== "nothing" && target.to !== "newAttribute" && optionOf(other) === optionOf(target);
  const columns = match.columns.map((column, index) => {
    if (index === at) return { ...column, target };
    return isSame(column.target) ? { ...column, target: { to: "nothing" } as const } : column;
  });
  return { ...match, columns };
}

export function has(match: ColumnMatch, to: ColumnTarget["to"]): boolean {
  return match.columns.some(({ target }) => target.to === to);
}

/** What a file can't be read as sales without; each in words. */
export function missingTargets(match: ColumnMatch): string[] {
  const missing: string[] = [];
  if (!has(match, "price")) missing.push("price");
  if (!has(match, "soldOn") && match.fixed.soldOn === null) missing.push("day of sale");
  return missing;
}

/** Attributes of the class that no column of the file is matched to. */
export function unmatched(match: ColumnMatch, attributes: readonly Attribute[]): readonly Attribute[] {
  const keys = new Set(match.columns.map(({ target }) => (target.to === "attribute" ? target.key : "")));
  return attributes.filter(({ key, archived }) => !archived && !keys.has(key));
}
