/** A cell apart into its number and the unit written after it: "97 kW" → "97", "kW". Null when no letters follow digits. */
export function splitUnit(cell: string): { readonly number: string; readonly unit: string } | null {
  const match = /^([+\-\u2212]?\d[\d.,'\u2019 \u00a0\u202f]*?)[\s\u00a0\u202f]*([\p{L}%][\p{L}%. ]*)$/u.exec(cell);
  return match === null ? null : { number: match[1]!, unit: match[2]!.trim() };
}
