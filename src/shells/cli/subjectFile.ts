/**
 * The subject as a file: either { "title": …, "values": { attribute: value } } or just { attribute: value }. Attributes are
 * named by their key, their label or their column heading; null or an absent one is not known.
 */
import { type AttributeKind, type AttributeValue, keyOf } from "../../domain/attribute.ts";
import { isDay } from "../../domain/day.ts";
import type { Subject } from "../../domain/subject.ts";
import { refuse } from "./verb.ts";

export interface NamedAttribute {
  readonly key: string;
  readonly label: string;
  readonly kind: AttributeKind;
}

function textOf(value: unknown): string | null {
  return typeof value === "string" && value !== "" ? value : null;
}

/** As the attribute keeps it: a choice's level is text even when it reads as a number, and yes and no may be words. */
function inKind(value: AttributeValue, kind: AttributeKind): AttributeValue {
  if (kind === "choice" && typeof value === "number") return String(value);
  if (typeof value !== "string") return value;
  const word = value.trim().toLowerCase();
  if (kind === "yesNo" && ["yes", "y", "true"].includes(word)) return true;
  if (kind === "yesNo" && ["no", "n", "false"].includes(word)) return false;
  return kind === "number" && word !== "" && Number.isFinite(Number(word)) ? Number(word) : value;
}

function attributeValueOf(name: string, value: unknown, kind: AttributeKind, path: string): AttributeValue {
  if (value === null || typeof value === "string" || typeof value === "boolean") return inKind(value, kind);
  if (typeof value === "number" && Number.isFinite(value)) return inKind(value, kind);
  throw refuse(
    "bad-subject",
    `The value of "${name}" is no number, text, yes/no or null.`,
    path,
    "Correct it in the file.",
  );
}

function attributeFor(name: string, attributes: readonly NamedAttribute[], path: string): NamedAttribute {
  const found =
    attributes.find(({ key }) => key === name) ??
    attributes.find(({ label }) => label.toLowerCase() === name.trim().toLowerCase()) ??
    attributes.find(({ key }) => key === keyOf(name));
  if (found !== undefined) return found;
  const known = attributes.map(({ label }) => label).join(", ");
  throw refuse("unknown-attribute", `There is no attribute "${name}".`, path, `Use one of: ${known}.`);
}

/** Words about the subject that are no attributes; a flat file may hold them beside the values. */
const OTHER_WORDS = ["title", "serial", "identifiedBy", "effectiveOn"];
/** Parts of the file that other readers take. */
const OTHER_PARTS = ["engagement", "overrideReason", "adjustments"];

function valuesIn(file: Record<string, unknown>): Record<string, unknown> {
  const { values } = file;
  if (typeof values === "object" && values !== null) return values as Record<string, unknown>;
  return Object.fromEntries(Object.entries(file).filter(([name]) => ![...OTHER_WORDS, ...OTHER_PARTS].includes(name)));
}

/** The subject; `effectiveOn` given on the command line wins over the file's, and today stands in when neither speaks. */
export function subjectOf(
  file: Record<string, unknown>,
  path: string,
  attributes: readonly NamedAttribute[],
  days: { readonly given: string | null; readonly today: string },
): Subject {
  const effectiveOn = days.given ?? textOf(file.effectiveOn) ?? days.today;
  if (!isDay(effectiveOn)) {
    throw refuse("bad-day", `"${effectiveOn}" is no calendar day.`, "effective date", "Write it as YYYY-MM-DD.");
  }
  const values: Record<string, AttributeValue> = {};
  for (const [name, value] of Object.entries(valuesIn(file))) {
    const { key, kind } = attributeFor(name, attributes, path);
    if (Object.hasOwn(values, key))
      throw refuse("named-twice", `"${name}" is named twice.`, path, "Keep one of the two.");
    values[key] = attributeValueOf(name, value, kind, path);
  }
  return {
    title: textOf(file.title) ?? "Subject",
    serial: textOf(file.serial),
    identifiedBy: textOf(file.identifiedBy),
    values,
    effectiveOn,
  };
}
