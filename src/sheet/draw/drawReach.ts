/** Reach: two attributes of the evidence with the item marked, beside the table of every value and of all together. */
import { formatNumber } from "../../domain/format.ts";
import type { ReachLine, ReachTable, Scatter } from "../sheetContent.ts";
import { type Band, fitText, type Strip, setLines, type TextBox } from "./flow.ts";
import { PAGE, type Paper, type Tag, TEXT_WIDTH } from "./paper.ts";
import { scaleOf, tickStep, ticksBetween } from "./scale.ts";
import { BRICK, HAIR, INK, RULES, SLATE, STYLES, VERDIGRIS } from "./styles.ts";
import type { Style } from "./typeface.ts";

const PICTURE = { width: 82, height: 38, tallest: 56 } as const;
const GUTTER = 7;
const ROW = 5;

function drawScatter(paper: Paper, scatter: Scatter, top: number, height: number): void {
  const [left, right, bottom] = [PAGE.left + 11, PAGE.left + PICTURE.width - 2, top + height - 6.2];
  const all = [...scatter.points, scatter.subject];
  const extent = (axis: 0 | 1): [number, number] => {
    const values = all.map((point) => point[axis]);
    const [low, high] = values.reduce(
      ([a, b], value) => [Math.min(a, value), Math.max(b, value)],
      [values[0]!, values[0]!],
    );
    const pad = (high - low) * 0.05 || 1;
    return [low >= 0 && low - pad < (high - low) * 0.15 ? 0 : low - pad, high + pad];
  };
  const x = scaleOf(...extent(0), left, right);
  const y = scaleOf(...extent(1), bottom, top + 4);
  const decimals = (step: number): number => (step >= 1 ? 0 : Math.min(3, Math.ceil(-Math.log10(step) - 1e-9)));
  const stepOf = (span: number, least: number): number => Math.max(tickStep(span / 4), 10 ** -least);
  const xStep = stepOf(x.to - x.from, scatter.xDecimals);
  const yStep = stepOf(y.to - y.from, scatter.yDecimals);
  for (const tick of ticksBetween(y.from, y.to, yStep)) {
    paper.line(left, y(tick), right, y(tick), 0.5, HAIR);
    paper.text(formatNumber(tick, decimals(yStep)), left - 1.2, y(tick) + 0.8, STYLES.axis, "right");
  }
  for (const tick of ticksBetween(x.from, x.to, xStep)) {
    paper.line(x(tick), bottom, x(tick), bottom + 0.9, 0.5, INK);
    paper.text(formatNumber(tick, decimals(xStep)), x(tick), bottom + 3.2, STYLES.axis, "middle");
  }
  paper.line(left, bottom, right, bottom, 0.75, INK);
  const shorten = (words: string): string => {
    const box = fitText(paper, words, STYLES.axis, 60, 1);
    return box.lines[0]!.map(({ text }) => text).join("");
  };
  paper.text(shorten(scatter.xLabel), right, bottom + 6, STYLES.axis, "right");
  paper.text(shorten(scatter.yLabel), PAGE.left, top + 1.8, STYLES.axis);
  for (const [px, py] of scatter.points) paper.circle(x(px), y(py), 0.55, { stroke: SLATE, width: 0.5 });
  drawSubject(paper, scatter, x(scatter.subject[0]), y(scatter.subject[1]), { left, right, bottom });
}

function drawSubject(
  paper: Paper,
  scatter: Scatter,
  x: number,
  y: number,
  box: { left: number; right: number; bottom: number },
): void {
  const d = 1.6;
  paper.polygon(
    [
      [x, y - d],
      [x + d, y],
      [x, y + d],
      [x - d, y],
    ],
    { fill: VERDIGRIS, stroke: "#FFFFFF", width: 0.8 },
  );
  const style: Style = { ...STYLES.cellBold, size: 7 };
  const width = paper.typeface.width(scatter.subjectWords, style);
  const toRight = x + 8 + width < box.right;
  const toY = y + 8 < box.bottom - 1 ? y + 7 : y - 7;
  const toX = toRight ? x + 7 : x - 7;
  paper.line(x + (toRight ? 1.3 : -1.3), y + (toY > y ? 1.3 : -1.3), toX, toY, 0.6, VERDIGRIS);
  paper.rect(toRight ? toX + 0.2 : toX - width - 1, toY - 1.6, width + 0.8, 3.2, { fill: "#FFFFFF" });
  paper.text(scatter.subjectWords, toRight ? toX + 0.6 : toX - 0.6, toY + 0.9, style, toRight ? "left" : "right");
}

interface Side {
  readonly left: number;
  readonly width: number;
}

/** Shares of the table's width where its columns end: label, this item, evidence, where. */
const ENDS = [0.4, 0.58, 0.82, 1] as const;
const LEFTS = [0, 0.4, 0.58, 0.82] as const;

function cellsOf(line: ReachLine): { text: string; style: Style }[] {
  const verdict = line.beyond ? { ...STYLES.cellBold, color: BRICK } : STYLES.cell;
  return [
    { text: line.label, style: STYLES.cell },
    { text: line.subject, style: STYLES.cell },
    { text: line.evidence, style: STYLES.cell },
    { text: line.verdict, style: verdict },
  ];
}

function tableRow(
  paper: Paper,
  side: Side,
  cells: readonly { text: string; style: Style }[],
  kind: "TH" | "TD",
): { height: number; draw(top: number, table: Tag): void } {
  const boxes: TextBox[] = cells.map(({ text, style }, index) =>
    fitText(paper, text, style, side.width * (ENDS[index]! - LEFTS[index]!) - 1.4),
  );
  const height = Math.max(kind === "TH" ? 4 : ROW, 1.6 + Math.max(...boxes.map((box) => box.height)));
  return {
    height,
    draw: (top, table) => {
      const row = paper.tag("TR", table);
      const y = top + height;
      paper.artifact(() =>
        paper.line(
          side.left,
          y,
          side.left + side.width,
          y,
          kind === "TH" ? RULES.head : RULES.row,
          kind === "TH" ? INK : HAIR,
        ),
      );
      boxes.forEach((box, index) => {
        const type = kind === "TH" || index === 0 ? "TH" : "TD";
        const tag = paper.tag(type, row, type === "TH" ? { scope: kind === "TH" ? "Column" : "Row" } : {});
        const at = index === 0 ? side.left : side.left + side.width * ENDS[index]!;
        const offset = kind === "TH" ? height - 0.8 - box.height : (height - box.height) / 2;
        paper.leaf(type, tag, () =>
          setLines(paper, box.lines, at, top + offset, cells[index]!.style, index === 0 ? "left" : "right"),
        );
      });
    },
  };
}

function rowsOf(
  paper: Paper,
  reach: ReachTable,
  side: Side,
): { head: ReturnType<typeof tableRow>; rows: ReturnType<typeof tableRow>[] } {
  const heads = ["Attribute", reach.subjectHead, "Evidence", "Where"].map((text) => ({
    text,
    style: STYLES.head as Style,
  }));
  return {
    head: tableRow(paper, side, heads, "TH"),
    rows: reach.lines.map((line) => tableRow(paper, side, cellsOf(line), "TD")),
  };
}

function noteStrip(paper: Paper, note: string, side: Side): Strip {
  const box = fitText(paper, note, STYLES.note, side.width);
  return {
    height: box.height + 1.4,
    draw: (top) => paper.leaf("P", paper.tag("P"), () => setLines(paper, box.lines, side.left, top + 1.4, STYLES.note)),
  };
}

/** Picture and table side by side while the table is no taller than a third of a page; else the picture, then the table over the whole width. */
export function reachBands(paper: Paper, reach: ReachTable): Band[] {
  const beside: Side = { left: PAGE.left + PICTURE.width + GUTTER, width: TEXT_WIDTH - PICTURE.width - GUTTER };
  const narrow = rowsOf(paper, reach, beside);
  const note = noteStrip(paper, reach.note, beside);
  const height = narrow.head.height + narrow.rows.reduce((sum, row) => sum + row.height, 0) + note.height;
  const { scatter } = reach;
  const pictureHeight = Math.max(PICTURE.height, Math.min(PICTURE.tallest, height - note.height));
  if (scatter !== null && height <= 90) {
    const strip: Strip = {
      height: Math.max(pictureHeight, height),
      draw: (top) => {
        paper.leaf("Figure", paper.tag("Figure", paper.root, { alt: scatter.alt }), () =>
          drawScatter(paper, scatter, top, pictureHeight),
        );
        const table = paper.tag("Table");
        let y = top;
        for (const row of [narrow.head, ...narrow.rows]) {
          row.draw(y, table);
          y += row.height;
        }
        note.draw(y);
      },
    };
    return [{ head: null, strips: [strip] }];
  }
  return stacked(paper, reach);
}

function stacked(paper: Paper, reach: ReachTable): Band[] {
  const side: Side = { left: PAGE.left, width: TEXT_WIDTH };
  const wide = rowsOf(paper, reach, side);
  let tag: Tag | null = null;
  const strip = (row: ReturnType<typeof tableRow>): Strip => ({
    height: row.height,
    draw: (top) => {
      tag ??= paper.tag("Table");
      row.draw(top, tag);
    },
  });
  const table: Band = { head: strip(wide.head), strips: [...wide.rows.map(strip), noteStrip(paper, reach.note, side)] };
  const { scatter } = reach;
  if (scatter === null) return [table];
  const picture: Strip = {
    height: PICTURE.height + 3,
    draw: (top) =>
      paper.leaf("Figure", paper.tag("Figure", paper.root, { alt: scatter.alt }), () =>
        drawScatter(paper, scatter, top, PICTURE.height),
      ),
  };
  return [{ head: null, strips: [picture] }, table];
}
