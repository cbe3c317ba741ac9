/**
 * The carry-over ledger: per row its figures, one sentence, and the bars that stack the own part (solid) and the carried parts
 * (hatched, outlined, dotted outline) to the coefficient (diamond).
 */
import { formatNumber } from "../../domain/format.ts";
import type { LedgerLine, LedgerTable } from "../sheetContent.ts";
import { CELL_LINES, type Column, columnWidth, headWidth } from "./cells.ts";
import { type Band, baselineOf, fitText, hairline, mm, type Strip, setLines } from "./flow.ts";
import { PAGE, type Paper, type Tag, TEXT_WIDTH } from "./paper.ts";
import { roomyTicks, type Scale, scaleOf } from "./scale.ts";
import { HAIR, INK, RULES, SLATE, STYLES, VERDIGRIS, WHITE } from "./styles.ts";

const PICTURE = 43;
const GAP = 3;
const NAME = 36;

interface Layout {
  readonly columns: readonly Column[];
  readonly heads: readonly string[];
  readonly scale: Scale;
  readonly ticks: readonly number[];
  readonly left: number;
}

function figuresOf(line: LedgerLine): string[] {
  return [line.coefficient, line.range, line.own, ...line.carried];
}

function layoutOf(paper: Paper, table: LedgerTable): Layout {
  const { currencySign: sign } = table;
  const heads = [
    `As used here, ${sign}`,
    table.rangeHead,
    `Own part, ${sign}`,
    ...table.carriedHeads.map((head) => `Carried for ${head}, ${sign}`),
  ];
  const widths = heads.map(
    (head, index) =>
      Math.max(
        columnWidth(
          paper,
          table.lines.map((line) => figuresOf(line)[index]!),
          index === 0 ? STYLES.cellBold : STYLES.cell,
        ),
        Math.min(headWidth(paper, head), index > 2 ? 17 : 30),
      ) + 3,
  );
  const figures = widths.reduce((sum, width) => sum + width, 0);
  const picture = Math.max(24, Math.min(PICTURE, TEXT_WIDTH - NAME - figures - GAP));
  let left = TEXT_WIDTH - picture - GAP - figures;
  const columns = widths.map((width): Column => {
    const column: Column = { left, width, align: "right" };
    left += width;
    return column;
  });
  const stops = table.lines.flatMap((line) => stopsOf(line));
  const [low, high] = [Math.min(0, ...stops), Math.max(0, ...stops)];
  const pad = (high - low) * 0.08 || 1;
  const scale = scaleOf(low - pad, high + pad, PAGE.right - picture, PAGE.right - 1);
  const ticks = roomyTicks(scale, picture > 36 ? 3 : 2, (tick) => paper.typeface.width(tickText(tick), STYLES.axis));
  return { columns, heads, scale, ticks, left: TEXT_WIDTH - picture - GAP - figures };
}

const tickText = (tick: number): string => formatNumber(tick, tick % 1 === 0 ? 0 : 2);

/** Where the own part and each carried part end. */
function stopsOf(line: LedgerLine): number[] {
  const stops = [line.ownMoney];
  for (const part of line.carriedMoney) stops.push(stops[stops.length - 1]! + part);
  return [...stops, line.coefficientMoney];
}

function drawBars(paper: Paper, { scale, ticks }: Layout, line: LedgerLine, top: number, height: number): void {
  for (const tick of ticks) {
    paper.line(scale(tick), top, scale(tick), top + height, tick === 0 ? 0.7 : 0.5, tick === 0 ? INK : HAIR);
  }
  const parts = line.carriedMoney.length;
  const unit = Math.min(1.9, (height - 2.6) / (1.35 + parts));
  const own = unit * 1.35;
  let y = top + 0.5;
  const bar = (from: number, to: number): [x: number, width: number] => [
    Math.min(scale(from), scale(to)),
    Math.max(0.15, Math.abs(scale(to) - scale(from))),
  ];
  const [ownX, ownWidth] = bar(0, line.ownMoney);
  paper.rect(ownX, y, ownWidth, own - 0.3, { fill: SLATE });
  y += own + 0.1;
  let at = line.ownMoney;
  line.carriedMoney.forEach((part, index) => {
    const [x, width] = bar(at, at + part);
    carriedBar(paper, index, x, y, width, unit - 0.45);
    at += part;
    y += unit;
  });
  diamond(paper, scale(line.coefficientMoney), y + 0.6);
}

function carriedBar(paper: Paper, index: number, x: number, y: number, width: number, height: number): void {
  if (index === 0) paper.hatch(x, y, width, height, SLATE);
  else paper.rect(x, y, width, height, { fill: WHITE, stroke: SLATE, width: 0.75 });
  if (index === 2) {
    for (let dot = x + 0.5; dot < x + width; dot += 0.9) paper.circle(dot, y + height / 2, 0.18, { fill: SLATE });
  }
}

function diamond(paper: Paper, x: number, y: number): void {
  paper.polygon(
    [
      [x, y - 0.85],
      [x + 0.85, y],
      [x, y + 0.85],
      [x - 0.85, y],
    ],
    { fill: VERDIGRIS },
  );
}

function rowStrip(paper: Paper, tags: () => { table: Tag; figure: Tag }, layout: Layout, line: LedgerLine): Strip {
  const name = fitText(
    paper,
    [{ text: line.label, bold: true }, { text: ` ${line.unit}` }],
    STYLES.cell,
    layout.left,
    CELL_LINES,
  );
  const sentence = fitText(
    paper,
    line.sentence,
    STYLES.sentence,
    PAGE.right - PAGE.left - (PAGE.right - layout.scale(layout.scale.from)) - 2,
  );
  const pad = 0.75;
  const height = Math.max(
    pad + name.height + sentence.height + 0.7,
    8.2 + Math.max(0, line.carriedMoney.length - 2) * 1.2,
  );
  return {
    height,
    draw: (top) => {
      const { table, figure } = tags();
      paper.artifact(() => hairline(paper, top + height));
      const row = paper.tag("TR", table);
      const y = top + pad;
      paper.leaf("TH", paper.tag("TH", row, { scope: "Row" }), () =>
        setLines(paper, name.lines, PAGE.left, y, STYLES.cell),
      );
      figuresOf(line).forEach((text, index) => {
        const { left, width } = layout.columns[index]!;
        const style = index === 0 ? STYLES.cellBold : STYLES.cell;
        paper.leaf("TD", paper.tag("TD", row), () =>
          setLines(paper, [text], PAGE.left + left + width, y, style, "right"),
        );
      });
      const said = paper.tag("TR", table);
      paper.leaf("TD", paper.tag("TD", said), () =>
        setLines(paper, sentence.lines, PAGE.left, y + name.height, STYLES.sentence),
      );
      paper.leaf("Figure", figure, () => drawBars(paper, layout, line, top, height));
    },
  };
}

function headStrip(paper: Paper, tags: () => { table: Tag }, layout: Layout): Strip {
  const boxes = layout.heads.map((head, index) =>
    fitText(paper, head, STYLES.head, layout.columns[index]!.width - 1.4, 4),
  );
  const first = fitText(paper, "Attribute included, unit of change", STYLES.head, layout.left - 1);
  const height = Math.max(first.height, ...boxes.map((box) => box.height)) + 1;
  return {
    height,
    draw: (top) => {
      const row = paper.tag("TR", tags().table);
      const bottom = top + height - 1;
      paper.artifact(() => {
        paper.line(PAGE.left, top + height, PAGE.right, top + height, RULES.head, INK);
        for (const tick of layout.ticks) {
          paper.tickLabel(tickText(tick), layout.scale(tick), bottom - 0.2, STYLES.axis);
        }
      });
      const head = (lines: typeof first.lines, x: number, boxHeight: number, align: "left" | "right"): void =>
        paper.leaf("TH", paper.tag("TH", row, { scope: "Column" }), () =>
          setLines(paper, lines, x, bottom - boxHeight, STYLES.head, align),
        );
      head(first.lines, PAGE.left, first.height, "left");
      boxes.forEach((box, index) => {
        const { left, width } = layout.columns[index]!;
        head(box.lines, PAGE.left + left + width, box.height, "right");
      });
    },
  };
}

interface LegendItem {
  readonly words: string;
  readonly sample: number;
  draw(x: number, y: number): void;
}

function legendItems(paper: Paper, table: LedgerTable): LegendItem[] {
  return [
    { words: "own part", sample: 4, draw: (x, y) => paper.rect(x, y, 4, 1.9, { fill: SLATE }) },
    ...table.carriedHeads.map((head, index) => ({
      words: `carried for ${head}`,
      sample: 4,
      draw: (x: number, y: number) => carriedBar(paper, index, x, y, 4, 1.9),
    })),
    { words: "as used here", sample: 1.8, draw: (x, y) => diamond(paper, x + 0.9, y + 0.95) },
  ];
}

/** What the bars mean; as many lines as it takes. */
function legendStrip(paper: Paper, table: LedgerTable): Strip {
  const style = STYLES.note;
  const places: { item: LegendItem; words: string; x: number; line: number }[] = [];
  let [x, line] = [0, 0];
  for (const item of legendItems(paper, table)) {
    const words = fitText(paper, item.words, style, TEXT_WIDTH - item.sample - 1, 1)
      .lines[0]!.map(({ text }) => text)
      .join("");
    const width = item.sample + 1 + paper.typeface.width(words, style);
    if (x > 0 && x + width > TEXT_WIDTH) {
      x = 0;
      line += 1;
    }
    places.push({ item, words, x, line });
    x += width + 3;
  }
  return {
    height: (line + 1) * mm(style.leading) + 1.4,
    draw: (top) => {
      for (const place of places) {
        const baseline = top + 1.4 + place.line * mm(style.leading) + baselineOf(style);
        const left = PAGE.left + place.x;
        paper.artifact(() => place.item.draw(left, baseline - 1.8));
        paper.leaf("P", paper.tag("P"), () => {
          paper.text(place.words, left + place.item.sample + 1, baseline, style);
        });
      }
    },
  };
}

/** The ledger's rows, and the legend that goes with its bars. */
export function ledgerBands(paper: Paper, table: LedgerTable): Band[] {
  const layout = layoutOf(paper, table);
  let made: { table: Tag; figure: Tag } | null = null;
  const tags = (): { table: Tag; figure: Tag } => {
    made ??= { table: paper.tag("Table"), figure: paper.tag("Figure", paper.root, { alt: table.alt }) };
    return made;
  };
  return [
    { head: headStrip(paper, tags, layout), strips: table.lines.map((line) => rowStrip(paper, tags, layout, line)) },
    { head: null, strips: [legendStrip(paper, table)] },
  ];
}
