/** Tables as text and bytes, the way the programs of the demo's invented auction houses would write them. */

/** Quoted only where a cell holds the separator, a quotation mark or a line break. */
export function tableText(rows: readonly (readonly string[])[], separator: string, lineEnd: string): string {
  const cell = (text: string) =>
    text.includes(separator) || /["\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
  return rows.map((row) => row.map(cell).join(separator) + lineEnd).join("");
}

export function utf8(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

/** Signs that the demo's windows-1252 file uses above Latin-1. */
const UPPER: Readonly<Record<string, number>> = { "\u20ac": 0x80, "\u2013": 0x96, "\u2014": 0x97, "\u2019": 0x92 };

/** Throws on a character that the encoding does not have. */
export function windows1252(text: string): Uint8Array {
  return Uint8Array.from(text, (character) => {
    const code = character.charCodeAt(0);
    const byte = code < 0x80 || (code >= 0xa0 && code <= 0xff) ? code : UPPER[character];
    if (byte === undefined) throw new Error(`no windows-1252 byte for ${character}`);
    return byte;
  });
}

/** 2025-05-12 → 12.05.2025 with "."; 12/05/2025 with "/". */
export function dayFirst(iso: string, mark: string): string {
  return iso.split("-").reverse().join(mark);
}

/** 38500 → 38.500 with ".", 1250 → 1,250 with ",". */
export function grouped(value: number, mark: string): string {
  return String(value).replace(/\B(?=(?:\d{3})+$)/g, mark);
}
