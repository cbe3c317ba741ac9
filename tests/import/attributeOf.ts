import type { Attribute } from "../../src/domain/attribute.ts";

/** A number attribute without limits, but for what is given. */
export function attributeOf(key: string, given: Partial<Attribute> = {}): Attribute {
  return {
    key,
    label: `${key.charAt(0).toUpperCase()}${key.slice(1)}`,
    kind: "number",
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
