/** An attribute as it is being written: text in every field, and what is wrong with it in words. */

import { type Attribute, type AttributeKind, keyOf } from "../../domain/attribute.ts";
import { readTypedNumber } from "../../domain/format.ts";

export interface AttributeDraft {
  readonly label: string;
  readonly kind: AttributeKind;
  readonly unit: string;
  readonly step: string;
  readonly decimals: string;
  readonly lowest: string;
  readonly highest: string;
  /** One level a line. */
  readonly levels: string;
  readonly expectedDirection: "" | "up" | "down";
  readonly notes: string;
}

export type DraftFaults = Partial<Record<keyof AttributeDraft, string>>;

export const NEW_DRAFT: AttributeDraft = {
  label: "",
  kind: "number",
  unit: "",
  step: "1",
  decimals: "0",
  lowest: "",
  highest: "",
  levels: "",
  expectedDirection: "",
  notes: "",
};

export function draftOf(attribute: Attribute): AttributeDraft {
  const number = (value: number | null): string => (value === null ? "" : String(value));
  return {
    label: attribute.label,
    kind: attribute.kind,
    unit: attribute.unit ?? "",
    step: String(attribute.step),
    decimals: String(attribute.decimals),
    lowest: number(attribute.lowest),
    highest: number(attribute.highest),
    levels: attribute.levels.join("\n"),
    expectedDirection: attribute.expectedDirection ?? "",
    notes: attribute.notes,
  };
}

/** Number as typed; null when empty, NaN when it cannot be read in one way only. */
function read(text: string): number | null {
  return text.trim() === "" ? null : (readTypedNumber(text) ?? Number.NaN);
}

function linesOf(text: string): string[] {
  return text
    .split("\n")
    .map((line) => line.trim())
    .filter((line) => line !== "");
}

function isMeasured(kind: AttributeKind): boolean {
  return kind === "number" || kind === "built";
}

/** What keeps the draft from being kept; empty when nothing does. `others`: labels of the class's other attributes. */
export function faultsOf(draft: AttributeDraft, others: readonly string[]): DraftFaults {
  const faults: DraftFaults = {};
  const label = draft.label.trim();
  if (label === "") faults.label = "Give it a name.";
  else if (others.some((other) => other.trim().toLowerCase() === label.toLowerCase())) {
    faults.label = "Another attribute has this name already.";
  }
  if (isMeasured(draft.kind)) {
    const [step, decimals, lowest, highest] = [draft.step, draft.decimals, draft.lowest, draft.highest].map(read);
    if (step === null || !(step! > 0)) faults.step = "A number above zero.";
    if (!Number.isInteger(decimals) || decimals! < 0 || decimals! > 6) faults.decimals = "A whole number from 0 to 6.";
    if (Number.isNaN(lowest)) faults.lowest = "Not read as a number: write 1,000.5, with a point before decimals.";
    if (Number.isNaN(highest)) faults.highest = "Not read as a number: write 1,000.5, with a point before decimals.";
    else if (typeof lowest === "number" && typeof highest === "number" && lowest > highest) {
      faults.highest = "Lower than the lowest.";
    }
  }
  if (draft.kind === "choice") {
    const levels = linesOf(draft.levels);
    if (new Set(levels).size < levels.length) faults.levels = "A level stands here twice.";
  }
  return faults;
}

/** The attribute that a draft without faults says. `before`: the one that is being changed; its key, kind and state stay. */
export function attributeOf(draft: AttributeDraft, before: Attribute | null, takenKeys: readonly string[]): Attribute {
  const measured = isMeasured(draft.kind);
  const unit =
    draft.kind === "built" ? "years" : draft.kind === "number" && draft.unit.trim() !== "" ? draft.unit.trim() : null;
  const direction = draft.expectedDirection === "" ? null : draft.expectedDirection;
  return {
    key: before?.key ?? freeKey(draft.label, takenKeys),
    label: draft.label.trim(),
    kind: before?.kind ?? draft.kind,
    unit,
    step: measured ? read(draft.step)! : 1,
    levels: draft.kind === "choice" ? linesOf(draft.levels) : [],
    lowest: measured ? read(draft.lowest) : null,
    highest: measured ? read(draft.highest) : null,
    expectedDirection: draft.kind === "choice" ? null : direction,
    notes: draft.notes.trim(),
    decimals: measured ? read(draft.decimals)! : 0,
    archived: before?.archived ?? false,
  };
}

function freeKey(label: string, taken: readonly string[]): string {
  const base = keyOf(label);
  let key = base;
  for (let at = 2; taken.includes(key); at++) key = `${base}_${at}`;
  return key;
}
