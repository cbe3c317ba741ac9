/**
 * Market movement: nothing, a straight line in months since the first sale, a level for each calendar quarter, or a curve over
 * the days of sale. Quarters with few sales are taken together with the one before, and said.
 */
import { MARKET_KEY } from "../domain/attribute.ts";
import { DAYS_PER_MONTH, dayOf } from "../domain/day.ts";
import { formatDay, formatNumber, listWords } from "../domain/format.ts";
import type { MarketForm } from "../domain/priceModel.ts";
import { indicator } from "../numerics/column.ts";
import { naturalSpline, splineColumns, splineKnots } from "../numerics/naturalSpline.ts";
import type { AttributeGroup, DesignColumn } from "./fit.ts";

type Column = Pick<DesignColumn, "level" | "values">;

export interface MarketColumns {
  readonly columns: readonly Column[];
  readonly group: Omit<AttributeGroup, "columns">;
  readonly notes: readonly string[];
}

const PLAIN = {
  key: MARKET_KEY,
  label: "Market movement",
  isMarket: true,
  merged: null,
  knots: [],
  reading: "reference",
  product: null,
  blend: null,
  decimals: 1,
} as const;

/** `soldOn`: n day numbers in ascending order, one at least. Null for no market movement. */
export function marketColumns(form: MarketForm, soldOn: Float64Array): MarketColumns | null {
  if (form === "none") return null;
  if (form === "quarters") return quarters(soldOn);
  return form === "spline" ? curve(soldOn) : line(soldOn);
}

function line(soldOn: Float64Array): MarketColumns {
  const first = soldOn[0]!;
  const monthsAt = (day: number): number => (day - first) / DAYS_PER_MONTH;
  const values = soldOn.map(monthsAt);
  return {
    columns: [{ level: null, values }],
    group: {
      ...PLAIN,
      form: "line",
      unit: "months",
      step: 12,
      stepWords: "12\u00a0months",
      reference: null,
      stored: values,
      numbersAt: (day) => [monthsAt(Number(day))],
    },
    notes: [],
  };
}

const KNOTS = 4;

/** A curve needs days that differ enough; else the straight line stands, and it is said. */
function curve(soldOn: Float64Array): MarketColumns {
  const first = soldOn[0]!;
  const monthsAt = (day: number): number => (day - first) / DAYS_PER_MONTH;
  const months = soldOn.map(monthsAt);
  let knots: number[];
  try {
    knots = splineKnots(months, KNOTS);
  } catch {
    const plain = line(soldOn);
    return {
      ...plain,
      notes: ["Market movement: too few different days of sale for a curve; a straight line stands."],
    };
  }
  const at = naturalSpline(knots);
  const columns = splineColumns(at, months, knots.length - 1);
  const day = (month: number): string => formatDay(dayOf(Math.round(first + month * DAYS_PER_MONTH)));
  return {
    columns: knots.slice(1).map((to, j) => ({
      level: `${day(knots[j]!)} to ${day(to)}`,
      values: columns[j]!,
    })),
    group: {
      ...PLAIN,
      form: "spline",
      unit: "months",
      step: 1,
      stepWords: null,
      reference: null,
      stored: months,
      knots,
      numbersAt: (value) => at(monthsAt(Number(value))),
    },
    notes: [],
  };
}

/** A quarter with fewer sales than this goes with the one before. Common practice, no source. */
const FEW_SALES = 3;

interface Quarter {
  /** "2024 Q3" */
  readonly name: string;
  count: number;
  readonly from: number;
}

/** "2024 Q3" */
export function quarterWords(quarter: number): string {
  return `${Math.floor(quarter / 4)} Q${(quarter % 4) + 1}`;
}

/** Quarters since year 0. */
export function quarterOf(day: number): number {
  const [year, month] = dayOf(day).split("-").map(Number) as [number, number];
  return year * 4 + Math.floor((month - 1) / 3);
}

function quarters(soldOn: Float64Array): MarketColumns {
  const own = Array.from(soldOn, quarterOf);
  const counts = new Map<number, number>();
  for (const quarter of own) counts.set(quarter, (counts.get(quarter) ?? 0) + 1);
  const kept: Quarter[] = [];
  const joined: string[] = [];
  for (const [quarter, count] of [...counts].sort((a, b) => a[0] - b[0])) {
    const name = quarterWords(quarter);
    const before = kept.at(-1);
    if (before !== undefined && (count < FEW_SALES || before.count < FEW_SALES)) {
      before.count += count;
      joined.push(name);
    } else kept.push({ name, count, from: quarter });
  }
  const placeOf = (day: number): number => {
    const quarter = quarterOf(day);
    let place = 0;
    while (place + 1 < kept.length && kept[place + 1]!.from <= quarter) place += 1;
    return place;
  };
  const places = new Map(own.map((quarter, i) => [quarter, placeOf(soldOn[i]!)]));
  const codes = Uint16Array.from(own, (quarter) => places.get(quarter)!);
  const columns = kept.slice(1).map(({ name }, at) => ({ level: name, values: indicator(codes, at + 1) }));
  const said = `Market movement: ${listWords(joined)} ${joined.length === 1 ? "goes" : "go"} with the quarter before, as one of the two has fewer than ${formatNumber(FEW_SALES)} sales.`;
  return {
    columns,
    group: {
      ...PLAIN,
      form: "choice",
      unit: null,
      step: 1,
      stepWords: null,
      reference: kept[0]!.name,
      stored: null,
      numbersAt: (day) => {
        const place = placeOf(Number(day));
        return columns.map((_, at) => (at + 1 === place ? 1 : 0));
      },
    },
    notes: joined.length === 0 ? [] : [said],
  };
}
