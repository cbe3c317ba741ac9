import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Appraisal, BuiltUpStep, LedgerRow } from "../../src/domain/appraisal.ts";
import { buildSheet } from "../../src/sheet/buildSheet.ts";
import { pageTexts } from "../../src/sheet/read/pageText.ts";
import { readPdf } from "../../src/sheet/read/pdfObjects.ts";
import { type RenderedSheet, renderSheet, renderSheetPdf } from "../../src/sheet/renderSheetPdf.ts";
import { REQUEST, sheetEvidence } from "../fixtures/sheetEvidence.ts";
import { describeNeeding } from "../tools.ts";
import { FONTS } from "./fonts.ts";
import { colliding, overflowing } from "./measure.ts";

const LONG = "Exceptionally long-winded description of a thing that goes on and on without any regard for margins";
const textOf = (bytes: Uint8Array): string => pageTexts(readPdf(bytes)).flat().join(" ").replace(/ +/g, " ");

function crowded(count: number): (appraisal: Appraisal) => Appraisal {
  return (appraisal) => {
    const priced = appraisal.priced!;
    const step = priced.builtUp.steps[0]!;
    const row = appraisal.ledger.rows[0]!;
    const each = (priced.builtUp.end - priced.builtUp.start) / count;
    const steps = Array.from(
      { length: count },
      (_, k): BuiltUpStep => ({
        ...step,
        key: `a${k}`,
        label: k % 3 === 0 ? `${LONG} ${k}` : `Attribute ${k}`,
        averageWords: k % 4 === 0 ? LONG : "7.0 years",
        subjectWords: k % 5 === 0 ? LONG : "7.5 years",
        step: each,
        standsAt: priced.builtUp.start + each * (k + 1),
      }),
    );
    const leftOut = Array.from({ length: 6 }, (_, k) => ({ key: `out${k}`, label: `${LONG} number ${k}` }));
    const rows = Array.from(
      { length: count },
      (_, k): LedgerRow => ({
        ...row,
        attribute: `a${k}`,
        label: k % 3 === 0 ? `${LONG} ${k}` : `Attribute ${k}`,
        stepWords: "1,000 kilogram-metres per second",
        sentence: k % 2 === 0 ? `${LONG}, and ${LONG}.` : row.sentence,
        money: {
          coefficient: 1_234_567,
          own: 1_200_000,
          carried: leftOut.map(({ key }) => ({ from: key, amount: 34_567 / 6 })),
        },
        moneyRange95: { low: -9_876_543, high: 12_345_678 },
      }),
    );
    const reachLine = priced.reach.attributes[0]!;
    return {
      ...appraisal,
      report: {
        ...appraisal.report,
        leftOut: leftOut.map((one) => ({ ...one, why: "person" as const, sentence: `${LONG}.` })),
      },
      ledger: { ...appraisal.ledger, rows, leftOut },
      caveats: Array.from({ length: 9 }, (_, k) => ({
        code: `c${k}`,
        headline: `${LONG}.`,
        text: `${LONG}. ${LONG}.`,
        wouldRead: [`€1,234,567 if ${LONG}`],
        size: 9 - k,
      })),
      priced: {
        ...priced,
        builtUp: { ...priced.builtUp, steps },
        pull: {
          ...priced.pull,
          top: priced.pull.top.map((one) => ({ ...one, title: LONG, reference: `REF-${LONG}` })),
        },
        reach: {
          ...priced.reach,
          attributes: Array.from({ length: count }, (_, k) => ({
            ...reachLine,
            key: `a${k}`,
            label: `Attribute ${LONG} ${k}`,
          })),
        },
      },
    };
  };
}

let usual: RenderedSheet;
beforeAll(async () => {
  usual = await renderSheet(sheetEvidence(), FONTS);
});

describe("a usual sheet", () => {
  test("has the price, its ranges and its steps as text on its pages", () => {
    const [first, second] = pageTexts(readPdf(usual.bytes)).map((pieces) => pieces.join(" ").replace(/ +/g, " "));
    for (const words of [
      "€38,500",
      "thirty-eight thousand five hundred euro",
      "33,000",
      "45,500",
      "Range for the average",
      "Three caveats that matter most",
      "Signature of the valuer",
      "Remarks",
    ]) {
      expect(first).toContain(words);
    }
    for (const words of [
      "How the price is built",
      "Average of the 204 sales",
      "39,530",
      "−730",
      "Median from the model",
      "own part",
      "Left out: hire-fleet past.",
    ]) {
      expect(second).toContain(words);
    }
  });

  test("keeps to its margins on four pages, and no text runs into another", () => {
    expect(usual.pageCount).toBe(4);
    expect(overflowing(usual)).toEqual([]);
    expect(colliding(usual)).toEqual([]);
    expect(Math.min(...usual.placed.map(({ size }) => size))).toBeGreaterThanOrEqual(6.5);
  });

  test("has the same bytes every time", async () => {
    expect(await renderSheetPdf(sheetEvidence(), FONTS)).toEqual(usual.bytes);
    expect(await renderSheetPdf(JSON.parse(JSON.stringify(sheetEvidence())), FONTS)).toEqual(usual.bytes);
  });

  test("numbers its pages, and says that it is invented and when it was issued", () => {
    const pages = pageTexts(readPdf(usual.bytes)).map((pieces) => pieces.join(" ").replace(/ +/g, " "));
    pages.forEach((text, index) => {
      expect(text).toContain(`page ${index + 1} of 4`);
      expect(text).toContain("Invented example");
    });
    expect(pages[0]).toContain("Issued");
  });

  test("is tagged: language, title, headings, tables with heads, pictures with their numbers in words, bookmarks", () => {
    const bodies = [...readPdf(usual.bytes).objects.values()].map(({ body }) => body);
    const count = (words: string): number => bodies.filter((body) => body.includes(words)).length;
    expect(count("/Lang (en-GB)")).toBe(1);
    expect(count("/Marked true")).toBe(1);
    expect(count("/DisplayDocTitle true")).toBe(1);
    expect(count("/S /H1\n")).toBe(1);
    expect(count("/S /H2\n")).toBe(buildSheet(sheetEvidence()).sections.length + 2);
    expect(count("/S /TH\n")).toBeGreaterThan(20);
    expect(count("/S /Table\n")).toBeGreaterThanOrEqual(5);
    const figures = bodies.filter((body) => body.includes("/S /Figure"));
    expect(figures).toHaveLength(5);
    expect(figures.every((body) => body.includes("/Alt ("))).toBe(true);
    expect(count("/Title (How the price is built)")).toBe(1);
  });

  test("prints every step as the difference of what stands above and below it", () => {
    const table = buildSheet(sheetEvidence()).sections[0]!.parts[0]!;
    if (table.kind !== "steps") throw new Error("no steps");
    const number = (text: string): number => Number(text.replace("−", "-").replace(/[+,]/g, ""));
    let stands = number(table.table.rows[0]!.standsAt);
    for (const row of table.table.rows.slice(1)) {
      if (row.kind === "median") expect(number(row.step)).toBe(stands - number(table.table.rows[0]!.standsAt));
      else if (row.step !== "") stands += number(row.step);
      expect(number(row.standsAt)).toBe(stands);
    }
    expect(stands).toBe(38500);
  });

  test("prints ledger rows that add up, and pulls that add to 100 %", () => {
    const parts = buildSheet(sheetEvidence()).sections.flatMap((section) => section.parts);
    const number = (text: string): number => Number(text.replace("−", "-").replace(/[+,]/g, ""));
    for (const part of parts) {
      if (part.kind === "ledger") {
        for (const line of part.table.lines) {
          const sum = number(line.own) + line.carried.reduce((total, text) => total + number(text), 0);
          expect(sum).toBe(number(line.coefficient));
        }
      }
      if (part.kind === "pull") {
        const sum = part.table.lines.reduce((total, { pull }) => total + number(pull), number(part.table.rest!.pull));
        expect(sum).toBeCloseTo(100, 9);
      }
    }
    expect(parts.filter(({ kind }) => kind === "ledger" || kind === "pull")).toHaveLength(2);
  });
});

describe("an unusual sheet", () => {
  test("with 25 steps, 40 ledger rows and long names flows on to more pages and overflows nowhere", async () => {
    for (const count of [25, 40]) {
      const sheet = await renderSheet(sheetEvidence({ appraisal: crowded(count) }), FONTS);
      expect(sheet.pageCount).toBeGreaterThan(4);
      expect(overflowing(sheet)).toEqual([]);
      expect(colliding(sheet)).toEqual([]);
      const text = textOf(sheet.bytes);
      expect(text).toContain("Attribute 22");
      expect(text.split("Step, in this order").length - 1).toBeGreaterThan(1);
    }
  });

  test("with long facts keeps page 1 whole and prints the facts in full further on", async () => {
    const engagement = Object.fromEntries(
      Object.entries(REQUEST.engagement).map(([key, value]) => [
        key,
        typeof value === "string" && key !== "reportOn" ? `${LONG} ${LONG} ${key}` : value,
      ]),
    ) as unknown as typeof REQUEST.engagement;
    const subject = { ...REQUEST.subject, title: `${LONG} ${LONG} ${LONG}`, identifiedBy: LONG.repeat(8) };
    const sheet = await renderSheet(sheetEvidence({ request: { engagement, subject } }), FONTS);
    expect(overflowing(sheet)).toEqual([]);
    expect(colliding(sheet)).toEqual([]);
    const pages = pageTexts(readPdf(sheet.bytes)).map((pieces) => pieces.join(" ").replace(/ +/g, " "));
    expect(pages[0]).toContain("Remarks");
    expect(pages.slice(1).join(" ")).toContain("Page 1 in full");
    expect(pages.slice(1).join(" ")).toContain("exposureTime");
    expect(pages[0]).toContain("would fall between €33,000 and €45,500.");
  });

  test("without pulls, left-out attributes, ranges, steps, caveats or stated facts still says what there is", async () => {
    const engagement = Object.fromEntries(
      Object.entries(REQUEST.engagement).map(([key, value]) => [
        key,
        key === "reportOn" ? value : typeof value === "string" ? "" : [],
      ]),
    ) as unknown as typeof REQUEST.engagement;
    const bare = (appraisal: Appraisal): Appraisal => {
      const priced = appraisal.priced!;
      return {
        ...appraisal,
        caveats: [],
        report: {
          ...appraisal.report,
          leftOut: [],
          s: null,
          looTypicalError: null,
          dependencies: [],
          response: "price",
        },
        ledger: { ...appraisal.ledger, rows: [], leftOut: [], leftOutOwn: [], headline: "" },
        priced: {
          ...priced,
          price: { ...priced.price, rangeForOneSale: [], rangeForAverage: [] },
          builtUp: { start: priced.price.amount, steps: [], end: priced.price.amount },
          pull: { ...priced.pull, top: [] },
          reach: { ...priced.reach, attributes: [] },
          notKnown: [],
        },
      };
    };
    const subject = { title: "", serial: null, identifiedBy: null, values: {}, effectiveOn: "2025-09-30" };
    const sheet = await renderSheet(
      sheetEvidence({ saleCount: 1, request: { engagement, subject }, appraisal: bare }),
      FONTS,
    );
    expect(overflowing(sheet)).toEqual([]);
    expect(colliding(sheet)).toEqual([]);
    const text = textOf(sheet.bytes);
    expect(text).toContain("not stated");
    expect(text).toContain("No range could be worked out");
  });

  test("with wide ranges for the average or a price of many digits keeps its figures apart", async () => {
    const scaled =
      (factor: number, spread: number) =>
      (appraisal: Appraisal): Appraisal => {
        const priced = appraisal.priced!;
        const { price } = priced;
        const grow = (value: number): number => value * factor;
        const near = price.rangeForOneSale.map(({ level, low, high }) => ({
          level,
          low: grow(low * spread),
          high: grow(high / spread),
        }));
        return {
          ...appraisal,
          priced: {
            ...priced,
            price: {
              ...price,
              amount: grow(price.amount),
              meanAmount: grow(price.meanAmount),
              rangeForOneSale: price.rangeForOneSale.map((one) => ({
                ...one,
                low: grow(one.low),
                high: grow(one.high),
              })),
              rangeForAverage: near,
            },
            builtUp: {
              start: grow(priced.builtUp.start),
              end: grow(priced.builtUp.end),
              steps: priced.builtUp.steps.map((step) => ({
                ...step,
                step: grow(step.step),
                standsAt: grow(step.standsAt),
              })),
            },
          },
        };
      };
    for (const [factor, spread] of [
      [1, 1.01],
      [1000, 1.05],
      [0.002, 1.02],
    ] as const) {
      const sheet = await renderSheet(sheetEvidence({ appraisal: scaled(factor, spread) }), FONTS);
      expect(overflowing(sheet)).toEqual([]);
      expect(colliding(sheet)).toEqual([]);
    }
  });

  test("with every text as long as a form allows still overflows nowhere", async () => {
    const endless = (what: string): string => `${what} ${"word ".repeat(390)}end`;
    const engagement = Object.fromEntries(
      Object.entries(REQUEST.engagement).map(([key, value]) => [
        key,
        key === "reportOn" ? value : typeof value === "string" ? endless(key) : [endless("one"), "x".repeat(2000)],
      ]),
    ) as unknown as typeof REQUEST.engagement;
    const request = {
      engagement,
      overrideReason: endless("reason"),
      adjustments: [{ label: endless("label"), amount: 1200, reason: endless("why") }],
      subject: { ...REQUEST.subject, title: endless("title"), serial: endless("serial") },
    };
    const many = (appraisal: Appraisal): Appraisal => ({
      ...appraisal,
      evidence: {
        ...appraisal.evidence,
        out: Array.from({ length: 300 }, (_, k) => ({
          reason: "set-aside" as const,
          detail: endless(`reason ${k}`).slice(0, 500),
          sentence: "",
          saleIds: [k],
        })),
      },
    });
    const sheet = await renderSheet(sheetEvidence({ request, appraisal: many }), FONTS);
    expect(overflowing(sheet)).toEqual([]);
    expect(colliding(sheet)).toEqual([]);
    expect(textOf(sheet.bytes)).toContain("292 further reasons");
  });

  test("a draft says so, and has no number", async () => {
    const text = textOf(await renderSheetPdf(sheetEvidence({ sheetNumber: "" }), FONTS));
    expect(text).toContain("Draft for signature, not yet issued");
    expect(text).not.toContain("Issued");
  });

  test("the reason for pricing beyond the evidence and the valuer's own adjustments stand on it", async () => {
    const request = {
      overrideReason: "A sister machine was sold last week.",
      adjustments: [{ label: "New tyres", amount: 1200, reason: "Invoice seen." }],
    };
    const text = textOf(await renderSheetPdf(sheetEvidence({ request }), FONTS));
    for (const words of ["A sister machine was sold last week.", "Valuer’s own: New tyres", "Invoice seen.", "+1,200"])
      expect(text).toContain(words);
  });
});

describe("letters", () => {
  const withCaveat = (words: string): Promise<RenderedSheet> =>
    renderSheet(sheetEvidence({ request: { engagement: { ...REQUEST.engagement, ownCaveats: [words] } } }), FONTS);
  const withTitle = (title: string): Promise<RenderedSheet> =>
    renderSheet(sheetEvidence({ request: { subject: { ...REQUEST.subject, title } } }), FONTS);

  test("of the further Latin alphabets are drawn from the second font file", async () => {
    const sheet = await withTitle("Łódź Šúňža Ğűő");
    expect(sheet.missingCharacters).toEqual([]);
    expect(textOf(sheet.bytes).replace(/ /g, "")).toContain("ŁódźŠúňžaĞűő");
  });

  test("can each be drawn, every one that the font files hold", async () => {
    const held: string[] = [];
    for (const [first, last] of [
      [0xa1, 0x24f],
      [0x1e00, 0x1eff],
      [0x2010, 0x2027],
      [0x20a0, 0x20c0],
    ] as const) {
      for (let code = first; code <= last; code++) held.push(String.fromCodePoint(code));
    }
    const whole = await withCaveat(held.join(" "));
    const lost = new Set(whole.missingCharacters);
    const drawn = held.filter((one) => !lost.has(one) && one.normalize("NFC") === one && !/\p{Cf}/u.test(one));
    expect(drawn.length).toBeGreaterThan(300);
    const text = textOf(whole.bytes);
    expect(drawn.filter((one) => !text.includes(one))).toEqual([]);
  });

  test("that no font holds are marked, reported and named on the sheet, never dropped", async () => {
    const sheet = await withTitle("Lift 中文 ≥ 7 m");
    expect(sheet.missingCharacters).toEqual(["中", "文", "≥"]);
    const text = textOf(sheet.bytes);
    expect(text).toMatch(/\ufffd\ufffd/);
    expect(text).toContain("U+4E2D, U+6587, U+2265");
  });

  test("without ink, or turning the writing round, do no harm", async () => {
    const sheet = await withTitle("A\u202e\u200bB\u00adC\tD\u202fE");
    expect(sheet.missingCharacters).toEqual([]);
    expect(sheet.placed.some(({ text }) => text.includes("C D"))).toBe(true);
  });
});

test("a missing font file is named", async () => {
  const { "ibm-plex-sans-latin-400-normal": _, ...fonts } = FONTS;
  await expect(renderSheetPdf(sheetEvidence(), fonts)).rejects.toMatchObject({
    code: "font-missing",
    where: "ibm-plex-sans-latin-400-normal",
  });
});

test("nothing priced makes no sheet", async () => {
  const evidence = sheetEvidence();
  const none = { ...evidence, appraisal: { ...evidence.appraisal, priced: null } };
  await expect(renderSheetPdf(none, FONTS)).rejects.toMatchObject({ family: "sheet", code: "no-price" });
});

const folder = mkdtempSync(join(tmpdir(), "lotwright-sheet-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describeNeeding("qpdf", "other programs: the file's build", (qpdf) => {
  test("is sound", () => {
    const path = join(folder, "checked.pdf");
    writeFileSync(path, usual.bytes);
    expect(execFileSync(qpdf, ["--check", path], { encoding: "utf8" })).toContain(
      "No syntax or stream encoding errors",
    );
  });
});

describeNeeding("pdftotext", "other programs: the text", (pdftotext) => {
  test("is what our own reader finds", () => {
    const path = join(folder, "text.pdf");
    writeFileSync(path, usual.bytes);
    const plain = execFileSync(pdftotext, ["-raw", path, "-"], { encoding: "utf8" }).replace(/\s+/g, "");
    const own = pageTexts(readPdf(usual.bytes)).flat();
    expect(own.length).toBeGreaterThan(300);
    for (const piece of own) expect(plain).toContain(piece.replace(/\s+/g, ""));
  });
});

test("a draft on a fit that nobody saved names no edition, and the attribute's unit stands once", () => {
  const draft = buildSheet({ ...sheetEvidence({ sheetNumber: "" }), editionNumber: 0 });
  const text = JSON.stringify(draft);
  expect(text).toContain("not saved as an edition");
  expect(text).not.toContain("edition 0");
  expect(text).toContain("Lift height, m");
  expect(text).toContain("Hours, h");
});
