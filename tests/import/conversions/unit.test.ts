import { describe, expect, it } from "vitest";
import { unitName, unitRatio } from "../../../src/import/conversions/unit.ts";

describe("units", () => {
  it.each([
    ["kW", "hp", 1.34102208959503],
    ["kW", "PS", 1.3596216173039],
    ["hp", "kW", 0.7456998715822702],
    ["mi", "km", 1.609344],
    ["ft", "m", 0.3048],
    ["lbs", "kg", 0.45359237],
    ["t", "kg", 1000],
    ["KW", "kilowatt", 1],
  ])("one %s is %s times %d", (from, to, ratio) => {
    expect(unitRatio(from, to)).toBeCloseTo(ratio, 12);
  });

  it("of different quantities, and unknown or ambiguous ones, do not convert", () => {
    expect(unitRatio("kW", "m")).toBeNull();
    expect(unitRatio("gal", "l")).toBeNull();
    expect(unitRatio("m", "km")).toBeNull();
    expect(unitName("furlong")).toBeNull();
  });
});
