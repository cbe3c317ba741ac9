/** Sheets of the demo classes, issued through the handlers and refitted for real. */
import { createHash } from "node:crypto";
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import { recomputeFromSheet } from "../../src/app/sheetEvidence.ts";
import type { Handlers } from "../../src/contract/client.ts";
import { canonicalEvidence } from "../../src/domain/evidenceTable.ts";
import type { SheetEvidence, VerificationReport } from "../../src/domain/sheetRecord.ts";
import { buildSheet } from "../../src/sheet/buildSheet.ts";
import { readSheetEvidence } from "../../src/sheet/readSheetEvidence.ts";
import { renderSheet, renderSheetPdf } from "../../src/sheet/renderSheetPdf.ts";
import { verifyReport } from "../../src/sheet/verifyReport.ts";
import { openStore } from "../../src/store/openStore.ts";
import { FONTS } from "./fonts.ts";
import { colliding, overflowing } from "./measure.ts";

const LEVELS = [0.5, 0.8, 0.9, 0.95];
const sheets: { readonly name: string; readonly bytes: Uint8Array; readonly evidence: SheetEvidence }[] = [];

async function issue(handlers: Handlers, classId: number): Promise<Uint8Array> {
  const { model } = await handlers.currentModel({ classId });
  const draft = (await handlers.loadDraft({ classId }))!;
  const request = {
    model,
    subject: draft.subject,
    engagement: draft.engagement!,
    levels: LEVELS,
    overrideReason: "A reason.",
    adjustments: [],
  };
  const { bytesBase64 } = await handlers.issueSheet({ classId, request } as never);
  return new Uint8Array(Buffer.from(bytesBase64, "base64"));
}

beforeAll(async () => {
  const handlers = createHandlers({
    store: openStore(":memory:"),
    nowUtc: () => "2026-06-02T09:00:00Z",
    today: () => "2026-06-02",
    sha256: (data) => createHash("sha256").update(data).digest("hex"),
    log: (cause) => {
      throw cause;
    },
    programVersion: "0.1.0",
    fonts: FONTS,
  });
  await handlers.openDemo({});
  for (const { id, name } of await handlers.listClasses({})) {
    const bytes = await issue(handlers, id);
    sheets.push({ name, bytes, evidence: readSheetEvidence(bytes).evidence });
  }
});

function verify(bytes: Uint8Array): Promise<VerificationReport> {
  return verifyReport({
    bytes,
    fonts: FONTS,
    programVersion: "0.1.0",
    recompute: recomputeFromSheet,
    knowsDigest: null,
  });
}

const figuresOf = (text: string): string[] =>
  (text.match(/[€£][\d,]+/g) ?? []).map((figure) => figure.replace(/[€£]/, ""));

describe("each demo class", () => {
  test("has a sheet that keeps to its page and whose texts stand apart", async () => {
    expect(sheets).toHaveLength(2);
    for (const { evidence, bytes } of sheets) {
      const sheet = await renderSheet(evidence, FONTS);
      expect(sheet.bytes).toEqual(bytes);
      expect(sheet.missingCharacters).toEqual([]);
      expect(overflowing(sheet)).toEqual([]);
      expect(colliding(sheet)).toEqual([]);
    }
  });

  test("has ledger sentences whose figures are those of their row", () => {
    for (const { evidence } of sheets) {
      const ledger = buildSheet(evidence)
        .sections.flatMap(({ parts }) => parts)
        .find(({ kind }) => kind === "ledger");
      if (ledger?.kind !== "ledger") throw new Error("no ledger");
      expect(ledger.table.lines.length).toBeGreaterThan(5);
      for (const line of ledger.table.lines) {
        const shown = [line.coefficient, line.own, ...line.carried].map((text) => text.replace(/[+−]/, ""));
        expect(figuresOf(line.sentence).filter((figure) => !shown.includes(figure))).toEqual([]);
      }
    }
  });

  test("says how far the price depends on the attributes included, in the figures of its sets", () => {
    for (const { evidence } of sheets) {
      const { sets, price } = evidence.appraisal.priced!;
      const section = buildSheet(evidence).sections.find(({ heading }) => heading === "Had other attributes been in");
      const [paragraphs] = section!.parts;
      if (paragraphs?.kind !== "paragraphs") throw new Error("no words");
      const words = paragraphs.items.map((item) =>
        typeof item === "string" ? item : item.map(({ text }) => text).join(""),
      );
      expect(words).toEqual(expect.arrayContaining([...sets!.sentences]));
      expect(sets!.price!.low).toBeLessThan(price.amount);
      expect(sets!.price!.high).toBeGreaterThan(price.amount);
      const most = sets!.switched.reduce((a, b) =>
        Math.abs(b.price! - price.amount) > Math.abs(a.price! - price.amount) ? b : a,
      );
      const how = most.isIn ? "without" : "with";
      expect(words.at(-1)).toContain(`${how} ${most.label.charAt(0).toLowerCase()}${most.label.slice(1)}`);
    }
  });

  test("prices an item with one attribute switched as the model so changed does", async () => {
    const { evidence } = sheets[0]!;
    const { sets } = evidence.appraisal.priced!;
    const labels = evidence.assetClass.attributes.map(({ label }) => label);
    const switched = sets!.switched.find(({ isIn, label }) => isIn && labels.includes(label))!;
    const { key } = evidence.assetClass.attributes.find(({ label }) => label === switched.label)!;
    const { request } = evidence;
    const model = { ...request.model, leftOut: [...request.model.leftOut, key] };
    const without = recomputeFromSheet({ ...evidence, request: { ...request, model } });
    expect(Math.abs(switched.price! / without.priced!.price.amount - 1)).toBeLessThan(1e-10);
  });

  test("has the pull of each source, and the price without it that a fit of the other sales gives", () => {
    for (const { evidence } of sheets) {
      const { table, pull } = { table: evidence.evidence, pull: evidence.appraisal.priced!.pull };
      const sources = new Set(table.rows.map(({ source }) => source));
      expect(pull.bySource).toHaveLength(sources.size === 1 ? 0 : sources.size);
      if (sources.size === 1) continue;
      const all = pull.top.reduce((sum, { weight }) => sum + weight, pull.restWeight);
      expect(Math.abs(pull.bySource!.reduce((sum, { weight }) => sum + weight, -all))).toBeLessThan(1e-10);
      const lastDay = (rows: typeof table.rows): string => rows.reduce((a, b) => (b.soldOn > a.soldOn ? b : a)).soldOn;
      let compared = 0;
      for (const { source, count, priceWithout } of pull.bySource!) {
        const rows = table.rows.filter((row) => row.source !== source);
        expect(rows.length).toBe(table.rows.length - count);
        // Only its sales have some level: no fit of these columns without it.
        const channels = new Set(rows.map(({ channel }) => channel));
        expect(priceWithout === null).toBe(table.rows.some(({ channel }) => !channels.has(channel)));
        // The market is held after the last sale; a source with that sale moves it in a fit of the others.
        if (priceWithout === null || lastDay(rows) !== lastDay(table.rows)) continue;
        compared++;
        const { amount } = recomputeFromSheet({ ...evidence, evidence: { ...table, rows } }).priced!.price;
        expect(Math.abs(priceWithout! / amount - 1)).toBeLessThan(1e-10);
      }
      expect(compared).toBeGreaterThan(1);
    }
    expect(sheets.some(({ evidence }) => evidence.appraisal.priced!.pull.bySource!.length > 1)).toBe(true);
  });

  test("is fitted again from its sheet to the last bit", async () => {
    for (const { bytes } of sheets) {
      const report = await verify(bytes);
      expect(report.problems).toEqual([]);
      expect(report).toMatchObject({ verdict: "stands", differentCount: 0 });
      expect(report.equalCount).toBeGreaterThan(1000);
    }
  });
});

describe("a sheet rebuilt with a fresh digest", () => {
  test("around one dearer sale, fingerprint and all, is caught by fitting it again", async () => {
    const { evidence } = sheets[0]!;
    const rows = evidence.evidence.rows.map((row, k) => (k === 0 ? { ...row, priceMinor: row.priceMinor + 1 } : row));
    const table = { ...evidence.evidence, rows };
    const evidenceFingerprint = createHash("sha256").update(canonicalEvidence(table)).digest("hex");
    const report = await verify(await renderSheetPdf({ ...evidence, evidence: table, evidenceFingerprint }, FONTS));
    expect(report).toMatchObject({ verdict: "altered", bytesIntact: true, fingerprintEqual: true, textEqual: true });
    expect(report.differentCount).toBeGreaterThan(100);
    expect(report.figures.find(({ name }) => name === "price, unrounded")!.equal).toBe(false);
  });

  test("around another subject or a shorter attribute set is caught", async () => {
    const { evidence } = sheets[0]!;
    const { request } = evidence;
    const values = { ...request.subject.values, hours: 100 };
    const younger = { ...evidence, request: { ...request, subject: { ...request.subject, values } } };
    const shorter = { ...evidence, request: { ...request, model: { ...request.model, leftOut: ["hours"] } } };
    for (const forged of [younger, shorter]) {
      expect(await verify(await renderSheetPdf(forged, FONTS))).toMatchObject({
        verdict: "altered",
        bytesIntact: true,
      });
    }
  });

  test("with another price for a set of attributes is caught", async () => {
    const { evidence } = sheets[0]!;
    const priced = evidence.appraisal.priced!;
    const switched = priced.sets!.switched.map((one, k) => (k === 1 ? { ...one, price: one.price! * 1.01 } : one));
    const appraisal = { ...evidence.appraisal, priced: { ...priced, sets: { ...priced.sets!, switched } } };
    const report = await verify(await renderSheetPdf({ ...evidence, appraisal }, FONTS));
    expect(report).toMatchObject({ verdict: "altered", differentCount: 1 });
    expect(report.figures.find(({ equal }) => !equal)!.name).toContain(switched[1]!.label);
  });

  test("with a caveat taken away is caught", async () => {
    const { evidence } = sheets[0]!;
    const forged = { ...evidence, appraisal: { ...evidence.appraisal, caveats: evidence.appraisal.caveats.slice(1) } };
    const report = await verify(await renderSheetPdf(forged, FONTS));
    expect(report.verdict).toBe("altered");
    expect(report.figures.find(({ equal }) => !equal)!.name).toContain("caveats");
  });
});
