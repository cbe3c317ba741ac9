// The figures as a table for the terminal: one line a figure, under the work it belongs to.
import { type Figure, isMet, type Missing, median } from "./measure.ts";
import { ROWS } from "./rows.ts";

/** Three significant digits, never in powers of ten. */
export function shortNumber(value: number): string {
  if (!Number.isFinite(value)) return String(value);
  if (value === 0) return "0";
  const decimals = Math.max(0, 2 - Math.floor(Math.log10(Math.abs(value))));
  return value.toFixed(Math.min(decimals, 6));
}

function verdict(figure: Figure): string {
  const met = isMet(figure);
  return met === null ? "" : met ? "met" : "NOT MET";
}

function reachText({ reach, better, unit }: Figure): string {
  return reach === null ? "" : `${better === "more" ? "≥" : "≤"} ${shortNumber(reach)} ${unit}`;
}

function timesText({ oursMs, referenceMs }: Figure): string {
  if (oursMs === undefined || referenceMs === undefined) return "";
  return `${shortNumber(median(oursMs))} ms, reference ${shortNumber(median(referenceMs))} ms`;
}

const HEADINGS = ["against / what", "figure", "spread", "reach", "", "medians"];

function cellsOf(figure: Figure): string[] {
  const value = `${shortNumber(figure.value)} ${figure.unit}`;
  const spread = figure.low === figure.high ? "" : `${shortNumber(figure.low)}–${shortNumber(figure.high)}`;
  return [`  ${figure.what}`, value, spread, reachText(figure), verdict(figure), timesText(figure)];
}

/** The table by rows in their order, what is missing in capitals beside them; rows without either are left out. */
export function tableOf(figures: readonly Figure[], missing: readonly Missing[]): string {
  const blocks = ROWS.map(({ id, work }) => ({
    work,
    lines: figures.filter(({ row }) => row === id).map(cellsOf),
    gaps: missing.filter(({ row }) => row === id).map(({ what, why }) => `  ${what}: SKIPPED — ${why}`),
  })).filter(({ lines, gaps }) => lines.length + gaps.length > 0);
  const all = [HEADINGS, ...blocks.flatMap(({ lines }) => lines)];
  const widths = HEADINGS.map((_, at) => Math.max(...all.map((cells) => cells[at]!.length)));
  const line = (cells: readonly string[]): string =>
    cells
      .map((cell, at) => cell.padEnd(widths[at]!))
      .join("  ")
      .trimEnd();
  return [line(HEADINGS), ...blocks.flatMap(({ work, lines, gaps }) => ["", work, ...lines.map(line), ...gaps])].join(
    "\n",
  );
}
