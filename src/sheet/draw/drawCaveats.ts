/** Caveats as numbered rows: what is not known and why, and what the price would read, right beside it. */
import type { CaveatRow } from "../sheetContent.ts";
import type { Band } from "./flow.ts";
import { fitText, hairline, mm, setLines } from "./flow.ts";
import { PAGE, type Paper, type Tag } from "./paper.ts";
import { STYLES } from "./styles.ts";
import type { Span } from "./typeface.ts";

const NUMBER = 5;
const EFFECT = 42;
const PAD = 0.8;

interface Boxes {
  readonly text: Span[][];
  readonly effect: Span[][];
  readonly height: number;
  readonly isCut: boolean;
}

function boxes(paper: Paper, row: CaveatRow, maxLines: number): Boxes {
  const hasEffect = row.wouldRead.length > 0;
  const width = PAGE.right - PAGE.left - NUMBER - (hasEffect ? EFFECT + 3 : 12);
  const rich = [{ text: `${row.headline} `, bold: true }, { text: row.text }];
  const fitted = fitText(paper, rich, STYLES.caveat, width, maxLines);
  const text = fitted.lines;
  const effects = row.wouldRead.map((words) => fitText(paper, words, STYLES.effect, EFFECT, Math.max(2, maxLines - 2)));
  const effect = effects.flatMap((box) => box.lines);
  const lines = Math.max(text.length, Math.min(effect.length, Math.max(maxLines, 2)));
  return {
    text,
    effect: effect.slice(0, lines),
    height: 2 * PAD + lines * mm(STYLES.caveat.leading),
    isCut: fitted.clamped || effect.length > lines || effects.some((box) => box.clamped),
  };
}

/** Whether a caveat loses words at so many lines. */
export function isCaveatCut(paper: Paper, row: CaveatRow, maxLines: number): boolean {
  return boxes(paper, row, maxLines).isCut;
}

export function caveatsHeight(paper: Paper, rows: readonly CaveatRow[], maxLines: number): number {
  return rows.reduce((sum, row) => sum + boxes(paper, row, maxLines).height, 0);
}

function drawRow(paper: Paper, list: Tag, row: CaveatRow, box: Boxes, top: number): void {
  const y = top + PAD;
  paper.leaf("LI", paper.tag("LI", list), () => {
    setLines(paper, [[{ text: String(row.number), bold: true }]], PAGE.left, y, STYLES.caveat);
    setLines(paper, box.text, PAGE.left + NUMBER, y, STYLES.caveat);
    setLines(paper, box.effect, PAGE.right, y, STYLES.effect, "right");
  });
}

/** Gives the bottom. */
export function drawCaveats(paper: Paper, rows: readonly CaveatRow[], from: number, maxLines: number): number {
  const list = paper.tag("L");
  let top = from;
  rows.forEach((row, index) => {
    const box = boxes(paper, row, maxLines);
    drawRow(paper, list, row, box, top);
    top += box.height;
    const y = top;
    if (index < rows.length - 1) paper.artifact(() => hairline(paper, y));
  });
  return top;
}

export function caveatsBand(paper: Paper, rows: readonly CaveatRow[]): Band {
  let list: Tag | null = null;
  return {
    head: null,
    strips: rows.map((row, index) => {
      const box = boxes(paper, row, Number.POSITIVE_INFINITY);
      return {
        height: box.height,
        draw: (top) => {
          list ??= paper.tag("L");
          drawRow(paper, list, row, box, top);
          if (index < rows.length - 1) paper.artifact(() => hairline(paper, top + box.height));
        },
      };
    }),
  };
}
