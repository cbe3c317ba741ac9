/**
 * How two attributes move together among the sales in use, and with the other attributes in the fit alike.
 * Partial slope: b regressed on a and the other columns in the fit; partial correlation: the two residuals' own,
 * r = ±√(β_ba·β_ab) (Goldberger 1991, ch. 17). At the weights of the fit.
 */
import {
  type AttributePair,
  type Ends,
  MOST_POINTS,
  type PairAxis,
  type PairPicture,
} from "../domain/attributePair.ts";
import { formatNumber, lowerStart } from "../domain/format.ts";
import type { AttributeGroup, Fit } from "../hedonic/fit.ts";
import { type Column, numbersOf } from "../numerics/column.ts";
import { NumericsError } from "../numerics/numericsError.ts";
import { solveLeastSquares } from "../numerics/solveLeastSquares.ts";

export interface AttributePairInput {
  readonly fit: Fit;
  readonly a: string;
  readonly b: string;
  /** The item's raw values on the two attributes, null where not known. */
  readonly subject: readonly [number | null, number | null];
}

/** Beyond so many sales they are counted in cells. */
const MOST_SINGLE = 5000;
const ACROSS = 40;
const DOWN = 26;

/** Null for two attributes that are no numbers, or for keys that the design has not. */
export function attributePair({ fit, a, b, subject }: AttributePairInput): AttributePair | null {
  const first = fit.design.groups.find(({ key }) => key === a);
  const second = fit.design.groups.find(({ key }) => key === b);
  if (first === undefined || second === undefined || first === second) return null;
  if (first.stored !== null && second.stored !== null) return ofNumbers(fit, first, second, subject);
  if (first.stored === null && second.stored === null) return null;
  return first.stored === null ? ofLevels(fit, first, second) : ofLevels(fit, second, first);
}

function axisOf({ key, label, unit, decimals }: AttributeGroup): PairAxis {
  return { key, label, unit, decimals };
}

function ofNumbers(
  fit: Fit,
  a: AttributeGroup,
  b: AttributeGroup,
  [x, y]: AttributePairInput["subject"],
): AttributePair {
  const [xs, ys] = [a.stored!, b.stored!];
  const rest = fit.groups.filter(({ key }) => key !== a.key && key !== b.key);
  const others = rest.flatMap(({ columns }) => columns.map((column) => fit.design.columns[column]!.values));
  const alone = slopesOf(xs, ys, [], fit.rule.weights);
  const alike = slopesOf(xs, ys, others, fit.rule.weights);
  const isLine = a.form === "line" && a.stepWords !== null;
  const step = isLine ? a.step : 1;
  const stepWords = isLine ? a.stepWords! : `1${a.unit === null ? "" : ` ${a.unit}`}`;
  const slope = alike === null ? null : alike.forth * step;
  const found = {
    a: axisOf(a),
    b: axisOf(b),
    picture: pictureOf(xs, ys),
    sales: xs.length,
    correlation: correlationOf(alone),
    partialCorrelation: correlationOf(alike),
    slope,
    stepWords,
    subject: x === null || y === null ? null : ([x, y] as const),
  };
  return { ...found, sentence: sentenceOf(found) };
}

/** Slopes of y on x and of x on y, the others alike; null where x or y is made of the others. */
function slopesOf(
  xs: Float64Array,
  ys: Float64Array,
  others: readonly Column[],
  weights: Float64Array | null,
): { forth: number; back: number } | null {
  const options = { intercept: true, ...(weights === null ? {} : { weights }) };
  try {
    const forth = solveLeastSquares([xs, ...others], ys, options).slopes[0]!;
    const back = solveLeastSquares([ys, ...others], xs, options).slopes[0]!;
    return { forth, back };
  } catch (cause) {
    if (!(cause instanceof NumericsError)) throw cause;
    return null;
  }
}

function correlationOf(slopes: { forth: number; back: number } | null): number | null {
  if (slopes === null) return null;
  const square = slopes.forth * slopes.back;
  return Math.sign(slopes.forth) * Math.sqrt(Math.min(1, Math.max(0, square)));
}

function pictureOf(xs: Float64Array, ys: Float64Array): PairPicture {
  const n = xs.length;
  if (n > MOST_SINGLE) return cellsOf(xs, ys);
  const drawn = Math.min(n, MOST_POINTS);
  const points = Array.from({ length: drawn }, (_, k) => {
    const i = Math.floor((k * n) / drawn);
    return [xs[i]!, ys[i]!] as const;
  });
  return { kind: "points", points };
}

function cellsOf(xs: Float64Array, ys: Float64Array): PairPicture {
  const [x, y] = [endsOf(xs), endsOf(ys)];
  const cell = (value: number, { low, high }: Ends, count: number): number =>
    high === low ? 0 : Math.min(count - 1, Math.floor(((value - low) / (high - low)) * count));
  const counts = new Array<number>(ACROSS * DOWN).fill(0);
  for (let i = 0; i < xs.length; i++) {
    const at = cell(ys[i]!, y, DOWN) * ACROSS + cell(xs[i]!, x, ACROSS);
    counts[at] = counts[at]! + 1;
  }
  return { kind: "cells", across: ACROSS, down: DOWN, counts, x, y };
}

function endsOf(values: Float64Array): Ends {
  return values.reduce((ends, value) => ({ low: Math.min(ends.low, value), high: Math.max(ends.high, value) }), {
    low: Number.POSITIVE_INFINITY,
    high: Number.NEGATIVE_INFINITY,
  });
}

/** "Among these sales each extra 1,000 h of hours comes with 1.3 more years of age, the others in the set alike." */
function sentenceOf({ a, b, slope, stepWords }: Pick<AttributePair, "a" | "b" | "slope" | "stepWords">): string {
  if (slope === null) {
    return `${a.label} and ${lowerStart(b.label)} cannot be told apart beside the other attributes in the set.`;
  }
  const size = Math.abs(slope);
  const decimals = size === 0 ? 0 : Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(size))));
  const unit = b.unit === null ? "" : ` ${b.unit}`;
  const more = `${formatNumber(size, decimals)}${unit} ${slope < 0 ? "less" : "more"}`;
  return `Among these sales ${stepWords} more of ${lowerStart(a.label)} comes with ${more} of ${lowerStart(b.label)}, the others in the set alike.`;
}

/** The mean of the number per level of the choice. */
function ofLevels(fit: Fit, choice: AttributeGroup, number: AttributeGroup): AttributePair | null {
  const found = [...levelsOf(fit, choice)].map(([level, rows]) => ({
    level,
    count: rows.length,
    mean: rows.reduce((sum, i) => sum + number.stored![i]!, 0) / rows.length,
  }));
  const levels = found.filter(({ count }) => count > 0).sort((one, other) => other.mean - one.mean);
  const [highest, lowest] = [levels[0], levels.at(-1)];
  if (highest === undefined || lowest === undefined) return null;
  const mean = (value: number): string =>
    `${formatNumber(value, number.decimals)}${number.unit === null ? "" : ` ${number.unit}`}`;
  return {
    a: { ...axisOf(choice), unit: null },
    b: axisOf(number),
    picture: { kind: "levels", levels },
    sales: number.stored!.length,
    correlation: null,
    partialCorrelation: null,
    slope: null,
    stepWords: null,
    subject: null,
    sentence: `Among these sales mean ${lowerStart(number.label)} goes from ${mean(lowest.mean)} (${lowerStart(choice.label)} ${lowest.level}) to ${mean(highest.mean)} (${highest.level}).`,
  };
}

/** Rows of each level; those in no column are of the reference level, or "no". */
function levelsOf({ design }: Fit, choice: AttributeGroup): Map<string, number[]> {
  const columns = choice.columns.map((column) => design.columns[column]!);
  const values = columns.map((column) => numbersOf(column.values));
  const names = columns.map(({ level }) => level ?? "yes");
  const rest = choice.reference ?? "no";
  const rows = new Map<string, number[]>([[rest, []], ...names.map((name): [string, number[]] => [name, []])]);
  for (let i = 0; i < design.n; i++) {
    const at = values.findIndex((one) => one[i] === 1);
    rows.get(at < 0 ? rest : names[at]!)!.push(i);
  }
  return rows;
}
