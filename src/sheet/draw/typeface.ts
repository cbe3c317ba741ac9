/**
 * Text as the sheet's fonts can set it: runs by font file, widths, line breaks. All measures in mm; sizes in pt.
 * A character that no font holds is set as U+FFFD from the sans face and reported: it never vanishes.
 */
import type { FaceName } from "../sheetFonts.ts";
import { FACES } from "../sheetFonts.ts";

export const PT_PER_MM = 72 / 25.4;

export interface Style {
  readonly face: FaceName;
  /** pt */
  readonly size: number;
  readonly color: string;
  /** Distance of base lines, pt. */
  readonly leading: number;
  /** Figures of equal width, where the face's usual ones are not (the serif's). */
  readonly tabular?: boolean;
}

/** A piece of a line in its own face. */
export interface Span {
  readonly text: string;
  readonly bold?: boolean;
  readonly italic?: boolean;
}
export type Rich = string | readonly Span[];

export interface Run {
  readonly font: string;
  readonly text: string;
}

/** What the typesetter needs to know of one opened font file. */
export interface OpenFont {
  has(codePoint: number): boolean;
  /** Width in pt. */
  width(text: string, size: number, tabular: boolean): number;
}

/** Characters without ink of their own that a font need not hold. */
const INVISIBLE = /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/gu;
const SPACES = /[\u2000-\u200a\u202f\u205f\u3000]/g;
export const MISSING_MARK = "\ufffd";

export function cleaned(text: string): string {
  return text
    .normalize("NFC")
    .replace(/[\t\n\r]+/g, " ")
    .replace(INVISIBLE, "")
    .replace(SPACES, "\u00a0");
}

export function plainOf(rich: Rich): string {
  return typeof rich === "string" ? rich : rich.map(({ text }) => text).join("");
}

export interface Typeface {
  runs(text: string, face: FaceName): Run[];
  /** mm */
  width(rich: Rich, style: Style): number;
  /** Lines that fit `width` mm. An empty text is one empty line. */
  wrap(rich: Rich, style: Style, width: number): Span[][];
  /** Characters that had to be replaced so far. */
  readonly missing: ReadonlySet<string>;
}

export function faceOf(style: Style, span: Span): FaceName {
  const serif = style.face.startsWith("serif");
  if (span.bold === true) return serif ? "serifBold" : "sansBold";
  if (span.italic === true) return serif ? "serifItalic" : style.face;
  return style.face;
}

export function spansOf(rich: Rich): readonly Span[] {
  return typeof rich === "string" ? [{ text: rich }] : rich;
}

export function createTypeface(open: (font: string) => OpenFont): Typeface {
  const missing = new Set<string>();
  const fontOf = (character: string, face: FaceName): Run => {
    const code = character.codePointAt(0)!;
    const { latin, further } = FACES[face];
    if (open(latin).has(code)) return { font: latin, text: character };
    if (open(further).has(code)) return { font: further, text: character };
    missing.add(character);
    return { font: FACES.sans.latin, text: MISSING_MARK };
  };
  const runs = (text: string, face: FaceName): Run[] => {
    const joined: { font: string; text: string }[] = [];
    for (const character of cleaned(text)) {
      const run = fontOf(character, face);
      const last = joined[joined.length - 1];
      if (last !== undefined && last.font === run.font) last.text += run.text;
      else joined.push({ ...run });
    }
    return joined;
  };
  const width = (rich: Rich, style: Style): number =>
    spansOf(rich).reduce(
      (sum, span) =>
        sum +
        runs(span.text, faceOf(style, span)).reduce(
          (inner, run) => inner + open(run.font).width(run.text, style.size, style.tabular === true),
          0,
        ),
      0,
    ) / PT_PER_MM;
  return { runs, width, missing, wrap: (rich, style, limit) => wrapLines(rich, limit, (spans) => width(spans, style)) };
}

/** Words with the blank before them; a hyphen, dash or slash inside a word lets it break after. */
function piecesOf(rich: Rich): Span[] {
  return spansOf(rich).flatMap((span) =>
    (cleaned(span.text).match(/ *[^ \-–/]*[-–/]+(?=[^ \d])| *[^ ]+?(?=[-–/]+[^ \d])| *[^ ]+| +/g) ?? []).map(
      (text) => ({
        ...span,
        text,
      }),
    ),
  );
}

type Measure = (spans: readonly Span[]) => number;

function wrapLines(rich: Rich, limit: number, measure: Measure): Span[][] {
  const lines: Span[][] = [[]];
  for (const piece of piecesOf(rich)) {
    const line = lines[lines.length - 1]!;
    if (measure([...line, piece]) <= limit || (line.length === 0 && piece.text.trim() === "")) {
      append(line, piece);
      continue;
    }
    let rest: Span = { ...piece, text: piece.text.trimStart() };
    if (line.length > 0) lines.push([]);
    while (measure([rest]) > limit && rest.text.length > 1) {
      const fits = longestPrefix(rest, limit, measure);
      append(lines[lines.length - 1]!, { ...rest, text: rest.text.slice(0, fits) });
      rest = { ...rest, text: rest.text.slice(fits) };
      lines.push([]);
    }
    append(lines[lines.length - 1]!, rest);
  }
  return lines;
}

/** Length of the longest start of a word that fits; at least one whole character. */
function longestPrefix(span: Span, limit: number, measure: Measure): number {
  const characters = [...span.text];
  let length = characters[0]!.length;
  let text = characters[0]!;
  for (const character of characters.slice(1)) {
    if (measure([{ ...span, text: text + character }]) > limit) break;
    text += character;
    length += character.length;
  }
  return length;
}

function append(line: Span[], piece: Span): void {
  const last = line[line.length - 1];
  if (last !== undefined && last.bold === piece.bold && last.italic === piece.italic) {
    line[line.length - 1] = { ...last, text: last.text + piece.text };
  } else line.push(piece);
}

/** At most `limit` lines; where there were more, the last one ends in an ellipsis. */
export function clampLines(lines: Span[][], limit: number, fits: (line: Span[]) => boolean): Span[][] {
  if (lines.length <= limit) return lines;
  const kept = lines.slice(0, limit);
  const last = [...kept[limit - 1]!];
  const tail = last.pop() ?? { text: "" };
  let text = tail.text.trimEnd();
  while (text.length > 0 && !fits([...last, { ...tail, text: `${text} …` }])) text = text.slice(0, -1).trimEnd();
  const whole = text.replace(/\s+\S*$/, "");
  if (whole.length > text.length * 0.6) text = whole;
  kept[limit - 1] = [...last, { ...tail, text: `${text} …` }];
  return kept;
}
