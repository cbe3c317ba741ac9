/** The sales that move the price most: one row each, with a bar that runs up (solid) or down (hatched) from the middle. */
import type { PullLine, PullTable } from "../sheetContent.ts";
import { type Cell, type Column, columnWidth, headWidth, type Row, Table } from "./cells.ts";
import type { Band } from "./flow.ts";
import { PAGE, type Paper, TEXT_WIDTH } from "./paper.ts";
import { INK, SLATE, STYLES } from "./styles.ts";
import type { Style } from "./typeface.ts";

const PICTURE = 24;
const BREATH = 2.4;

interface Wanted {
  readonly head: string;
  readonly align: "left" | "right";
  readonly style: Style;
  readonly text: (line: PullLine) => string;
}

function wantedColumns(table: PullTable): Wanted[] {
  const { currencySign: sign } = table;
  const left = (head: string, text: Wanted["text"], style: Style = STYLES.cell): Wanted => ({
    head,
    align: "left",
    style,
    text,
  });
  const right = (head: string, text: Wanted["text"]): Wanted => ({ head, align: "right", style: STYLES.cell, text });
  return [
    left("Sale", (line) => line.sale, STYLES.cellBold),
    left("Sold on", (line) => line.soldOn),
    left("Item", (line) => line.title),
    ...table.attributeHeads.map((head, index) => right(head, (line) => line.values[index] ?? "")),
    left("Channel", (line) => line.channel),
    right(`Price, ${sign}`, (line) => line.price),
    right("Pull, %", (line) => line.pull),
    right(`Price without it, ${sign}`, (line) => line.priceWithout),
    right(`Moves price by, ${sign}`, (line) => line.moves),
    left("Verified", (line) => line.verified),
  ];
}

const ITEM = 2;
/** The item's name and the bars keep at least this much; attributes give way to them. mm */
const LEAST = { item: 22, picture: 18 } as const;

interface Layout {
  readonly wanted: readonly Wanted[];
  readonly columns: readonly Column[];
  readonly picture: number;
  readonly middle: number;
}

function widthsOf(paper: Paper, table: PullTable, wanted: readonly Wanted[]): number[] {
  const widths = wanted.map(({ head, style, text }) =>
    Math.max(headWidth(paper, head), columnWidth(paper, table.lines.map(text), style)),
  );
  const pull = wanted.length - 4;
  const pulls = [table.total.pull, ...(table.rest === null ? [] : [table.rest.pull])];
  widths[pull] = columnWidth(paper, pulls, STYLES.cellBold, widths[pull]);
  widths[pull + 1] = columnWidth(paper, [table.total.price], STYLES.cellBold, widths[pull + 1]);
  widths[0] = Math.min(widths[0]!, 24);
  return widths;
}

/** Every column gets what it needs; where that leaves no room, the last attributes are not shown. */
function layoutOf(paper: Paper, table: PullTable): Layout {
  const all = wantedColumns(table);
  for (let shown = table.attributeHeads.length; ; shown--) {
    const wanted = all.filter(
      (_, index) => index <= ITEM || index > ITEM + table.attributeHeads.length || index <= ITEM + shown,
    );
    const widths = widthsOf(paper, table, wanted);
    const others = widths.reduce((sum, width, index) => sum + (index === ITEM ? 0 : width), 0) + BREATH * wanted.length;
    const room = TEXT_WIDTH - others;
    if (room < LEAST.item + LEAST.picture && shown > 0) continue;
    const picture = Math.max(10, Math.min(PICTURE, room - LEAST.item));
    const item = Math.max(8, room - picture);
    widths[ITEM] = Math.min(item, Math.max(widths[ITEM]!, 14));
    return placed(wanted, widths, picture, item - widths[ITEM]!);
  }
}

function placed(wanted: readonly Wanted[], widths: readonly number[], picture: number, spare: number): Layout {
  let left = 0;
  const columns = wanted.map(({ align }, index): Column => {
    if (index === wanted.length - 1) left += picture;
    const column: Column = { left, width: widths[index]!, align };
    left += widths[index]! + BREATH + spare / wanted.length;
    return column;
  });
  const last = columns[columns.length - 1]!;
  return { wanted, columns, picture, middle: PAGE.left + last.left - BREATH / 2 - picture / 2 };
}

/** Bands: the table with its picture column between "moves" and "verified". */
export function pullBand(paper: Paper, table: PullTable): Band {
  const { wanted, columns, picture, middle } = layoutOf(paper, table);
  const largest = Math.max(0, ...table.lines.map(({ movesMoney }) => Math.abs(movesMoney ?? 0)));
  const drawn = new Table(paper, columns, table.lines.length > 0 ? table.alt : null);
  const half = picture / 2 - 2.4;
  const bar = (line: PullLine, top: number, height: number): void => {
    paper.line(middle, top, middle, top + height, 0.6, INK);
    if (line.movesMoney === null || largest === 0) return;
    const length = (Math.abs(line.movesMoney) / largest) * half;
    const y = top + height / 2 - 0.85;
    if (length < 0.05) return;
    if (line.movesMoney < 0) paper.hatch(middle - length, y, length, 1.7, SLATE);
    else paper.rect(middle, y, length, 1.7, { fill: SLATE, stroke: SLATE, width: 0.75 });
  };
  const head: Row = {
    cells: wanted.map(({ head: rich }) => ({ rich })),
    minHeight: 4,
    pad: 0.9,
    rule: "ink",
    picture: (top, height) => {
      if (table.lines.length === 0) return;
      paper.text("down", middle - 1.4, top + height - 1.6, STYLES.head, "right");
      paper.text("up", middle + 1.4, top + height - 1.6, STYLES.head);
    },
  };
  const rows = table.lines.map(
    (line, index): Row => ({
      cells: wanted.map(({ text, style }) => ({ rich: text(line), style })),
      minHeight: 5,
      pad: 0.8,
      rule: index === table.lines.length - 1 && table.rest === null ? "ink" : "hair",
      picture: (top, height) => bar(line, top, height),
    }),
  );
  return drawn.band(head, [...rows, ...totalRows(table, wanted.length)]);
}

function totalRows(table: PullTable, count: number): Row[] {
  const toPull = count - 4;
  const rest: Row[] =
    table.rest === null
      ? []
      : [
          {
            cells: [{ rich: table.rest.words, span: toPull }, { rich: table.rest.pull }],
            minHeight: 5,
            pad: 0.8,
            rule: "hair",
          },
        ];
  const bold = (rich: string, span = 1): Cell => ({ rich, span, style: STYLES.cellBold });
  const total: Row = {
    cells: [bold(table.total.words, toPull), bold(table.total.pull), bold(table.total.price)],
    minHeight: 5,
    pad: 0.8,
    rule: "ink",
  };
  return [...rest, total];
}
