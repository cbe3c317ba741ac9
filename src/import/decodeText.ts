/**
 * Bytes → text. A byte order mark decides; else zero bytes in every second place mean UTF-16, valid UTF-8 is UTF-8, and what is
 * left is windows-1252, the usual tongue of older spreadsheets.
 */
import type { ReadingOptions } from "../domain/importRecord.ts";

type Encoding = ReadingOptions["encoding"];

/**
 * Characters 0x80–0x9f of windows-1252 (WHATWG Encoding Standard, index windows-1252); the five without one stay as they are.
 * Mapped here because some runtimes decode this label as Latin-1.
 */
const UPPER_CONTROLS =
  "\u20ac\u0081\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\u008d\u017d\u008f" +
  "\u0090\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\u009d\u017e\u0178";

const SAMPLE_BYTES = 65_536;

export interface Decoded {
  readonly encoding: Encoding;
  readonly text: string;
  readonly sentences: readonly string[];
}

const NAMES: Readonly<Record<Encoding, string>> = {
  "utf-8": "UTF-8",
  "utf-16le": "UTF-16, low byte first",
  "utf-16be": "UTF-16, high byte first",
  "windows-1252": "windows-1252",
};

function markOf(bytes: Uint8Array): Encoding | null {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) return "utf-8";
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return "utf-16le";
  return bytes[0] === 0xfe && bytes[1] === 0xff ? "utf-16be" : null;
}

/** UTF-16 without a mark: text of mostly Latin letters has a zero in every second byte. */
function zeroPattern(bytes: Uint8Array): Encoding | null {
  const pairs = Math.min(bytes.length, SAMPLE_BYTES) >> 1;
  let even = 0;
  let odd = 0;
  for (let k = 0; k < pairs; k++) {
    if (bytes[2 * k] === 0) even++;
    if (bytes[2 * k + 1] === 0) odd++;
  }
  if (odd > 0.3 * pairs && even < 0.05 * pairs) return "utf-16le";
  return even > 0.3 * pairs && odd < 0.05 * pairs ? "utf-16be" : null;
}

function isUtf8(bytes: Uint8Array): boolean {
  try {
    new TextDecoder("utf-8", { fatal: true }).decode(bytes);
    return true;
  } catch {
    return false;
  }
}

function decodeAs(bytes: Uint8Array, encoding: Encoding): string {
  if (encoding !== "windows-1252") return new TextDecoder(encoding).decode(bytes);
  return new TextDecoder("windows-1252")
    .decode(bytes)
    .replace(/[\u0080-\u009f]/g, (control) => UPPER_CONTROLS[control.charCodeAt(0) - 0x80]!);
}

function detect(bytes: Uint8Array): { encoding: Encoding; why: string } {
  const mark = markOf(bytes);
  if (mark !== null) return { encoding: mark, why: "the file begins with its mark" };
  const zeros = zeroPattern(bytes);
  if (zeros !== null) return { encoding: zeros, why: "every second byte is zero" };
  if (isUtf8(bytes)) {
    const plain = bytes.every((byte) => byte < 0x80);
    return { encoding: "utf-8", why: plain ? "it has plain letters only" : "every character of it is valid" };
  }
  return { encoding: "windows-1252", why: "some bytes are not valid UTF-8" };
}

/** Text without its byte order mark; sentences say how it was read and what could not be. Line ends become "\n". */
export function decodeText(bytes: Uint8Array, chosen: Encoding | undefined): Decoded {
  const { encoding, why } = chosen === undefined ? detect(bytes) : { encoding: chosen, why: "as chosen" };
  let text = decodeAs(bytes, encoding);
  if (text.charCodeAt(0) === 0xfeff) text = text.slice(1);
  const lost = text.split("\ufffd").length - 1;
  const sentences = [`Read as ${NAMES[encoding]}: ${why}.`];
  if (lost > 0) sentences.push(`${lost} characters could not be read as ${NAMES[encoding]}; they show as \ufffd.`);
  return { encoding, text: text.includes("\r") ? text.replace(/\r\n?/g, "\n") : text, sentences };
}
