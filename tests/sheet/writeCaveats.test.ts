import { expect, test } from "vitest";
import type { Appraisal, PriceEstimate } from "../../src/domain/appraisal.ts";
import { type FoundSoFar, writeCaveats } from "../../src/sheet/writeCaveats.ts";
import { sheetEvidence } from "../fixtures/sheetEvidence.ts";

const { caveats: _, ...FOUND } = sheetEvidence().appraisal;
const PRICED = FOUND.priced!;
const codes = (found: FoundSoFar): string[] => writeCaveats(found).map(({ code }) => code);
const withPrice = (price: Partial<PriceEstimate>): FoundSoFar => ({
  ...FOUND,
  priced: { ...PRICED, price: { ...PRICED.price, ...price } },
});
const withReport = (report: Partial<Appraisal["report"]>): FoundSoFar => ({
  ...FOUND,
  report: { ...FOUND.report, ...report },
});
const withEvidence = (evidence: Partial<Appraisal["evidence"]>): FoundSoFar => ({
  ...FOUND,
  evidence: { ...FOUND.evidence, ...evidence },
});

test("caveats come largest first, and what is not known says what the price would read", () => {
  const caveats = writeCaveats(FOUND);
  expect(caveats.map(({ code }) => code)).toEqual(["not-known:hire_past", "not-verified", "exact:power_hp+power_kw"]);
  expect(caveats[0]).toMatchObject({
    headline: "Hire-fleet past is not known.",
    wouldRead: ["€37,190 if ex hire fleet", "€39,130 if not hired out"],
  });
  expect(caveats[0]!.text).toContain("€240 wider");
  const sizes = caveats.map(({ size }) => size);
  expect(sizes).toEqual([...sizes].sort((a, b) => b - a));
});

test("of many values that an unknown attribute could have, the lowest and the highest price are named", () => {
  const wouldRead = [5, 1, 9, 3].map((k) => ({ value: `level ${k}`, amount: 36000 + k * 100 }));
  const notKnown = [{ ...PRICED.notKnown[0]!, wouldRead }];
  const [first] = writeCaveats({ ...FOUND, priced: { ...PRICED, notKnown } });
  expect(first!.wouldRead).toEqual(["€36,100 if level 1", "€36,900 if level 9"]);
});

test("without a price there is nothing to caution about", () => {
  expect(writeCaveats({ ...FOUND, priced: null })).toEqual([]);
});

test("a value beyond the evidence outweighs one at its edge", () => {
  const [age, hours, ...rest] = PRICED.reach.attributes;
  const reach = {
    ...PRICED.reach,
    attributes: [
      { ...age!, verdict: "edge" as const },
      { ...hours!, verdict: "beyond" as const, sentence: "No sale has run 99,000 h." },
      ...rest,
    ],
    joint: { ...PRICED.reach.joint, verdict: "beyond" as const, sentence: "Few sales combine these." },
  };
  const caveats = writeCaveats({ ...FOUND, priced: { ...PRICED, reach } });
  expect(caveats.slice(0, 3).map(({ code }) => code)).toEqual(["beyond:hours", "beyond:together", "edge:built"]);
  expect(caveats[0]!.text).toBe("No sale has run 99,000 h.");
});

test("asking prices among sold ones are counted, and weigh less where the model tells them apart", () => {
  const channels = [
    { channel: "dealer", count: 150 },
    { channel: "asking", count: 54 },
  ];
  const apart = writeCaveats(withEvidence({ channels })).find(({ code }) => code === "asking-and-sold")!;
  expect(apart.headline).toBe("54 of 204 prices were asked, not paid.");
  const found = withEvidence({ channels });
  const blind = writeCaveats({ ...found, report: { ...found.report, attributes: ["hours"] } }).find(
    ({ code }) => code === "asking-and-sold",
  )!;
  expect(blind.size).toBeGreaterThan(apart.size);
});

test("thin, old or unstable evidence is said", () => {
  expect(codes(withReport({ n: 24, p: 10 }))).toContain("few-sales");
  expect(codes(withReport({ n: 100, p: 10 }))).not.toContain("few-sales");
  expect(codes(withPrice({ effectiveSales: 3.2 }))).toContain("few-effective-sales");
  expect(codes(withEvidence({ lastSoldOn: "2024-12-01" }))).toContain("old-evidence");
  expect(codes(withReport({ digitsToTrust: 4.2 }))).toContain("few-digits");
  expect(codes(withEvidence({ verifiedCount: 204 }))).not.toContain("not-verified");
});

test("a price without a range, or with one below zero, says so first", () => {
  expect(codes(withPrice({ rangeForOneSale: [], rangeForAverage: [] }))[0]).toBe("no-range");
  const below = withPrice({ rangeForOneSale: [{ level: 0.9, low: -5000, high: 80000 }] });
  expect(codes(below)[0]).toBe("range-below-zero");
});

test("counts that only the store knows do not enter, so that a caveat can be worked out from the file again", () => {
  expect(writeCaveats(withEvidence({ read: 9999, out: [] }))).toEqual(writeCaveats(FOUND));
});

test("a market held is said when carrying it on would show, and then with how much", () => {
  const subject = { ...PRICED.subject, effectiveOn: "2026-01-26" };
  const caveats = writeCaveats({ ...FOUND, priced: { ...PRICED, subject } });
  const held = caveats.find(({ code }) => code === "market-held")!;
  expect(held.headline).toMatch(/26.Sept?.2025/);
  expect(held.text).toContain("about €170");
  expect(codes(FOUND)).not.toContain("market-held");
});
