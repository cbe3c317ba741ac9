/**
 * JSON in which every double comes back to the last bit: −0 keeps its sign, and what JSON has no number for (an infinite
 * condition number, say) is written as {"$number": "Infinity"}. Keys keep the order they were given in; no spaces.
 */
const SPECIAL = "$number";
const SPECIALS: Readonly<Record<string, number>> = {
  Infinity: Number.POSITIVE_INFINITY,
  "-Infinity": Number.NEGATIVE_INFINITY,
  NaN: Number.NaN,
};
const REFUSED = new Set(["__proto__", "constructor", "prototype"]);

/** The text of a plain value. Members that are undefined are left out, as JSON does. */
export function canonicalJson(value: unknown): string {
  if (typeof value === "number") return numberText(value);
  if (Array.isArray(value)) return `[${value.map((one) => canonicalJson(one === undefined ? null : one)).join(",")}]`;
  if (value !== null && typeof value === "object") {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`);
    return `{${members.join(",")}}`;
  }
  return JSON.stringify(value) ?? "null";
}

function numberText(value: number): string {
  if (!Number.isFinite(value)) return `{"${SPECIAL}":"${value}"}`;
  return Object.is(value, -0) ? "-0" : JSON.stringify(value);
}

/** The value of such a text. Throws SyntaxError on anything else, and on names that could reach an object's own workings. */
export function parseCanonicalJson(text: string): unknown {
  return JSON.parse(text, (key, value: unknown) => {
    if (REFUSED.has(key)) throw new SyntaxError(`The name ${key} has no place in a sheet.`);
    return special(value) ?? value;
  });
}

function special(value: unknown): number | null {
  if (value === null || typeof value !== "object" || !(SPECIAL in value)) return null;
  const name = value[SPECIAL];
  return typeof name === "string" && Object.hasOwn(SPECIALS, name) ? SPECIALS[name]! : null;
}
