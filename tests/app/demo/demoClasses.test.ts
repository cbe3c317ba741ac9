import { Matrix, QrDecomposition } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { demoClasses, demoWeeklyFile } from "../../../src/app/demo/demoClasses.ts";
import { TRUTH } from "../../../src/app/demo/telehandlerMarket.ts";
import { DAYS_PER_YEAR, dayNumber } from "../../../src/domain/day.ts";
import type { NewSale } from "../../../src/domain/sale.ts";
import { convertRows } from "../../../src/import/convertRows.ts";
import { indexOfSales } from "../../../src/import/duplicates.ts";
import { matchColumns } from "../../../src/import/matchColumns.ts";
import { readSalesFile } from "../../../src/import/readSalesFile.ts";

const [telehandlers, organs] = demoClasses();
const demo = telehandlers!;

function bringIn({ bytes, fileName, assetClass, match }: typeof demo) {
  return convertRows(readSalesFile(bytes, fileName, null), match, assetClass, indexOfSales([]));
}

const result = bringIn(demo);
const sales = result.accepted.map(({ sale }) => sale);
const setAside = new Set(demo.setAside.map(({ reference }) => reference));
const evidence = sales.filter(
  ({ channel, values, reference }) => channel !== "asking" && values.hours !== null && !setAside.has(reference!),
);

function ageOf({ soldOn, values }: NewSale): number {
  return (dayNumber(soldOn)! - dayNumber(String(values.built))!) / DAYS_PER_YEAR;
}

function correlation(a: readonly number[], b: readonly number[]): number {
  const mean = (x: readonly number[]) => x.reduce((sum, each) => sum + each, 0) / x.length;
  const [ma, mb] = [mean(a), mean(b)];
  const product = (x: readonly number[], mx: number, y: readonly number[], my: number) =>
    x.reduce((sum, each, k) => sum + (each - mx) * (y[k]! - my), 0);
  return product(a, ma, b, mb) / Math.sqrt(product(a, ma, a, ma) * product(b, mb, b, mb));
}

const number = (key: string) => (sale: NewSale) => Number(sale.values[key]);
const is = (key: string, level: unknown) => (sale: NewSale) => (sale.values[key] === level ? 1 : 0);
const COLUMNS: Readonly<Record<string, (sale: NewSale) => number>> = {
  intercept: () => 1,
  age: ageOf,
  hours: number("hours"),
  lift: number("lift_height"),
  capacity: number("capacity"),
  power: number("power_kw"),
  tyres: number("tyres_left"),
  aircon: is("air_conditioning", true),
  coupler: is("coupler", true),
  full: is("service_record", "full"),
  part: is("service_record", "part"),
  brannock: is("make", "Brannock"),
  orveld: is("make", "Orveld"),
  quern: is("make", "Quern"),
  dealer: ({ channel }) => (channel === "dealer" ? 1 : 0),
  private: ({ channel }) => (channel === "private" ? 1 : 0),
  market: ({ soldOn }) => (dayNumber(soldOn)! - dayNumber("2023-06-01")!) / DAYS_PER_YEAR,
};

/** Plain least squares of ln price, apart from the program's own. */
function leastSquares(names: readonly string[]) {
  const X = new Matrix(evidence.map((sale) => names.map((name) => COLUMNS[name]!(sale))));
  const y = Matrix.columnVector(evidence.map(({ priceMinor }) => Math.log(priceMinor / 100)));
  const b = new QrDecomposition(X).solve(y);
  const e = Matrix.sub(y, X.mmul(b));
  const s = Math.sqrt(e.dot(e) / (evidence.length - names.length));
  return { at: (name: string) => b.get(names.indexOf(name), 0), s };
}

describe("the invented telehandlers", () => {
  it("come in as 640 sales, nine rows held back, one there twice", () => {
    expect([result.read, result.accepted.length, result.heldBack.length, result.duplicates.length]).toEqual([
      650, 640, 9, 1,
    ]);
    expect(result.heldBack.every(({ reasons }) => reasons.length === 1)).toBe(true);
    expect(new Set(sales.map(({ reference }) => reference)).size).toBe(640);
    expect(demo.assetClass.invented).toBe(true);
  });

  it("leave 597 as evidence: 14 set aside, 18 asking, 11 without hours", () => {
    expect(demo.setAside).toHaveLength(14);
    expect(sales.filter(({ channel }) => channel === "asking")).toHaveLength(18);
    expect(sales.filter(({ values }) => values.hours === null)).toHaveLength(11);
    expect(evidence).toHaveLength(597);
    expect(demo.verify.length).toBeGreaterThan(350);
    const known = new Set(sales.map(({ reference }) => reference));
    expect([...demo.verify, ...demo.setAside].every(({ reference }) => known.has(reference))).toBe(true);
  });

  it("have age and hours moving together, lift and capacity related, hp exactly 1.341 times kW", () => {
    const commonPractice = correlation(evidence.map(ageOf), evidence.map(COLUMNS.hours!));
    expect(commonPractice).toBeGreaterThan(0.88);
    expect(commonPractice).toBeLessThan(0.92);
    expect(correlation(evidence.map(COLUMNS.lift!), evidence.map(COLUMNS.capacity!))).toBeGreaterThan(0.4);
    for (const { values } of sales) {
      expect(values.power_hp).toBe((Number(values.power_kw) * 1341) / 1000);
    }
  });

  it("give the truth back within what 597 sales can tell", () => {
    const { at, s } = leastSquares(Object.keys(COLUMNS));
    expect(s).toBeGreaterThan(0.09);
    expect(s).toBeLessThan(0.11);
    expect(at("age")).toBeCloseTo(TRUTH.ageYears, 2);
    expect(Math.abs(at("hours") - TRUTH.hours)).toBeLessThan(0.000009);
    expect(Math.abs(at("lift") - TRUTH.liftM)).toBeLessThan(0.006);
    expect(Math.abs(at("capacity") - TRUTH.capacityT)).toBeLessThan(0.04);
    expect(Math.abs(at("orveld") - TRUTH.make.Orveld)).toBeLessThan(0.035);
    expect(Math.abs(at("full") - TRUTH.service.full)).toBeLessThan(0.035);
    expect(Math.abs(at("dealer") - TRUTH.channel.dealer)).toBeLessThan(0.035);
    expect(at("market")).toBeGreaterThan(0.015);
    expect(at("market")).toBeLessThan(0.035);
  });

  it("make hours carry age's part, several times their own and of the same sign, when age is left out", () => {
    const own = leastSquares(Object.keys(COLUMNS)).at("hours");
    const alone = leastSquares(Object.keys(COLUMNS).filter((name) => name !== "age")).at("hours");
    expect(own).toBeLessThan(0);
    expect(alone / own).toBeGreaterThan(2.5);
    expect(alone / own).toBeLessThan(6);
  });
});

describe("the second invented class", () => {
  it("is of another kind, in pounds, and comes in whole but for two rows", () => {
    const brought = bringIn(organs!);
    expect([brought.read, brought.accepted.length, brought.heldBack.length, brought.duplicates.length]).toEqual([
      92, 90, 2, 0,
    ]);
    expect(brought.accepted[0]!.sale.currencyCode).toBe("GBP");
    expect(brought.heldBack.map(({ reasons }) => reasons[0]!.reason)).toEqual([
      "A letter l among the digits.",
      "Not a number.",
    ]);
  });
});

describe("columns of the demo's files", () => {
  it.each(demoClasses().map((each) => [each.fileName, each] as const))("are matched by name alone in %s", (_, each) => {
    const table = readSalesFile(each.bytes, each.fileName, null);
    const { columns } = matchColumns(table, each.assetClass.attributes, null);
    expect(columns).toEqual(each.match.columns);
  });
});

describe("the weekly list", () => {
  const { bytes, fileName } = demoWeeklyFile();
  const table = readSalesFile(bytes, fileName, null);
  const match = matchColumns(table, demo.assetClass.attributes, null);
  const known = indexOfSales(sales.map((sale, k) => ({ ...sale, id: k + 1 })));
  const week = convertRows(table, match, demo.assetClass, known);

  it("is read by what its columns show", () => {
    expect(table.options).toEqual({
      encoding: "windows-1252",
      delimiter: ";",
      decimalMark: ",",
      thousandsMark: ".",
      dateOrder: "dmy",
      hasHeading: true,
    });
    expect(match.columns.filter(({ target }) => target.to === "nothing")).toEqual([]);
  });

  it("has 46 rows: 37 taken in, 8 held back, 1 that is in the register already", () => {
    expect([week.read, week.accepted.length, week.heldBack.length, week.duplicates.length]).toEqual([46, 37, 8, 1]);
    expect(week.duplicates[0]).toMatchObject({ row: 31, why: "same reference and day" });
    expect(
      week.heldBack.map(({ row, reasons }) => [row, reasons[0]!.value, reasons[0]!.reason, reasons[0]!.suggestion]),
    ).toMatchInlineSnapshot(`
      [
        [
          14,
          "38.500,—",
          "A dash stands in place of the decimals.",
          "38500",
        ],
        [
          17,
          "31.04.2026",
          "No such day.",
          null,
        ],
        [
          22,
          "5l20",
          "A letter l among the digits.",
          "5120",
        ],
        [
          23,
          "Brannok",
          "Not in the list of makes.",
          "Brannock",
        ],
        [
          29,
          "SEK",
          "No rate table yet: enter the price in EUR.",
          null,
        ],
        [
          38,
          "3410",
          "About a tenth of the middle price in this file, €33,600.",
          "34100",
        ],
        [
          40,
          "7",
          "No unit: ft or m? The column has both.",
          "7 m",
        ],
        [
          44,
          "MB-2 units",
          "2 units under one price: which share is this one’s?",
          null,
        ],
      ]
    `);
  });

  it("keeps its accents, dashes and signs", () => {
    const notes = week.accepted.map(({ sale }) => sale.notes).filter((note) => note !== "");
    expect(notes).toContain("hydraulics \u2013 hose renewed");
    expect(notes).toContain("seller\u2019s own forks");
  });

  it("has every value of the class, lifts converted from feet", () => {
    for (const { sale } of week.accepted) {
      expect(Object.values(sale.values)).not.toContain(null);
      expect(sale.values.power_hp).toBe((Number(sale.values.power_kw) * 1341) / 1000);
    }
    expect(week.notes).toEqual(["Lift: ft converted to m in 5 cells."]);
  });
});
