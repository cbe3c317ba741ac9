/** The invented telehandler sales: 650 rows of which 640 become sales, nine are held back and one is there twice. */
import { dayNumber, dayOf } from "../../domain/day.ts";
import type { Channel } from "../../domain/sale.ts";
import { type Draw, drawFrom } from "./random.ts";
import { tableText, utf8 } from "./tableText.ts";
import { drawMachine, FIRST_DAY, horsepowerText, LAST_DAY, type Machine, priceOf } from "./telehandlerMarket.ts";

export const TELEHANDLER_HEADINGS = [
  "Lot",
  "Sold on",
  "Machine",
  "Make",
  "Built",
  "Hours (h)",
  "Lift height (m)",
  "Capacity (t)",
  "Power (kW)",
  "Power (hp)",
  "Service record",
  "Tyres left (%)",
  "Air conditioning",
  "Coupler",
  "Sold through",
  "Price",
  "Currency",
  "Source",
  "Notes",
] as const;

export type TelehandlerCells = Record<(typeof TELEHANDLER_HEADINGS)[number], string>;

export interface DemoSale {
  readonly cells: TelehandlerCells;
  readonly machine: Machine;
  readonly price: number;
  readonly channel: Channel;
}

/** Invented houses, traders and notice boards, with the letters that their lots begin with. */
const SOURCES: Readonly<Record<Channel, readonly (readonly [string, string])[]>> = {
  auction: [
    ["Marrowby auction hall", "MB"],
    ["Stennick field sales", "SF"],
    ["Halverow auctions", "HV"],
  ],
  dealer: [
    ["Cobbleford Machinery", "CM"],
    ["Ostrey Lift & Load", "OL"],
  ],
  private: [["owner, by telephone", "PV"]],
  asking: [["Dale & Fen notices", "DF"]],
};

const SALE_COUNT = 640;
const ASKING_COUNT = 18;
const NO_HOURS_COUNT = 11;
/** Lots run on over the years; the steps between them are the lots of other things. */
const FIRST_LOT = 1040;

export function telehandlerCells(
  machine: Machine,
  given: { lot: string; soldOn: string; channel: Channel; price: number; source: string },
): TelehandlerCells {
  return {
    Lot: given.lot,
    "Sold on": given.soldOn,
    Machine: machine.title,
    Make: machine.make,
    Built: machine.builtOn,
    "Hours (h)": String(machine.hours),
    "Lift height (m)": machine.liftM.toFixed(1),
    "Capacity (t)": machine.capacityT.toFixed(1),
    "Power (kW)": String(machine.powerKw),
    "Power (hp)": horsepowerText(machine.powerKw),
    "Service record": machine.service,
    "Tyres left (%)": String(machine.tyresLeft),
    "Air conditioning": machine.airConditioning ? "yes" : "no",
    Coupler: machine.coupler ? "yes" : "no",
    "Sold through": given.channel,
    Price: String(given.price),
    Currency: "EUR",
    Source: given.source,
    Notes: "",
  };
}

function saleDays(draw: Draw, count: number): string[] {
  const [first, last] = [dayNumber(FIRST_DAY)!, dayNumber(LAST_DAY)!];
  return Array.from({ length: count }, () => draw.whole(first, last))
    .sort((a, b) => a - b)
    .map(dayOf);
}

/** Channels in random order, with exactly so many asking prices. */
function channels(draw: Draw): Channel[] {
  const sold = Array.from({ length: SALE_COUNT - ASKING_COUNT }, () =>
    draw.weighted<Channel>([
      ["auction", 64],
      ["dealer", 28],
      ["private", 8],
    ]),
  );
  return draw.shuffled([...sold, ...Array.from({ length: ASKING_COUNT }, () => "asking" as const)]);
}

/** The 640 sales that are brought in, in order of their days. */
export function telehandlerSales(): readonly DemoSale[] {
  const draw = drawFrom(740_2018);
  const lots = new Map<string, number>();
  const through = channels(draw);
  const sales = saleDays(draw, SALE_COUNT).map((soldOn, k): DemoSale => {
    const channel = through[k]!;
    const machine = drawMachine(soldOn, draw);
    const price = priceOf(machine, soldOn, channel, draw);
    const [source, letters] = draw.pick(SOURCES[channel]);
    const lot = (lots.get(letters) ?? FIRST_LOT) + draw.whole(1, 9);
    lots.set(letters, lot);
    const given = { lot: `${letters}-${lot}`, soldOn, channel, price, source };
    return { cells: telehandlerCells(machine, given), machine, price, channel };
  });
  const sold = draw.shuffled(sales.filter(({ channel }) => channel !== "asking"));
  for (const { cells } of sold.slice(0, NO_HOURS_COUNT)) {
    cells["Hours (h)"] = "";
    cells.Notes = "hour meter unreadable";
  }
  return withForcedSales(sales, sold.slice(NO_HOURS_COUNT, NO_HOURS_COUNT + SET_ASIDE_REASONS.length));
}

export const SET_ASIDE_REASONS = [
  "forced sale",
  "forced sale",
  "forced sale",
  "forced sale",
  "forced sale",
  "part of a larger deal",
  "part of a larger deal",
  "part of a larger deal",
  "part of a larger deal",
  "price cannot be verified",
  "price cannot be verified",
  "price cannot be verified",
  "sold again within the month",
  "sold again within the month",
] as const;

/** What the reasons do to a price, so that setting these sales aside is worth something. */
const EFFECT: Readonly<Record<(typeof SET_ASIDE_REASONS)[number], readonly [number, string]>> = {
  "forced sale": [0.72, "sold by order of the court"],
  "part of a larger deal": [0.88, "traded in against two new machines"],
  "price cannot be verified": [1.16, "price from hearsay"],
  "sold again within the month": [0.93, "resold by the buyer"],
};

function withForcedSales(sales: readonly DemoSale[], chosen: readonly DemoSale[]): readonly DemoSale[] {
  const reasons = new Map(chosen.map((sale, k) => [sale, SET_ASIDE_REASONS[k]!]));
  return sales.map((sale) => {
    const reason = reasons.get(sale);
    if (reason === undefined) return sale;
    const [factor, note] = EFFECT[reason];
    const price = Math.round((sale.price * factor) / 50) * 50;
    return { ...sale, price, cells: { ...sale.cells, Price: String(price), Notes: note } };
  });
}

/** Sales that a person sets aside once the file is in, by lot. */
export function telehandlerSetAside(sales: readonly DemoSale[]): { reference: string; reason: string }[] {
  const byNote = new Map(Object.entries(EFFECT).map(([reason, [, note]]) => [note, reason]));
  return sales.flatMap(({ cells }) => {
    const reason = byNote.get(cells.Notes);
    return reason === undefined ? [] : [{ reference: cells.Lot, reason }];
  });
}

/** One cell each, spoilt the way lists are: what was typed, or copied, or left out. */
const SLIPS: readonly Partial<TelehandlerCells>[] = [
  { Price: "38.500,\u2014" },
  { "Sold on": "2025-02-31" },
  { "Hours (h)": "5l20" },
  { Make: "Brannok", Machine: "Brannok BR 70-39" },
  { Price: "412000", Currency: "SEK" },
  { Price: "3410" },
  { Lot: "SF-2 units", Notes: "sold as a pair" },
  { Price: "" },
  { Built: "2027-04-01" },
];

/** Rows of the file in order of their days, the spoilt ones and the repeated one strewn in. */
export function telehandlerRows(): readonly (readonly string[])[] {
  const draw = drawFrom(9_0046);
  const rows = telehandlerSales().map(({ cells }) => TELEHANDLER_HEADINGS.map((heading) => cells[heading]));
  const spoilt = SLIPS.map((slip, k) => {
    const soldOn = dayOf(dayNumber("2023-09-12")! + 97 * k);
    const machine = drawMachine(soldOn, draw);
    const price = priceOf(machine, soldOn, "auction", draw);
    const given = { lot: `HV-9${k}1`, soldOn, channel: "auction" as const, price, source: "Halverow auctions" };
    const cells = { ...telehandlerCells(machine, given), ...slip };
    return { at: 40 + 66 * k, cells: TELEHANDLER_HEADINGS.map((heading) => cells[heading]) };
  });
  const repeated = { at: 505, cells: rows[498]! };
  for (const { at, cells } of [...spoilt, repeated].sort((a, b) => b.at - a.at)) rows.splice(at, 0, [...cells]);
  return [[...TELEHANDLER_HEADINGS], ...rows];
}

export function telehandlerFile(): Uint8Array {
  return utf8(tableText(telehandlerRows(), ",", "\n"));
}
