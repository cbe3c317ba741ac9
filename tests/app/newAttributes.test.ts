import { describe, expect, it } from "vitest";
import { NO_CLASS } from "../../src/app/convertFile.ts";
import { attributesOfMatch, settle } from "../../src/app/newAttributes.ts";
import type { AttributeKind } from "../../src/domain/attribute.ts";
import type { ColumnMatch } from "../../src/domain/importRecord.ts";
import { attribute, sale } from "../store/filledStore.ts";

function match(...labels: [string, AttributeKind, string | null][]): ColumnMatch {
  return {
    columns: labels.map(([label, kind, unit]) => ({
      heading: label,
      target: { to: "newAttribute", label, kind, unit },
    })),
    fixed: {
      soldOn: null,
      currencyCode: "EUR",
      channel: "auction",
      source: "list",
      priceBasis: { premium: "in", tax: "out" },
    },
  };
}

describe("attributes that a match names for the first time", () => {
  it("get a key of their own, made of the label", () => {
    const { fresh, match: keyed } = attributesOfMatch(
      match(["Power (kW)", "number", "kW"], ["Power kW", "number", "kW"], ["Baujahr", "built", null]),
      NO_CLASS,
    );
    expect(fresh.map(({ key }) => key)).toEqual(["power_kw", "power_kw_2", "baujahr"]);
    expect(fresh[2]!.unit).toBe("years");
    expect(keyed.columns[1]!.target).toEqual({ to: "attribute", key: "power_kw_2" });
  });

  it("are the class's own where the label is known", () => {
    const own = { ...NO_CLASS, id: 1, attributes: [attribute("h", { label: "Hours" })] };
    const { fresh, match: keyed } = attributesOfMatch(match(["hours ", "number", "h"]), own);
    expect(fresh).toEqual([]);
    expect(keyed.columns[0]!.target).toEqual({ to: "attribute", key: "h" });
  });

  it("take decimals and step from their values: a power of ten near a sixth of the span", () => {
    const settled = (values: (number | null)[]) => {
      const { step, decimals } = settle(
        attribute("a"),
        values.map((a) => sale({ values: { a } })),
      );
      return [step, decimals];
    };
    const spread = (low: number, high: number) => Array.from({ length: 101 }, (_, i) => low + ((high - low) * i) / 100);
    expect(settled(spread(0, 12_000))).toEqual([1000, 0]);
    expect(settled(spread(55, 110).map(Math.round))).toEqual([10, 0]);
    expect(settled([2.5, 3, 3.5, 4, null])).toEqual([0.1, 1]);
    expect(settled([7, 7, 7])).toEqual([1, 0]);
    expect(settled([null])).toEqual([1, 0]);
    expect(settled([])).toEqual([1, 0]);
    expect(settled([1 / 3, 2 / 3])[1]).toBe(6);
  });

  it("list the levels of a choice alphabetically", () => {
    const sales = ["Corvane", "Ähre", "Brannock", "Corvane", null].map((make) => sale({ values: { make } }));
    expect(settle(attribute("make", { kind: "choice" }), sales).levels).toEqual(["Ähre", "Brannock", "Corvane"]);
  });
});
