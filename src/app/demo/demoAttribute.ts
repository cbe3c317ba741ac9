/** Attributes of the demo classes, said shortly. */
import { type Attribute, plainAttribute } from "../../domain/attribute.ts";

export function number(
  key: string,
  label: string,
  unit: string | null,
  more: Partial<Pick<Attribute, "step" | "lowest" | "highest" | "expectedDirection" | "decimals" | "notes">>,
): Attribute {
  return plainAttribute({ key, label, kind: "number", unit, ...more });
}

export function built(key: string, label: string, highest: number): Attribute {
  return plainAttribute({
    key,
    label,
    kind: "built",
    unit: "years",
    lowest: 0,
    highest,
    expectedDirection: "down",
    decimals: 1,
  });
}

export function choice(key: string, label: string, levels: readonly string[], notes = ""): Attribute {
  return plainAttribute({ key, label, kind: "choice", levels, notes });
}

export function yesNo(key: string, label: string): Attribute {
  return plainAttribute({ key, label, kind: "yesNo", expectedDirection: "up" });
}
