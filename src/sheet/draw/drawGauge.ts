/**
 * The range gauge: price as an upright stroke through a ruler; ranges for one sale above it, the same levels for the average
 * below it, on one scale. Thickness and label tell the levels apart, not colour.
 */
import { formatNumber } from "../../domain/format.ts";
import type { Gauge, GaugeRange } from "../sheetContent.ts";
import { PAGE, type Paper } from "./paper.ts";
import { type Scale, scaleOf, tickStep, ticksBetween } from "./scale.ts";
import { INK, RULE, SLATE, SOFT, VERDIGRIS, WHITE } from "./styles.ts";
import type { Style } from "./typeface.ts";

const text = (size: number, color = INK, face: Style["face"] = "sans"): Style => ({
  face,
  size,
  color,
  leading: size * 1.25,
});
const T = {
  price: text(9.4, INK, "sansBold"),
  heading: text(7.4, INK, "sansBold"),
  label: text(7.4),
  soft: text(7.4, SOFT),
  end: text(8.5, INK, "sansMedium"),
  endSmall: text(7.4),
  axis: text(7.1, SOFT),
  small: text(6.8, SOFT),
} as const;

const ROW = 5.5;
const AVERAGE_ROW = 4.1;
/** Ruler's ends, from the left margin. */
const RULER = { left: 33, right: 172.6 } as const;

export function gaugeHeight(gauge: Gauge, trim: number): number {
  const above = Math.max(1, gauge.oneSale.length);
  const below = Math.max(1, gauge.average.length);
  return 7.2 + (above - 1) * ROW + 5.8 + 9.4 + (below - 1) * AVERAGE_ROW + 2 - trim;
}

interface Rows {
  readonly scale: Scale;
  /** Text end of the labels on the left; a percent label that would run into them goes to the right of its range. */
  readonly labelEnd: number;
}

/** A scale on which every end has room for its figure. */
function layout(paper: Paper, gauge: Gauge): Rows {
  const width = (words: string, style: Style): number => paper.typeface.width(words, style);
  const rows = gauge.oneSale;
  const ends = [...rows, ...gauge.average].flatMap(({ low, high }) => [low, high]);
  const low = Math.min(gauge.price, ...ends);
  const high = Math.max(gauge.price, ...ends);
  const pad = high > low ? 0 : Math.max(1, Math.abs(gauge.price) * 0.1);
  const labelEnd = Math.max(
    width(gauge.averageHeading, T.heading),
    ...rows.map(({ words }) => 7.2 + width(words, T.soft)),
  );
  const lowWidth = Math.max(9, ...rows.map(({ lowText }) => width(lowText, T.end)));
  const highWidth = Math.max(9, ...rows.map(({ highText }) => width(highText, T.end)));
  const left = PAGE.left + Math.max(42.3, labelEnd + 3.4 + lowWidth);
  const right = PAGE.right - Math.max(14.4, highWidth + 2);
  return { scale: scaleOf(low - pad, high + pad, left, right), labelEnd: PAGE.left + labelEnd };
}

function ruler(paper: Paper, gauge: Gauge, scale: Scale, y: number): void {
  const [left, right] = [PAGE.left + RULER.left, PAGE.left + RULER.right];
  const perMm = (scale.to - scale.from) / (scale(scale.to) - scale(scale.from));
  const from = scale.from - (scale(scale.from) - left) * perMm;
  const to = scale.to + (right - scale(scale.to)) * perMm;
  const major = tickStep((to - from) / 2.4);
  const minor = major / 5;
  paper.line(left - 0.2, y, right, y, 1.1, INK);
  const length = (value: number, step: number): boolean => Math.abs(value / step - Math.round(value / step)) < 1e-6;
  for (const value of ticksBetween(from, to, minor / 4)) {
    const x = scale(value);
    if (length(value, major)) {
      paper.line(x, y, x, y + 2.6, 0.95, INK);
      const words = formatNumber(value, major < 1 ? 2 : 0);
      const half = paper.typeface.width(words, T.axis) / 2;
      if (x + half > PAGE.right || x - half < left) continue;
      paper.rect(x - half - 0.5, y + 3, 2 * half + 1, 2.8, { fill: WHITE });
      paper.text(words, x, y + 5.2, T.axis, "middle");
    } else if (length(value, minor)) paper.line(x, y, x, y + 1.9, 0.7, INK);
    else if (length(value, minor / 2)) paper.line(x, y, x, y + 1.3, 0.45, INK);
    else paper.line(x, y, x, y + 0.7, 0.3, INK);
  }
  paper.text(gauge.currencyCode, left - 1.4, y + 1.4, T.small, "right");
}

/** Thickness by place: the narrowest range is the thickest. pt */
const thickness = (fromWidest: number, count: number): number => {
  const fromNarrowest = count - 1 - fromWidest;
  return fromNarrowest === 0 ? 5 : fromNarrowest === 1 ? 2.3 : 1.15;
};

function bar(
  paper: Paper,
  scale: Scale,
  range: GaugeRange,
  y: number,
  look: { width: number; cap: number; color: string },
): void {
  const [low, high] = [scale(range.low), scale(range.high)];
  paper.line(low, y, high, y, look.width, look.color);
  for (const x of [low, high]) paper.line(x, y - look.cap, x, y + look.cap, 1.1, look.color);
}

function oneSale(paper: Paper, gauge: Gauge, { scale }: Rows, top: number, rulerY: number): void {
  const rows = gauge.oneSale;
  paper.text(gauge.oneSaleHeading, PAGE.left, top + 2.4, T.heading);
  rows.forEach((range, index) => {
    const y = top + 7.2 + index * ROW;
    for (const x of [scale(range.low), scale(range.high)]) paper.line(x, y, x, rulerY, 0.6, RULE, [0.6, 1.7]);
  });
  rows.forEach((range, index) => {
    const y = top + 7.2 + index * ROW;
    bar(paper, scale, range, y, { width: thickness(index, rows.length), cap: 1.4, color: VERDIGRIS });
    paper.text(range.label, PAGE.left, y + 0.9, T.label);
    paper.text(range.words, PAGE.left + 7.2, y + 0.9, T.soft);
    paper.text(range.lowText, scale(range.low) - 1.4, y + 1, T.end, "right");
    paper.text(range.highText, scale(range.high) + 1.4, y + 1, T.end);
  });
}

function average(paper: Paper, gauge: Gauge, { scale, labelEnd }: Rows, rulerY: number): void {
  const rows = gauge.average;
  const first = rulerY + 9.4;
  if (rows.length === 0) return;
  paper.text(gauge.averageHeading, PAGE.left, first + 0.9, T.heading);
  paper.typeface.wrap(gauge.averageWords, T.small, 24).forEach((line, index) => {
    paper.text(line, PAGE.left, first + 4.3 + index * 2.9, T.small);
  });
  rows.forEach((range, index) => {
    const y = first + index * AVERAGE_ROW;
    const width = thickness(rows.length - 1 - index, rows.length) * 0.8;
    bar(paper, scale, range, y, { width, cap: 1.1, color: SLATE });
    const lowWidth = paper.text(range.lowText, scale(range.low) - 1.4, y + 0.9, T.endSmall, "right");
    const highWidth = paper.text(range.highText, scale(range.high) + 1.4, y + 0.9, T.endSmall);
    const at = scale(range.low) - 1.4 - lowWidth - 3;
    const percent = paper.typeface.width(range.label, T.soft);
    if (at - percent > labelEnd + 1) paper.text(range.label, at, y + 0.9, T.soft, "right");
    else if (scale(range.high) + 1.4 + highWidth + 2 + percent <= PAGE.right) {
      paper.text(range.label, scale(range.high) + 1.4 + highWidth + 2, y + 0.9, T.soft);
    } else paper.text(range.label, scale(range.high) - 1, y - 0.9, T.soft, "right");
  });
}

/** Draws the gauge with its top at `top`; one figure with its numbers in words. */
export function drawGauge(paper: Paper, gauge: Gauge, top: number, trim: number): void {
  const rows = layout(paper, gauge);
  const rulerY = top + 7.2 + Math.max(0, gauge.oneSale.length - 1) * ROW + 5.8 - trim / 2;
  paper.leaf("Figure", paper.tag("Figure", paper.root, { alt: gauge.alt }), () => {
    oneSale(paper, gauge, rows, top, rulerY);
    average(paper, gauge, rows, rulerY);
    const x = rows.scale(gauge.price);
    const end = rulerY + 9.4 + Math.max(0, gauge.average.length - 1) * AVERAGE_ROW + 0.7;
    paper.line(x, top + 3.2, x, end, 1.1, INK);
    ruler(paper, gauge, rows.scale, rulerY);
    paper.polygon(
      [
        [x - 1.4, top + 3.2],
        [x + 1.4, top + 3.2],
        [x, top + 5.6],
      ],
      { fill: INK },
    );
    paper.text(gauge.priceText, x, top + 2.2, T.price, "middle");
  });
}
