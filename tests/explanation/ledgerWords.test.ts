/** The ledger's sentences: true to the printed figures, naming direction, amount and reason. */
import { expect, test } from "vitest";
import type { LedgerRow } from "../../src/domain/appraisal.ts";
import { ledgerHeadline, rowSentence, subjectOf } from "../../src/explanation/ledgerWords.ts";

function row(change: Partial<LedgerRow> = {}): LedgerRow {
  return {
    attribute: "hours",
    label: "Hours",
    level: null,
    stepWords: "1,000\u00a0h",
    coefficient: -0.06,
    ownPart: -0.02,
    carriedParts: [{ from: "built", fromLabel: "Age", amount: -0.04 }],
    money: { coefficient: -2150, own: -710, carried: [{ from: "built", amount: -1440 }] },
    moneyRange95: null,
    signTurned: false,
    sentence: "",
    ...change,
  };
}

const YEARS = new Map([["built", { amount: 1.34, unit: "years" }]]);
const AGE = [{ key: "built", label: "Age" }];

test("a row says what it reads, its own part, what is carried, and why", () => {
  expect(rowSentence(row(), YEARS, "EUR").replaceAll("\u00a0", " ")).toBe(
    "Each extra 1,000 h goes with €2,150 less; among items alike in age it is €710 less, and €1,440 less is carried for age, because among these sales each 1,000 h comes with 1.3 more years.",
  );
});

test("a turned sign is called out", () => {
  const turned = row({
    ownPart: 0.01,
    signTurned: true,
    money: { coefficient: -300, own: 400, carried: [{ from: "built", amount: -700 }] },
  });
  expect(rowSentence(turned, YEARS, "EUR")).toContain("€400 more, the other way round");
  expect(ledgerHeadline([{ row: turned, moves: YEARS }], AGE, "EUR")).toContain("the sign has turned");
});

test("where nothing is left out, or next to nothing is carried, it says so", () => {
  const alone = row({ carriedParts: [], money: { coefficient: -710, own: -710, carried: [] } });
  expect(rowSentence(alone, new Map(), "EUR")).toContain("the other attributes alike");
  expect(ledgerHeadline([{ row: alone, moves: new Map() }], [], "EUR")).toContain("only its own part");
  const little = row({ money: { coefficient: -712, own: -710, carried: [{ from: "built", amount: -2 }] } });
  expect(rowSentence(little, YEARS, "EUR")).toContain("next to nothing of it is carried");
  expect(ledgerHeadline([{ row: little, moves: YEARS }], AGE, "EUR")).toContain("next to nothing is carried");
  expect(ledgerHeadline([], AGE, "EUR")).toContain("No attribute is in the model");
});

test("the headline names the row that carries most and gives its reason", () => {
  const described = [
    { row: row(), moves: YEARS },
    {
      row: row({
        attribute: "pull",
        label: "Pull",
        money: { coefficient: 500, own: 450, carried: [{ from: "built", amount: 50 }] },
      }),
      moves: new Map(),
    },
  ];
  expect(ledgerHeadline(described, AGE, "EUR").replaceAll("\u00a0", " ")).toBe(
    "With age left out, each extra 1,000 h reads −€2,150. Among items alike in that it is −€710; most of the rest is age, as each 1,000 h comes with 1.3 more years.",
  );
});

test.each([
  [{ label: "Age", stepWords: "1\u00a0year" }, "Each extra year of age"],
  [{ label: "Power (kW)", stepWords: "10\u00a0kW" }, "Each extra 10\u00a0kW of power"],
  [{ label: "Lot size", stepWords: "10\u00a0% more" }, "Each extra 10\u00a0% of lot size"],
  [{ label: "Make", level: "Orveld", stepWords: "against Tessaly" }, "Make Orveld, against Tessaly,"],
  [{ label: "Coupler", level: "yes", stepWords: "yes against no" }, "Coupler, yes against no,"],
  [{ attribute: "market", label: "Market movement", stepWords: "12\u00a0months" }, "A sale 12\u00a0months later"],
])("a step is said as people say it: %o", (change, words) => {
  expect(subjectOf(row(change))).toBe(words);
});
