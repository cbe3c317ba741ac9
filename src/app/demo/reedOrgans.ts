/**
 * The second invented class, of quite another kind: reed organs, old instruments priced in pounds. Makers, places and figures are
 * made up. 92 rows: 90 sales, one that cannot be read, one without a price.
 */
import { dayNumber, dayOf } from "../../domain/day.ts";
import type { Channel } from "../../domain/sale.ts";
import { type Draw, drawFrom } from "./random.ts";
import { dayFirst, grouped, tableText, utf8 } from "./tableText.ts";

export const REED_ORGAN_HEADINGS = [
  "Ref",
  "Date sold",
  "Instrument",
  "Maker",
  "Built",
  "Stops",
  "Ranks",
  "Height (cm)",
  "Case",
  "Pedals",
  "Restored",
  "Channel",
  "Sold for",
  "Remarks",
] as const;

export const ORGAN_MAKERS = ["Aldenby", "Corvane", "Mostyn & Hale"] as const;
export const ORGAN_CASES = ["plain", "carved", "high back"] as const;

const MAKER_EFFECT = { Aldenby: 0, Corvane: -0.18, "Mostyn & Hale": 0.22 } as const;
const CASE_EFFECT = { plain: 0, carved: 0.14, "high back": 0.21 } as const;
const CHANNEL_EFFECT: Readonly<Record<Channel, number>> = { auction: 0, dealer: 0.24, private: 0.05, asking: 0.3 };

const COUNT = 90;

function organRow(soldOn: string, k: number, draw: Draw): string[] {
  const maker = draw.pick(ORGAN_MAKERS);
  const organCase = draw.weighted([
    ["plain" as const, 5],
    ["carved" as const, 3],
    ["high back" as const, 3],
  ]);
  const channel = draw.weighted<Channel>([
    ["auction", 55],
    ["dealer", 20],
    ["private", 18],
    ["asking", 7],
  ]);
  const builtYear = draw.whole(1868, 1921);
  const ranks = draw.whole(2, 5);
  const stops = 2 * ranks + draw.whole(2, 6);
  const height = organCase === "high back" ? draw.whole(190, 228) : draw.whole(98, 128);
  const pedals = ranks >= 4 && draw.chance(0.45);
  const restored = draw.chance(0.35);
  const years = (dayNumber(soldOn)! - dayNumber("2023-06-01")!) / 365.2425;
  const lnPrice =
    5.55 +
    0.045 * stops +
    0.16 * ranks +
    0.0035 * (1921 - builtYear) +
    (pedals ? 0.35 : 0) +
    (restored ? 0.42 : 0) +
    MAKER_EFFECT[maker] +
    CASE_EFFECT[organCase] +
    CHANNEL_EFFECT[channel] -
    0.015 * years +
    0.17 * draw.normal();
  const price = Math.round(Math.exp(lnPrice) / 5) * 5;
  return [
    `RO-${String(k + 1).padStart(3, "0")}`,
    dayFirst(soldOn, "/"),
    `${maker} ${ranks}-rank ${pedals ? "pedal organ" : "parlour organ"}`,
    maker,
    String(builtYear),
    String(stops),
    String(ranks),
    String(height),
    organCase,
    pedals ? "yes" : "no",
    restored ? "yes" : "no",
    channel,
    grouped(price, ","),
    "",
  ];
}

export function reedOrganFile(): Uint8Array {
  const draw = drawFrom(1_889);
  const [first, last] = [dayNumber("2023-06-03")!, dayNumber("2026-05-23")!];
  const days = Array.from({ length: COUNT }, () => draw.whole(first, last)).sort((a, b) => a - b);
  const rows = days.map((day, k) => organRow(dayOf(day), k, draw));
  const unreadable = [...organRow(dayOf(first + 400), 900, draw)];
  unreadable[5] = "1l";
  const unpriced = [...organRow(dayOf(first + 700), 901, draw)];
  unpriced[12] = "unsold";
  rows.splice(30, 0, unreadable);
  rows.splice(61, 0, unpriced);
  return utf8(tableText([[...REED_ORGAN_HEADINGS], ...rows], ",", "\n"));
}
