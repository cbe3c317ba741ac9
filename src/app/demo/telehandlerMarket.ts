/**
 * The invented telehandler market: makes, models, and how a price comes about. Makes, models, places and every figure are made
 * up; no real machine or sale stands behind any of them.
 */
import { DAYS_PER_YEAR, dayNumber, dayOf } from "../../domain/day.ts";
import type { Channel } from "../../domain/sale.ts";
import type { Draw } from "./random.ts";

export const MAKES = ["Tessaly", "Brannock", "Orveld", "Quern"] as const;
export type Make = (typeof MAKES)[number];

interface Model {
  readonly make: Make;
  readonly name: string;
  readonly liftM: number;
  readonly capacityT: number;
  readonly powerKw: number;
}

function model(make: Make, name: string, liftM: number, capacityT: number, powerKw: number): Model {
  return { make, name, liftM, capacityT, powerKw };
}

const MODELS: Readonly<Record<Make, readonly Model[]>> = {
  Tessaly: [
    model("Tessaly", "TH-622", 5.9, 2.2, 70),
    model("Tessaly", "TH-633", 6.1, 3.3, 84),
    model("Tessaly", "TH-740", 7.0, 4.0, 97),
    model("Tessaly", "TH-736", 7.0, 3.6, 89),
    model("Tessaly", "TH-936", 9.2, 3.6, 93),
    model("Tessaly", "TH-1438", 13.6, 3.8, 94),
  ],
  Brannock: [
    model("Brannock", "BR 61-30", 6.1, 3.0, 83),
    model("Brannock", "BR 70-33", 7.0, 3.3, 92),
    model("Brannock", "BR 70-39", 7.0, 3.9, 103),
    model("Brannock", "BR 92-39", 9.2, 3.9, 99),
    model("Brannock", "BR 120-38", 12.0, 3.8, 103),
    model("Brannock", "BR 136-40", 13.6, 4.0, 108),
  ],
  Orveld: [
    model("Orveld", "OV 622", 5.9, 2.2, 67),
    model("Orveld", "OV 628", 5.9, 2.8, 72),
    model("Orveld", "OV 735", 7.0, 3.5, 90),
    model("Orveld", "OV 739", 7.0, 3.9, 85),
    model("Orveld", "OV 1746", 16.8, 4.6, 120),
  ],
  Quern: [
    model("Quern", "Q6 30", 6.1, 3.0, 76),
    model("Quern", "Q7 43", 7.4, 4.3, 104),
    model("Quern", "Q9 35", 9.2, 3.5, 86),
    model("Quern", "Q12 37", 12.0, 3.7, 99),
  ],
};

export const SERVICE_RECORDS = ["full", "part", "none"] as const;

export interface Machine {
  readonly make: Make;
  readonly title: string;
  readonly ageYears: number;
  readonly builtOn: string;
  readonly hours: number;
  readonly liftM: number;
  readonly capacityT: number;
  readonly powerKw: number;
  readonly service: (typeof SERVICE_RECORDS)[number];
  readonly tyresLeft: number;
  readonly airConditioning: boolean;
  readonly coupler: boolean;
}

/**
 * How a price comes about, in ln per unit. Age and hours rise together, so hours seen without age carry much of age's part.
 * The tests look for these values again in the fitted model.
 */
export const TRUTH = {
  base: 9.87,
  ageYears: -0.036,
  hours: -0.0000195,
  liftM: 0.024,
  capacityT: 0.085,
  powerKw: 0.0034,
  make: { Tessaly: 0, Brannock: -0.015, Orveld: -0.115, Quern: -0.165 },
  service: { full: 0.075, part: 0.03, none: 0 },
  tyresLeft: 0.0011,
  airConditioning: 0.024,
  coupler: 0.018,
  channel: { auction: 0, dealer: 0.07, private: -0.015, asking: 0.13 },
  /** Market movement per year since the first sale. */
  marketPerYear: 0.025,
  residualSd: 0.1,
} as const;

export const FIRST_DAY = "2023-06-01";
export const LAST_DAY = "2026-05-29";

function roundTo(value: number, step: number): number {
  return Math.round(value / step) * step;
}

/** Tenths without floating-point crumbs. */
function tenths(value: number): number {
  return Math.round(value * 10) / 10;
}

/** Working life: about 620 hours a year, more or less hard used. r(age, hours) comes out near 0.9. */
function hoursAt(ageYears: number, draw: Draw): number {
  const hours = 620 * ageYears * (1 + 0.17 * draw.normal()) + 560 * draw.normal() + 150;
  return Math.max(60, roundTo(hours, 10));
}

export function drawMachine(soldOn: string, draw: Draw): Machine {
  const make = draw.weighted<Make>([
    ["Tessaly", 32],
    ["Brannock", 27],
    ["Orveld", 26],
    ["Quern", 15],
  ]);
  const base = draw.pick(MODELS[make]);
  const ageYears = 1 + 13.5 * (0.85 * draw.even() + 0.15 * draw.even());
  const builtNumber = dayNumber(soldOn)! - Math.round(ageYears * DAYS_PER_YEAR);
  return {
    make,
    title: `${make} ${base.name}`,
    ageYears: (dayNumber(soldOn)! - builtNumber) / DAYS_PER_YEAR,
    builtOn: dayOf(builtNumber),
    hours: hoursAt(ageYears, draw),
    liftM: base.liftM,
    capacityT: tenths(base.capacityT + 0.1 * draw.whole(-1, 1)),
    powerKw: base.powerKw + draw.whole(-6, 6),
    service: draw.pick(SERVICE_RECORDS),
    tyresLeft: Math.min(95, Math.max(15, roundTo(62 - 1.2 * ageYears + 16 * draw.normal(), 5))),
    airConditioning: draw.chance(ageYears < 7 ? 0.75 : 0.45),
    coupler: draw.chance(0.55),
  };
}

/** Price in whole euro, to the nearest 50, as such prices are struck. */
export function priceOf(machine: Machine, soldOn: string, channel: Channel, draw: Draw): number {
  const years = (dayNumber(soldOn)! - dayNumber(FIRST_DAY)!) / DAYS_PER_YEAR;
  const lnPrice =
    TRUTH.base +
    TRUTH.ageYears * machine.ageYears +
    TRUTH.hours * machine.hours +
    TRUTH.liftM * machine.liftM +
    TRUTH.capacityT * machine.capacityT +
    TRUTH.powerKw * machine.powerKw +
    TRUTH.make[machine.make] +
    TRUTH.service[machine.service] +
    TRUTH.tyresLeft * machine.tyresLeft +
    (machine.airConditioning ? TRUTH.airConditioning : 0) +
    (machine.coupler ? TRUTH.coupler : 0) +
    TRUTH.channel[channel] +
    TRUTH.marketPerYear * years +
    TRUTH.residualSd * draw.normal();
  return roundTo(Math.exp(lnPrice), 50);
}

/** 1.341 × kW with all its decimals: 97 → "130.077". */
export function horsepowerText(powerKw: number): string {
  const thousandths = String(powerKw * 1341);
  return `${thousandths.slice(0, -3)}.${thousandths.slice(-3)}`;
}
