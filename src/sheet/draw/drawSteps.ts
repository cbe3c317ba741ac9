/**
 * "How the price is built": the table and, through its rows, the path from the average sale to the price. Up is solid, down is
 * hatched; connectors meet because a row's picture spans the row.
 */
import { formatNumber } from "../../domain/format.ts";
import type { StepRow, StepsTable } from "../sheetContent.ts";
import { type Cell, type Column, columnWidth, type Row, Table } from "./cells.ts";
import type { Band } from "./flow.ts";
import { PAGE, type Paper, TEXT_WIDTH } from "./paper.ts";
import { roomyTicks, type Scale, scaleOf } from "./scale.ts";
import { HAIR, INK, SLATE, STYLES, VERDIGRIS, WHITE } from "./styles.ts";

const PICTURE = 54;
const PAD = 3;
const ROW = 5;

/** Figures take what they need from the right; words share the rest. */
function columnsOf(paper: Paper, table: StepsTable): Column[] {
  const texts = (pick: (row: StepRow) => string, head: string): number =>
    Math.max(columnWidth(paper, table.rows.map(pick), STYLES.cellBold), paper.typeface.width(head, STYLES.head)) + 2.8;
  const [, , , factorHead, stepHead, standsHead] = table.heads;
  const stands = texts((row) => row.standsAt, standsHead);
  const step = texts((row) => row.step, stepHead);
  const factor = table.hasFactors ? texts((row) => row.factor, factorHead) : 0;
  const figures = TEXT_WIDTH - PICTURE - PAD - stands - step - factor;
  const shares = [0.42, 0.27, 0.31];
  const words: Column[] = shares.map((share, index) => ({
    left: figures * shares.slice(0, index).reduce((sum, one) => sum + one, 0),
    width: figures * share - 1.4,
    align: "left",
  }));
  const right = (left: number, width: number): Column => ({ left, width, align: "right" });
  return [
    ...words,
    ...(table.hasFactors ? [right(figures, factor)] : []),
    right(figures + factor, step),
    right(figures + factor + step, stands),
  ];
}

function moneyScale(table: StepsTable): Scale {
  const values = table.rows.flatMap(({ from, to }) => [from, to]);
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const pad = (high - low) * 0.06 || Math.max(1, Math.abs(high) * 0.05);
  return scaleOf(low - pad, high + pad, PAGE.right - PICTURE + 4, PAGE.right - 4);
}

interface Picture {
  readonly paper: Paper;
  readonly scale: Scale;
  readonly ticks: readonly number[];
}

function drawRow({ paper, scale, ticks }: Picture, row: StepRow, isLast: boolean, top: number, height: number): void {
  for (const tick of ticks) paper.line(scale(tick), top, scale(tick), top + height, 0.5, HAIR);
  const [from, to, middle] = [scale(row.from), scale(row.to), top + height / 2];
  const half = 1.25;
  if (row.kind === "start") {
    paper.line(to, middle, to, top + height, 0.6, INK);
    paper.circle(to, middle, 0.95, { fill: SLATE });
    return;
  }
  if (row.kind === "median" || row.kind === "price" || Math.abs(to - from) < 0.02) {
    paper.line(to, top, to, isLast ? middle : top + height, 0.6, INK);
    if (row.kind === "median") paper.circle(to, middle, 0.95, { fill: WHITE, stroke: VERDIGRIS, width: 1.4 });
    if (row.kind === "price") paper.circle(to, middle, 1.05, { fill: VERDIGRIS });
    return;
  }
  paper.line(from, top, from, middle - half, 0.6, INK);
  paper.line(to, middle + half, to, top + height, 0.6, INK);
  const [left, width] = [Math.min(from, to), Math.abs(to - from)];
  if (to < from) paper.hatch(left, middle - half, width, 2 * half, VERDIGRIS);
  else paper.rect(left, middle - half, width, 2 * half, { fill: VERDIGRIS, stroke: VERDIGRIS, width: 0.75 });
}

function cellsOf(row: StepRow, hasFactors: boolean): Cell[] {
  const bold = row.kind === "start" || row.kind === "median" || row.kind === "price";
  const words = bold ? STYLES.cellBold : STYLES.cell;
  const cell = (rich: string, style = STYLES.cell as Cell["style"]): Cell =>
    style === undefined ? { rich } : { rich, style };
  const figures = [...(hasFactors ? [cell(row.factor)] : []), cell(row.step), cell(row.standsAt, words)];
  if (bold) return [{ rich: row.label, style: words, span: 3 }, ...figures];
  if (row.subject === "") return [cell(row.label), { rich: row.average, span: 2 }, ...figures];
  return [cell(row.label), cell(row.average), cell(row.subject), ...figures];
}

export function stepsBand(paper: Paper, table: StepsTable): Band {
  const columns = columnsOf(paper, table);
  const scale = moneyScale(table);
  const label = (tick: number): string => formatNumber(tick, tick % 1 === 0 ? 0 : 2);
  const ticks = roomyTicks(scale, 3, (tick) => paper.typeface.width(label(tick), STYLES.axis));
  const picture: Picture = { paper, scale, ticks };
  const drawn = new Table(paper, columns, table.alt);
  const heads = table.heads.filter((_, index) => index !== 3 || table.hasFactors);
  const head: Row = {
    cells: heads.map((rich) => ({ rich })),
    minHeight: 4,
    pad: 0.9,
    rule: "ink",
    picture: (top, height) => {
      for (const tick of ticks) paper.tickLabel(label(tick), scale(tick), top + height - 0.9, STYLES.axis);
    },
  };
  const rows = table.rows.map(
    (row, index): Row => ({
      cells: cellsOf(row, table.hasFactors),
      minHeight: ROW,
      pad: 0.8,
      rule: row.kind === "price" || table.rows[index + 1]?.kind === "median" ? "ink" : "hair",
      picture: (top, height) => drawRow(picture, row, index === table.rows.length - 1, top, height),
    }),
  );
  return drawn.band(head, rows);
}
