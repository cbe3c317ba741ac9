import { type Attribute, plainAttribute } from "../../src/domain/attribute.ts";

/** A number attribute without limits, but for what is given. */
export function attributeOf(key: string, given: Partial<Attribute> = {}): Attribute {
  return plainAttribute({
    key,
    label: `${key.charAt(0).toUpperCase()}${key.slice(1)}`,
    kind: "number",
    unit: null,
    ...given,
  });
}
