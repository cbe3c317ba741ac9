import { describe, expect, it } from "vitest";
import { convertRows } from "../../src/import/convertRows.ts";
import { indexOfSales } from "../../src/import/duplicates.ts";
import { headingParts } from "../../src/import/headingParts.ts";
import { matchColumns } from "../../src/import/matchColumns.ts";
import { readSalesFile } from "../../src/import/readSalesFile.ts";
import { attributeOf } from "./attributeOf.ts";

const tableOf = (text: string) => readSalesFile(new TextEncoder().encode(text), "sales.csv", null);

function targets(text: string, attributes = [] as ReturnType<typeof attributeOf>[]) {
  return Object.fromEntries(
    matchColumns(tableOf(text), attributes, null).columns.map(({ heading, target }) => [
      heading,
      target.to === "attribute"
        ? `#${target.key}`
        : target.to === "newAttribute"
          ? `${target.kind} ${target.unit}`
          : target.to,
    ]),
  );
}

describe("a heading", () => {
  it.each([
    ["Hours (h)", "hours", "h"],
    ["Power [kW]", "power", "kW"],
    ["power_kw", "power", "kW"],
    ["Lift height m", "lift height", "m"],
    ["hours", "hours", null],
    ["Sold in", "sold in", null],
    ["Price (EUR)", "price", "EUR"],
    ["Leistung (PS)", "leistung", "PS"],
  ])("%s is %s in %s", (heading, name, unit) => {
    expect(headingParts(heading)).toEqual({ name, unit });
  });
});

describe("columns of a class", () => {
  const attributes = [
    attributeOf("power_kw", { label: "Power (kW)", unit: "kW" }),
    attributeOf("power_hp", { label: "Power (hp)", unit: "hp" }),
    attributeOf("hours", { unit: "h" }),
    attributeOf("make", { kind: "choice", levels: ["Tessaly"] }),
    attributeOf("gone", { label: "Mast", archived: true }),
  ];

  it("are matched by name, unit and usual synonyms", () => {
    expect(
      targets(
        "Lot no,Model,Maker,Power hp,Power kW,Engine hours,Hammer price,Date,Mast\nA,B,Tessaly,1,2,3,4,2025-01-01,1\n",
        attributes,
      ),
    ).toEqual({
      "Lot no": "reference",
      Model: "title",
      Maker: "#make",
      "Power hp": "#power_hp",
      "Power kW": "#power_kw",
      "Engine hours": "#hours",
      "Hammer price": "price",
      Date: "soldOn",
      Mast: "nothing",
    });
  });

  it("keep what was used before, fixed values included", () => {
    const table = tableOf("Lot,Betrag,Hours\nA,1,2\n");
    const first = matchColumns(table, attributes, null);
    const columns = first.columns.map((column) =>
      column.heading === "Betrag" ? { ...column, target: { to: "price" as const } } : column,
    );
    const previous = { columns, fixed: { ...first.fixed, soldOn: "2025-01-01", source: "list" } };
    expect(matchColumns(table, attributes, previous)).toEqual(previous);
  });

  it("give a title its maker when the model alone stands there", () => {
    const table = tableOf(
      "Model,Make,Price,Sold on\nTH-740,Tessaly,1,2025-01-01\nTessaly TH-740,Tessaly,2,2025-01-01\n",
    );
    const match = matchColumns(table, attributes, null);
    const given = { attributes, currencyCode: "EUR", priceBasis: match.fixed.priceBasis };
    const { accepted } = convertRows(table, match, given, indexOfSales([]));
    expect(accepted.map(({ sale }) => sale.title)).toEqual(["Tessaly TH-740", "Tessaly TH-740"]);
  });
});

describe("columns without a class", () => {
  const houses = Array.from(
    { length: 40 },
    (_, k) =>
      `${42_000 + 317 * k},${3000 + 41 * k},${1 + (k % 4)},${k % 3 ? "yes" : "no"},${k % 2 ? "north" : "south"},${1990 + (k % 20)}`,
  );

  it("become new attributes by their values", () => {
    expect(targets(`price,lotsize,bedrooms,driveway,region,year built\n${houses.join("\n")}\n`)).toEqual({
      price: "price",
      lotsize: "number null",
      bedrooms: "number null",
      driveway: "yesNo null",
      region: "choice null",
      "year built": "built years",
    });
  });

  it("take the first price-like numbers for the price and the first days for the sale", () => {
    const rows = houses.map((row, k) => `2025-01-${10 + (k % 20)},${row}`);
    expect(targets(`when,worth,plot,rooms,driveway,region,year built\n${rows.join("\n")}\n`)).toMatchObject({
      when: "soldOn",
      worth: "price",
      plot: "number null",
    });
  });

  it("take no unit from a cell that stands alone: a slip, not a unit", () => {
    expect(targets("Price,Sold on,Stops\n1200,2024-01-05,12\n1300,2024-02-05,1l\n1400,2024-03-05,9\n")).toMatchObject({
      Stops: "number null",
    });
  });

  it("name the unit that their heading or their cells have", () => {
    const rows = houses.map((_, k) => `${100 + k},${k} m,${k * 10}`);
    expect(targets(`price,Lift,Hours (h)\n${rows.join("\n")}\n`)).toEqual({
      price: "price",
      Lift: "number m",
      "Hours (h)": "number h",
    });
  });
});
