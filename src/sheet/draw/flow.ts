/**
 * Text in boxes and sections down the pages. A section is a list of strips that cannot break; between strips a page may end, and
 * then the head of the table at hand is drawn again. Short sections move whole.
 */
import { PAGE, type Paper, type Tag, TEXT_WIDTH } from "./paper.ts";
import { HAIR, INK, RULES, STYLES } from "./styles.ts";
import { clampLines, PT_PER_MM, type Rich, type Span, type Style } from "./typeface.ts";

export const mm = (pt: number): number => pt / PT_PER_MM;

/** How far below the top of its box the base line of a line of text lies, mm: half-leading as in CSS. */
export function baselineOf(style: Style): number {
  const [ascent, descent] = style.face.startsWith("serif") ? [1.036, 0.335] : [1.025, 0.275];
  return mm((style.leading - (ascent + descent) * style.size) / 2 + ascent * style.size);
}

export interface TextBox {
  readonly lines: Span[][];
  readonly height: number;
  readonly clamped: boolean;
}

export function fitText(
  paper: Paper,
  rich: Rich,
  style: Style,
  width: number,
  maxLines = Number.POSITIVE_INFINITY,
): TextBox {
  const all = paper.typeface.wrap(rich, style, width);
  const lines = clampLines(all, maxLines, (line) => paper.typeface.width(line, style) <= width);
  return { lines, height: lines.length * mm(style.leading), clamped: lines.length < all.length };
}

/** Draws the lines of a box; the caller has marked what they belong to. */
export function setLines(
  paper: Paper,
  lines: readonly Rich[],
  x: number,
  top: number,
  style: Style,
  align: "left" | "right" | "middle" = "left",
): void {
  lines.forEach((line, index) => {
    paper.text(line, x, top + index * mm(style.leading) + baselineOf(style), style, align);
  });
}

/** A tagged paragraph from `top`; gives its height. */
export function paragraph(
  paper: Paper,
  tag: { parent?: Tag; type?: string },
  rich: Rich,
  place: { x: number; top: number; width: number },
  style: Style,
): number {
  const box = fitText(paper, rich, style, place.width);
  const type = tag.type ?? "P";
  paper.leaf(type, paper.tag(type, tag.parent), () => setLines(paper, box.lines, place.x, place.top, style));
  return box.height;
}

export interface Strip {
  readonly height: number;
  draw(top: number): void;
  /** Not the last thing on a page. */
  readonly keepWithNext?: boolean;
}

/** Strips that belong together, with a head that is drawn again on each new page. */
export interface Band {
  readonly head: Strip | null;
  readonly strips: readonly Strip[];
}

export const single = (height: number, draw: (top: number) => void): Band => ({
  head: null,
  strips: [{ height, draw }],
});

export function gap(height: number): Strip {
  return { height, draw: () => undefined };
}

export interface Cursor {
  top: number;
  /** True until something stands on the page. */
  fresh: boolean;
}

const SECTION_GAP = 3.6;
const FULL = PAGE.bottom - PAGE.top;
/** A section that needs no more than this share of a page is not broken. */
const WHOLE = 0.55;

export interface FlowSection {
  readonly heading: string;
  readonly lead: Rich | null;
  readonly bands: readonly Band[];
  readonly freshPage: boolean;
}

function heightOf(bands: readonly Band[]): number {
  return bands.reduce(
    (sum, { head, strips }) => sum + (head?.height ?? 0) + strips.reduce((inner, strip) => inner + strip.height, 0),
    0,
  );
}

function newPage(paper: Paper, cursor: Cursor): void {
  paper.addPage();
  cursor.top = PAGE.top;
  cursor.fresh = true;
}

/** Heading and opening sentence; the rule above them only where something stands above. */
function drawOpening(paper: Paper, cursor: Cursor, section: FlowSection): void {
  if (!cursor.fresh) {
    cursor.top += SECTION_GAP;
    const y = cursor.top;
    paper.artifact(() => paper.line(PAGE.left, y, PAGE.right, y, RULES.section, INK));
    cursor.top += 1.6;
  }
  paper.bookmark(section.heading, cursor.top - 2);
  const place = { x: PAGE.left, top: cursor.top, width: TEXT_WIDTH };
  cursor.top += paragraph(paper, { type: "H2" }, section.heading, place, STYLES.heading) + 0.5;
  if (section.lead !== null) {
    cursor.top += paragraph(paper, {}, section.lead, { ...place, top: cursor.top }, STYLES.lead);
  }
  cursor.top += 1.6;
  cursor.fresh = false;
}

function openingHeight(paper: Paper, section: FlowSection): number {
  const lead = section.lead === null ? 0 : fitText(paper, section.lead, STYLES.lead, TEXT_WIDTH).height;
  return SECTION_GAP + 1.6 + fitText(paper, section.heading, STYLES.heading, TEXT_WIDTH).height + 0.5 + lead + 1.6;
}

/** Whether the section starts on a page of its own rather than being broken here. */
function startsNewPage(paper: Paper, cursor: Cursor, section: FlowSection): boolean {
  if (cursor.fresh) return false;
  if (section.freshPage) return true;
  const room = PAGE.bottom - cursor.top;
  const total = openingHeight(paper, section) + heightOf(section.bands);
  if (total <= room) return false;
  if (total <= FULL * WHOLE) return true;
  const first = section.bands[0];
  const start =
    (first?.head?.height ?? 0) + (first?.strips ?? []).slice(0, 3).reduce((sum, { height }) => sum + height, 0);
  return openingHeight(paper, section) + start > room || room < FULL * 0.25;
}

export function placeSection(paper: Paper, cursor: Cursor, section: FlowSection): void {
  if (startsNewPage(paper, cursor, section)) newPage(paper, cursor);
  drawOpening(paper, cursor, section);
  for (const { head, strips } of section.bands) placeBand(paper, cursor, head, strips);
}

function placeBand(paper: Paper, cursor: Cursor, head: Strip | null, strips: readonly Strip[]): void {
  const drawHead = (): void => {
    if (head === null) return;
    head.draw(cursor.top);
    cursor.top += head.height;
  };
  const first = (head?.height ?? 0) + (strips[0]?.height ?? 0);
  if (cursor.top + first > PAGE.bottom && !cursor.fresh) newPage(paper, cursor);
  drawHead();
  strips.forEach((strip, index) => {
    const after = strip.keepWithNext === true ? (strips[index + 1]?.height ?? 0) : 0;
    if (cursor.top + strip.height + after > PAGE.bottom + 0.01 && index > 0) {
      newPage(paper, cursor);
      drawHead();
    }
    strip.draw(cursor.top);
    cursor.top += strip.height;
    cursor.fresh = false;
  });
}

export function hairline(paper: Paper, y: number, left: number = PAGE.left, right: number = PAGE.right): void {
  paper.line(left, y, right, y, RULES.row, HAIR);
}
