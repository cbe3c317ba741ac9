import { describe, expect, test } from "vitest";
import { demoWeeklyFile } from "../../../../src/app/demo/demoClasses.ts";
import { createHandlers } from "../../../../src/app/handlers.ts";
import type { ColumnMatch, ColumnTarget } from "../../../../src/domain/importRecord.ts";
import { firstValues } from "../../../../src/screens/sales/bringIn/ColumnTable.tsx";
import { sortSentences } from "../../../../src/screens/sales/bringIn/detectedSentences.ts";
import { sizeWords } from "../../../../src/screens/sales/bringIn/readFile.ts";
import {
  labelAndUnit,
  missingTargets,
  optionOf,
  targetOf,
  unmatched,
  withTarget,
} from "../../../../src/screens/sales/bringIn/targets.ts";
import { testPorts } from "../../../app/ports.ts";

const match = (...targets: ColumnTarget[]): ColumnMatch => ({
  columns: targets.map((target, at) => ({ heading: `H${at}`, target })),
  fixed: {
    soldOn: null,
    currencyCode: "EUR",
    channel: "auction",
    source: "",
    priceBasis: { premium: "none", tax: "out" },
  },
});

describe("what a column is", () => {
  test("is the same after it went through the list of options", () => {
    const targets: ColumnTarget[] = [
      { to: "price" },
      { to: "nothing" },
      { to: "attribute", key: "power_kw" },
      { to: "newAttribute", label: "Hours", kind: "number", unit: "h" },
      { to: "newAttribute", label: "Hours (h)", kind: "choice", unit: null },
    ];
    for (const target of targets.slice(0, 4)) expect(targetOf(optionOf(target), "hours (h)")).toEqual(target);
    expect(labelAndUnit("power_output [kW]")).toEqual({ label: "Power output", unit: "kW" });
    expect(labelAndUnit("  ")).toEqual({ label: "Attribute", unit: null });
  });

  test("is given up by the column that was it before", () => {
    const changed = withTarget(match({ to: "price" }, { to: "nothing" }), 1, { to: "price" });
    expect(changed.columns.map(({ target }) => target.to)).toEqual(["nothing", "price"]);
    const twoNew = withTarget(match({ to: "newAttribute", label: "A", kind: "number", unit: null }), 0, {
      to: "nothing",
    });
    expect(twoNew.columns[0]!.target.to).toBe("nothing");
  });

  test("is asked for when no sale can be read without", () => {
    expect(missingTargets(match({ to: "title" }))).toEqual(["price", "day of sale"]);
    const fixed = match({ to: "price" });
    expect(missingTargets({ ...fixed, fixed: { ...fixed.fixed, soldOn: "2026-01-01" } })).toEqual([]);
  });
});

describe("a file's preview", () => {
  const preview = async () => {
    const handlers = createHandlers(testPorts());
    const { classId } = await handlers.openDemo({});
    const { fileName, bytes } = demoWeeklyFile();
    const bytesBase64 = Buffer.from(bytes).toString("base64");
    return {
      preview: await handlers.previewImport({ classId, fileName, bytesBase64, options: null, match: null }),
      attributes: (await handlers.describeClass({ classId })).assetClass.attributes,
    };
  };

  test("has a sentence for each option that was detected, and loses none of the others", async () => {
    const { detected } = (await preview()).preview;
    const { by, rest } = sortSentences(detected);
    expect(by.encoding).toMatch(/windows-1252/);
    expect(by.delimiter).toMatch(/semicolons/);
    expect(by.decimalMark).toMatch(/decimal mark is a comma/);
    expect(by.thousandsMark).toMatch(/Thousands/);
    expect(by.dateOrder).toMatch(/day first/);
    expect([...Object.values(by), ...rest].join(" ").length).toBeGreaterThanOrEqual(detected.join(" ").length - 2);
  });

  test("shows a column by its first different values, and says which attributes the file has not", async () => {
    const { preview: found, attributes } = await preview();
    expect(firstValues(found, found.headings.indexOf("Make"))).toEqual(["Tessaly", "Brannock", "Quern", "Orveld"]);
    expect(unmatched(found.match, attributes)).toEqual([]);
    const without = withTarget(found.match, found.headings.indexOf("Hours"), { to: "nothing" });
    expect(unmatched(without, attributes).map(({ key }) => key)).toEqual(["hours"]);
  });

  test("says how large the file is", () => {
    expect([312, 5012, 48_000, 12_400_000].map(sizeWords)).toEqual(["312 bytes", "5.0 kB", "48 kB", "12 MB"]);
  });
});
