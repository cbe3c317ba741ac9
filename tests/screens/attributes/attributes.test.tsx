import { beforeAll, describe, expect, test } from "vitest";
import { inEvidence } from "../../../src/screens/attributes/AttributeDetail.tsx";
import { AttributesPlace } from "../../../src/screens/attributes/AttributesPlace.tsx";
import { subjectValue } from "../../../src/screens/attributes/AttributeTable.tsx";
import { attributeOf, draftOf, faultsOf, NEW_DRAFT } from "../../../src/screens/attributes/attributeDraft.ts";
import {
  againstExpectation,
  allowedWords,
  levelWords,
  stepWords,
} from "../../../src/screens/attributes/attributeWords.ts";
import type { Workbench } from "../../../src/screens/workbench/workbench.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

let bench: Workbench;
beforeAll(async () => {
  bench = await demoBench();
  // The panes measure the window; there is none here.
  globalThis.window ??= { innerWidth: 1440 } as never;
});

const attribute = (key: string) => bench.assetClass!.attributes.find((one) => one.key === key)!;

describe("the attributes' screen", () => {
  test("lists every definition with what it is and how it lies in the evidence", () => {
    const words = wordsOf(draw(bench, <AttributesPlace />));
    expect(words).toContain("11 attributes of a machine");
    expect(words).toMatch(/Hours number, h 1,000\u00a0h 0–40,000/);
    expect(words).toMatch(/Make choice of 4/);
    expect(words).toMatch(/Age in the evidence: \d+\.\d–\d+\.\d years/);
  });

  test("puts the item's value on the hairline, a built day as its age at the effective date", () => {
    expect(subjectValue(attribute("hours"), bench.subject)).toBe(4200);
    expect(subjectValue(attribute("built"), bench.subject)).toBeCloseTo(8.2, 1);
    expect(subjectValue(attribute("make"), bench.subject)).toBeNull();
    expect(subjectValue(attribute("hours"), null)).toBeNull();
  });
});

describe("an attribute in words", () => {
  test("says its step, what is allowed, and its levels by how common they are", () => {
    expect(stepWords(attribute("hours"))).toBe("1,000\u00a0h");
    expect(stepWords(attribute("built"))).toBe("1\u00a0year");
    expect(allowedWords({ ...attribute("hours"), lowest: null })).toBe("up to 40,000");
    expect(allowedWords({ ...attribute("hours"), lowest: null, highest: null })).toBe("any");
    const levels = [1, 5, 3, 2, 4].map((count) => ({ level: `L${count}`, count }));
    expect(levelWords({ levels })).toBe("L5\u00a05, L4\u00a04, L3\u00a03, L2\u00a02, 1 more");
  });

  test("says where its evidence lies, and that it has none", () => {
    expect(inEvidence(attribute("hours"), null)).toContain("not in the reference set");
    const found = bench.appraisal!.report.attributeEvidence.find(({ key }) => key === "make")!;
    expect(inEvidence(attribute("make"), found)).toMatch(
      /^Make in the evidence: most often Tessaly, in \d+ of 597 sales\.$/,
    );
  });

  test("tells a price that goes against what is expected", () => {
    const hours = attribute("hours");
    expect(againstExpectation(hours, [{ attribute: "hours", estimate: -1 }])).toBe(false);
    expect(againstExpectation(hours, [{ attribute: "hours", estimate: 1 }])).toBe(true);
    expect(againstExpectation(hours, [])).toBeNull();
    expect(againstExpectation({ ...hours, expectedDirection: null }, [{ attribute: "hours", estimate: 1 }])).toBeNull();
  });
});

describe("the form of an attribute", () => {
  test("gives back the attribute it was opened with", () => {
    for (const one of bench.assetClass!.attributes) expect(attributeOf(draftOf(one), one, [])).toEqual(one);
  });

  test("says under each field what is wrong, and nothing when nothing is", () => {
    expect(faultsOf(NEW_DRAFT, [])).toEqual({ label: "Give it a name." });
    expect(faultsOf({ ...NEW_DRAFT, label: " hours " }, ["Hours"]).label).toContain("has this name already");
    const wrong = { ...NEW_DRAFT, label: "Forks", step: "0", decimals: "7", lowest: "ten", highest: "x" };
    expect(Object.keys(faultsOf(wrong, [])).sort()).toEqual(["decimals", "highest", "lowest", "step"]);
    expect(faultsOf({ ...NEW_DRAFT, label: "Forks", lowest: "5", highest: "4" }, []).highest).toBe(
      "Lower than the lowest.",
    );
    const twice = { ...NEW_DRAFT, label: "Case", kind: "choice" as const, levels: "oak\n\n oak " };
    expect(faultsOf(twice, []).levels).toContain("twice");
    expect(faultsOf({ ...NEW_DRAFT, label: "Forks", lowest: "1 000.5", highest: "2,000" }, [])).toEqual({});
    const comma = faultsOf({ ...NEW_DRAFT, label: "Forks", lowest: "1 000,5", highest: "2000" }, []);
    expect(comma.lowest).toMatch(/point before decimals/);
  });

  test("makes a key of its own for a name that gives one that is taken", () => {
    const made = attributeOf({ ...NEW_DRAFT, label: "Power, kW", unit: " kW " }, null, ["power_kw", "power_kw_2"]);
    expect(made).toMatchObject({
      key: "power_kw_3",
      label: "Power, kW",
      unit: "kW",
      step: 1,
      lowest: null,
      archived: false,
    });
  });
});
