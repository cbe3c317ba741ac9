/** What a command reads from files: subjects, column matches, engagements, and the sentences when they are wrong. */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import type { ImportPreview } from "../../../src/contract/requests.ts";
import { engagementOf, leftUnstated } from "../../../src/shells/cli/engagementFile.ts";
import { readJsonObject } from "../../../src/shells/cli/files.ts";
import { applyMatchFile } from "../../../src/shells/cli/matchFile.ts";
import { subjectOf } from "../../../src/shells/cli/subjectFile.ts";
import { table } from "../../../src/shells/cli/table.ts";
import { levelsOf, listOf } from "../../../src/shells/cli/verb.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-files-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const ATTRIBUTES = [
  { key: "hours", label: "Hours", kind: "number" },
  { key: "power_kw", label: "Power (kW)", kind: "number" },
  { key: "cab", label: "Closed cab", kind: "yesNo" },
  { key: "stage", label: "Stage", kind: "choice" },
] as const;
const days = { given: null, today: "2026-01-02" };
const subject = (file: Record<string, unknown>, given: string | null = null) =>
  subjectOf(file, "S.json", ATTRIBUTES, { ...days, given });

describe("a subject file", () => {
  test("names attributes by key, label in any case, or heading, flat or under values", () => {
    const expected = { hours: 4200, power_kw: 74, cab: true };
    expect(subject({ hours: 4200, "power (KW)": 74, "Closed cab": true }).values).toEqual(expected);
    expect(subject({ values: { Hours: 4200, power_kw: 74, cab: true } }).values).toEqual(expected);
    expect(subject({ title: "TH-740", serial: "7", hours: null, engagement: { client: "x" } })).toMatchObject({
      title: "TH-740",
      serial: "7",
      values: { hours: null },
    });
  });

  test("brings values into the attribute's own kind", () => {
    expect(subject({ hours: "4200", cab: "Yes", stage: 5 }).values).toEqual({ hours: 4200, cab: true, stage: "5" });
    expect(subject({ cab: "no", hours: "unread" }).values).toEqual({ cab: false, hours: "unread" });
  });

  test("the day on the command line wins over the file's, and today stands in for both", () => {
    expect(subject({ effectiveOn: "2025-05-12" }).effectiveOn).toBe("2025-05-12");
    expect(subject({ effectiveOn: "2025-05-12" }, "2025-06-01").effectiveOn).toBe("2025-06-01");
    expect(subject({}).effectiveOn).toBe("2026-01-02");
  });

  test("refuses an unknown attribute, a value of no kind and a day that is none", () => {
    expect(() => subject({ colour: "red" })).toThrow('There is no attribute "colour".');
    expect(() => subject({ hours: 1, Hours: 2 })).toThrow('"Hours" is named twice.');
    expect(() => subject({ hours: [1] })).toThrow(/no number, text, yes\/no or null/);
    expect(() => subject({ hours: Number.NaN })).toThrow(/Hours|hours/);
    expect(() => subject({}, "2025-02-30")).toThrow('"2025-02-30" is no calendar day.');
  });
});

describe("a JSON file", () => {
  test("that is missing, broken or no object is refused with a sentence", () => {
    const path = join(folder, "a.json");
    expect(() => readJsonObject(path)).toThrow("The file could not be read.");
    writeFileSync(path, "{oops");
    expect(() => readJsonObject(path)).toThrow("The file is not JSON.");
    writeFileSync(path, "[1]");
    expect(() => readJsonObject(path)).toThrow("The file should hold one JSON object.");
    writeFileSync(path, '\uFEFF{"a":1}');
    expect(readJsonObject(path)).toEqual({ a: 1 });
  });
});

describe("a column match file", () => {
  const proposal = {
    options: {
      encoding: "utf-8",
      delimiter: ",",
      decimalMark: ".",
      thousandsMark: "",
      dateOrder: "ymd",
      hasHeading: true,
    },
    match: {
      columns: [
        { heading: "Hammer", target: { to: "nothing" } },
        { heading: "Hrs", target: { to: "newAttribute", label: "Hrs", kind: "number", unit: null } },
      ],
      fixed: {
        soldOn: null,
        currencyCode: "EUR",
        channel: "auction",
        source: "",
        priceBasis: { premium: "in", tax: "out" },
      },
    },
  } as unknown as ImportPreview;

  test("changes what it names and leaves the rest as proposed", () => {
    const chosen = applyMatchFile(
      { columns: { Hammer: "price", Hrs: "hours" }, fixed: { currencyCode: "GBP" } },
      "M.json",
      proposal,
    );
    expect(chosen.match.columns.map(({ target }) => target)).toEqual([
      { to: "price" },
      { to: "attribute", key: "hours" },
    ]);
    expect(chosen.match.fixed).toMatchObject({ currencyCode: "GBP", channel: "auction" });
    expect(chosen.options).toEqual(proposal.options);
    const whole = applyMatchFile({ columns: [{ heading: "Hammer", target: { to: "price" } }] }, "M.json", proposal);
    expect(whole.match.columns[0]!.target).toEqual({ to: "price" });
    expect(whole.match.columns[1]).toEqual(proposal.match.columns[1]);
  });

  test("that names a column the sales file has not is refused, with the columns there are", () => {
    expect(() => applyMatchFile({ columns: { Hamer: "price" } }, "M.json", proposal)).toThrow(
      'The sales file has no column "Hamer".',
    );
  });
});

describe("an engagement", () => {
  const around = {
    today: "2026-01-02",
    settings: { person: "A. Valuer", credentials: "", practice: "Own practice", practiceLine: "" },
    priceBasis: { premium: "in", tax: "out" } as const,
  };

  test("takes the file's words over the settings, and leaves the rest unsaid", () => {
    const engagement = engagementOf({ client: "The bank", practice: "Other" }, around);
    expect(engagement).toMatchObject({
      client: "The bank",
      practice: "Other",
      valuer: "A. Valuer",
      exposureTime: "",
      reportOn: "2026-01-02",
    });
    expect(engagement.priceBasisWords).toBe("premium in, tax out");
  });

  test("says of what a sheet must state that nobody stated it", () => {
    expect(engagementOf({ premise: "as it stands" }, around)).toMatchObject({
      premise: "as it stands",
      basisOfValue: expect.stringContaining("not stated"),
      marketLevel: expect.stringContaining("not stated"),
    });
    expect(leftUnstated({ premise: "as it stands", basisOfValue: " " })).toEqual(["basisOfValue", "marketLevel"]);
  });

  test("refuses a word the sheet has no place for", () => {
    expect(() => engagementOf({ cleint: "x" }, around)).toThrow('The sheet has no place for "cleint".');
  });
});

describe("options", () => {
  test("lists are split at commas, levels come as fractions in rising order", () => {
    expect(listOf({ a: " x, y ,,z" }, "a")).toEqual(["x", "y", "z"]);
    expect(levelsOf({})).toEqual([0.5, 0.8, 0.9, 0.95]);
    expect(levelsOf({ levels: "90,50" })).toEqual([0.5, 0.9]);
    for (const levels of ["0", "100", "x", "1,2,3,4,5,6,7"]) expect(() => levelsOf({ levels })).toThrow("levels");
  });

  test("tables keep words left and figures right, without trailing blanks", () => {
    expect(
      table(
        ["what", "price"],
        [
          ["a", "1"],
          ["longer", "200"],
        ],
      ),
    ).toBe("  what     price\n  a            1\n  longer     200");
  });
});
