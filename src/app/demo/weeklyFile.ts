/**
 * One week's list of the invented Marrowby auction hall, as ugly as such lists are: semicolons, decimal commas, points for
 * thousands, days with points, windows-1252. 46 rows: 37 can be taken in, 8 are held back, 1 is a sale that is there already.
 */
import { dayNumber, dayOf } from "../../domain/day.ts";
import { drawFrom } from "./random.ts";
import { dayFirst, grouped, tableText, windows1252 } from "./tableText.ts";
import { drawMachine, horsepowerText, type Machine, priceOf } from "./telehandlerMarket.ts";
import type { DemoSale } from "./telehandlers.ts";

export const WEEKLY_FILE_NAME = "marrowby-week-18.csv";

const HEADINGS = [
  "Lot",
  "Auction date",
  "Machine",
  "Make",
  "Build",
  "Hours",
  "Lift",
  "Capacity (t)",
  "Power (kW)",
  "Power (hp)",
  "Service",
  "Tyres (%)",
  "Air con",
  "Coupler",
  "Price",
  "Currency",
  "Remarks",
] as const;

type Cells = Record<(typeof HEADINGS)[number], string>;

const ROWS = 46;
/** Monday of the eighteenth week of 2026. */
const MONDAY = "2026-04-27";

function comma(value: number, decimals: number): string {
  return value.toFixed(decimals).replace(".", ",");
}

/** Imported machines have their lift in feet on the plate, and the hall copies what it reads. */
function liftText(liftM: number, inFeet: boolean): string {
  return inFeet ? `${Math.round(liftM / 0.3048)} ft` : `${comma(liftM, 1)} m`;
}

function cellsOf(machine: Machine, lot: string, soldOn: string, price: number, inFeet: boolean): Cells {
  return {
    Lot: lot,
    "Auction date": dayFirst(soldOn, "."),
    Machine: machine.title,
    Make: machine.make,
    Build: `${machine.builtOn.slice(5, 7)}/${machine.builtOn.slice(0, 4)}`,
    Hours: grouped(machine.hours, "."),
    Lift: liftText(machine.liftM, inFeet),
    "Capacity (t)": comma(machine.capacityT, 1),
    "Power (kW)": String(machine.powerKw),
    "Power (hp)": horsepowerText(machine.powerKw).replace(".", ","),
    Service: machine.service,
    "Tyres (%)": String(machine.tyresLeft),
    "Air con": machine.airConditioning ? "ja" : "nein",
    Coupler: machine.coupler ? "ja" : "nein",
    Price: grouped(price, "."),
    Currency: "\u20ac",
    Remarks: "",
  };
}

/** Spoilt cells by spreadsheet row. */
const SLIPS: Readonly<Record<number, Partial<Cells>>> = {
  14: { Price: "38.500,\u2014" },
  17: { "Auction date": "31.04.2026" },
  22: { Hours: "5l20" },
  23: { Make: "Brannok", Machine: "Brannok BR 70-39" },
  29: { Price: "438.000", Currency: "SEK" },
  38: { Price: "3.410" },
  40: { Lift: "7" },
  44: { Lot: "MB-2 units", Remarks: "two machines, one bid" },
};

const DUPLICATE_ROW = 31;

const REMARKS: Readonly<Record<number, string>> = {
  5: "Vorbesitzer M\u00fcnz & S\u00f6hne",
  11: "hydraulics \u2013 hose renewed",
  19: "d\u00e9p\u00f4t St\u00e8nne",
  33: "seller\u2019s own forks",
};

/** A sale of the register that the hall lists again: the last of its own that has hours. */
function listedAgain(sales: readonly DemoSale[]): DemoSale {
  const own = sales.filter(
    ({ cells }) => cells.Lot.startsWith("MB-") && cells["Hours (h)"] !== "" && cells.Notes === "",
  );
  return own.at(-1)!;
}

/** `sales` are those of the register that the week is brought into. */
export function weeklyFile(sales: readonly DemoSale[]): Uint8Array {
  const draw = drawFrom(18_2026);
  const again = listedAgain(sales);
  const rows: string[][] = [[...HEADINGS]];
  for (let row = 2; row < ROWS + 2; row++) {
    const soldOn = dayOf(dayNumber(MONDAY)! + Math.floor(((row - 2) * 5) / ROWS));
    const machine = drawMachine(soldOn, draw);
    const price = priceOf(machine, soldOn, "auction", draw);
    const inFeet = row % 11 === 3;
    const fresh = cellsOf(machine, `MB-${4100 + 3 * row}`, soldOn, price, inFeet);
    const { cells: known } = again;
    const cells =
      row === DUPLICATE_ROW
        ? cellsOf(again.machine, known.Lot, known["Sold on"], again.price, false)
        : { ...fresh, Remarks: REMARKS[row] ?? "", ...SLIPS[row] };
    rows.push(HEADINGS.map((heading) => cells[heading]));
  }
  return windows1252(tableText(rows, ";", "\r\n"));
}
