import { createHash } from "node:crypto";
import { deflateSync } from "node:zlib";
import { beforeAll, describe, expect, test } from "vitest";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import { AppError } from "../../src/domain/errors.ts";
import { canonicalEvidence } from "../../src/domain/evidenceTable.ts";
import type { SheetEvidence, VerificationReport } from "../../src/domain/sheetRecord.ts";
import { canonicalJson } from "../../src/sheet/canonicalJson.ts";
import { compareSheet } from "../../src/sheet/compareSheet.ts";
import { readSheetEvidence } from "../../src/sheet/readSheetEvidence.ts";
import { renderSheetPdf } from "../../src/sheet/renderSheetPdf.ts";
import { sealPdf } from "../../src/sheet/sealPdf.ts";
import { type VerifyInput, verifyReport } from "../../src/sheet/verifyReport.ts";
import { type SheetChanges, sheetEvidence } from "../fixtures/sheetEvidence.ts";
import { FONTS } from "./fonts.ts";
import { rebuild } from "./rebuild.ts";

const HONEST = sheetEvidence();
let bytes: Uint8Array;
beforeAll(async () => {
  bytes = await renderSheetPdf(HONEST, FONTS);
});

/** Stands for the fit: what the embedded sales give, whatever the file claims. A refit knows no counts of unused records. */
const refit = (evidence: SheetEvidence): Appraisal => {
  const honest = sheetEvidence({ saleCount: evidence.evidence.rows.length });
  return {
    ...honest.appraisal,
    evidence: { ...honest.appraisal.evidence, read: honest.appraisal.evidence.used, out: [] },
  };
};

function verify(file: Uint8Array, more: Partial<VerifyInput> = {}): Promise<VerificationReport> {
  return verifyReport({
    bytes: file,
    fonts: FONTS,
    programVersion: "0.1.0",
    recompute: refit,
    knowsDigest: null,
    ...more,
  });
}

/** The next double above. */
function nudged(value: number): number {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, value);
  view.setBigInt64(0, view.getBigInt64(0) + 1n);
  return view.getFloat64(0);
}

const render = (changes: SheetChanges): Promise<Uint8Array> => renderSheetPdf(sheetEvidence(changes), FONTS);

describe("an honest sheet", () => {
  test("stands: bytes, fingerprint, figures and pages", async () => {
    const report = await verify(bytes);
    expect(report.problems).toEqual([]);
    expect(report).toMatchObject({
      verdict: "stands",
      bytesIntact: true,
      fingerprintEqual: true,
      textEqual: true,
      differentCount: 0,
      sheetNumber: "2025-0317",
      sameProgramVersion: true,
      knownToJournal: null,
    });
    expect(report.equalCount).toBeGreaterThan(400);
    const names = report.figures.map(({ name }) => name);
    expect(names).toContain("price, unrounded");
    expect(names).toContain("price: range for one sale: 90\u00a0%, low");
    expect(names).toContain("ledger: rows: Hours, own part");
    expect(new Set(names).size).toBeGreaterThan(names.length * 0.95);
  });

  test("gives back what was put in, to the last bit", () => {
    const read = readSheetEvidence(bytes);
    expect(read.evidence).toEqual(HONEST);
    expect(canonicalJson(read.evidence)).toBe(canonicalJson(HONEST));
    expect(read).toMatchObject({ sealFound: true, sealIntact: true });
  });

  test("stands when its streams are packed otherwise, as on another machine, once sealed there", async () => {
    expect((await verify(rebuild(bytes, () => null, 1))).problems).toEqual([]);
  });

  test("stands under a later version of the program, which may word its sentences otherwise", async () => {
    const later = await verify(bytes, { programVersion: "9.0.0" });
    expect(later).toMatchObject({ verdict: "stands", sameProgramVersion: false });
    expect(
      later.figures.every(({ printed, recomputed }) => typeof printed === "number" || typeof recomputed === "number"),
    ).toBe(true);
  });

  test("is told known or not by the journal that is asked with its number and digest", async () => {
    const { digest } = readSheetEvidence(bytes);
    const known = await verify(bytes, { knowsDigest: (number, asked) => number === "2025-0317" && asked === digest });
    expect(known.knownToJournal).toBe(true);
    const unknown = await verify(bytes, { knowsDigest: () => false });
    expect(unknown).toMatchObject({ knownToJournal: false, verdict: "stands" });
    expect(unknown.sentence).toContain("does not know it");
  });
});

describe("a forged sheet with a fresh digest", () => {
  test("is caught when one figure of the result is one last bit off", async () => {
    const forged = await render({
      appraisal: (appraisal) => ({
        ...appraisal,
        priced: {
          ...appraisal.priced!,
          price: { ...appraisal.priced!.price, fitted: nudged(appraisal.priced!.price.fitted) },
        },
      }),
    });
    const report = await verify(forged);
    expect(report).toMatchObject({
      verdict: "altered",
      bytesIntact: true,
      fingerprintEqual: true,
      textEqual: true,
      differentCount: 1,
    });
    expect(report.figures.find(({ equal }) => !equal)!.name).toBe("price, fitted");
  });

  test("is caught when the conclusion does not follow from the price", async () => {
    const honest = sheetEvidence();
    const forged = await renderSheetPdf({ ...honest, conclusion: { ...honest.conclusion, amount: 40000 } }, FONTS);
    const report = await verify(forged);
    expect(report.verdict).toBe("altered");
    expect(report.figures.filter(({ equal }) => !equal).map(({ name }) => name)).toEqual(["price, as printed"]);
  });

  test("is caught when a sale was changed, with its fingerprint or without", async () => {
    const honest = sheetEvidence();
    const rows = honest.evidence.rows.map((row, k) => (k === 3 ? { ...row, priceMinor: row.priceMinor + 100 } : row));
    const changed = { ...honest, evidence: { ...honest.evidence, rows } };
    expect(await verify(await renderSheetPdf(changed, FONTS))).toMatchObject({
      verdict: "altered",
      fingerprintEqual: false,
    });
    const evidenceFingerprint = createHash("sha256").update(canonicalEvidence(changed.evidence)).digest("hex");
    const consistent = await renderSheetPdf({ ...changed, evidenceFingerprint }, FONTS);
    const other = (evidence: SheetEvidence): Appraisal => {
      const sum = evidence.evidence.rows.reduce((total, { priceMinor }) => total + priceMinor, 0);
      const right = honest.evidence.rows.reduce((total, { priceMinor }) => total + priceMinor, 0);
      const appraisal = refit(evidence);
      return {
        ...appraisal,
        report: { ...appraisal.report, averagePrice: appraisal.report.averagePrice + (sum - right) },
      };
    };
    expect(await verify(consistent, { recompute: other })).toMatchObject({
      verdict: "altered",
      fingerprintEqual: true,
      differentCount: 1,
    });
  });

  test("is caught when only the ink of a page was changed", async () => {
    const dearer = await render({
      appraisal: (one) => ({ ...one, priced: { ...one.priced!, price: { ...one.priced!.price, amount: 48620.9 } } }),
    });
    const pages: Uint8Array[] = [];
    rebuild(dearer, (_, __, data) => {
      if (data !== null && Buffer.from(data).includes("] TJ")) pages.push(data);
      return null;
    });
    const forged = rebuild(bytes, (_, __, data) => {
      if (data === null || !Buffer.from(data).includes("] TJ")) return null;
      return { data: pages.shift()! };
    });
    const report = await verify(forged);
    expect(report).toMatchObject({
      verdict: "altered",
      bytesIntact: true,
      fingerprintEqual: true,
      textEqual: false,
      differentCount: 0,
    });
    expect(report.problems[0]).toContain("The text of page 1");
    expect(await verify(forged, { programVersion: "9.0.0" })).toMatchObject({ verdict: "altered", textEqual: false });
  });

  test("is caught when a drawing, a font's letters or the attached table was changed", async () => {
    const wrong = [
      rebuild(bytes, (_, __, data) => {
        const text = data === null ? "" : Buffer.from(data).toString("latin1");
        return text.includes("] TJ") ? { data: Buffer.from(`${text}0 0 300 300 re f\n`, "latin1") } : null;
      }),
      rebuild(bytes, (_, body) =>
        body.includes("/Type /Catalog")
          ? { body: body.replace("/Type /Catalog", "/Type /Catalog\n/OpenAction [4 0 R /Fit]") }
          : null,
      ),
      rebuild(bytes, (_, __, data) => {
        const text = data === null ? "" : Buffer.from(data).toString("utf8");
        return text.startsWith("id,reference,") ? { data: Buffer.from(text.replace("dealer", "dealar")) } : null;
      }),
    ];
    for (const forged of wrong) {
      const report = await verify(forged);
      expect(report).toMatchObject({ verdict: "altered", bytesIntact: true, textEqual: true, differentCount: 0 });
      expect(report.problems[0]).toContain("not as this program draws");
    }
  });

  test("is told what hinders when its sales cannot be fitted again, or give no price", async () => {
    const refuses = (): Appraisal => {
      throw new AppError({ family: "fit", code: "none", what: "No sale is left." });
    };
    expect((await verify(bytes, { recompute: refuses })).problems.join()).toContain("No sale is left.");
    const breaks = (): Appraisal => {
      throw new TypeError("Cannot read properties of undefined");
    };
    const broken = await verify(bytes, { recompute: breaks });
    expect(broken.verdict).toBe("altered");
    expect(broken.sentence).not.toContain("undefined");
    expect((await verify(bytes, { recompute: (one) => ({ ...refit(one), priced: null }) })).verdict).toBe("altered");
  });
});

describe("a changed byte", () => {
  test("is caught in the head, the objects, the attachment, the seal, the table and the end", async () => {
    const { at } = await import("../../src/sheet/sealPdf.ts").then(({ readSeal }) => readSeal(bytes));
    const places = [
      0,
      12,
      1000,
      Math.floor(bytes.length / 3),
      Math.floor(bytes.length / 2),
      at!,
      at! + 63,
      at! - 3,
      bytes.length - 200,
      bytes.length - 3,
      bytes.length - 1,
    ];
    for (const place of places) {
      const changed = Uint8Array.from(bytes);
      changed[place] = changed[place]! ^ 1;
      const report = await verify(changed);
      expect(report.verdict, `byte ${place}`).not.toBe("stands");
      expect(report.bytesIntact, `byte ${place}`).toBe(false);
    }
  });
});

describe("what is not a sheet", () => {
  const verdictOf = async (file: Uint8Array): Promise<string> => (await verify(file)).verdict;

  test("is unreadable, in a sentence, and nothing is thrown", async () => {
    const random = Uint8Array.from({ length: 5000 }, (_, k) => (k * 7919) % 251);
    for (const file of [
      new Uint8Array(),
      Buffer.from("%PDF-1.7\n"),
      Buffer.from("hello"),
      random,
      bytes.subarray(0, 5000),
    ]) {
      const report = await verify(file);
      expect(report.verdict).toBe("unreadable");
      expect(report.sentence).toMatch(/^The sheet could not be read\. .+\.$/);
    }
  });

  test("covers a sheet with anything put after it or before it, sealed again or not", async () => {
    const more = Buffer.from("1 0 obj\n<< /Type /Catalog >>\nendobj\nstartxref\n0\n%%EOF\n");
    const longer = new Uint8Array(Buffer.concat([bytes, more]));
    expect(await verdictOf(longer)).toBe("altered");
    expect(await verdictOf(sealPdf(longer))).toBe("altered");
    expect(await verdictOf(sealPdf(new Uint8Array([10, ...bytes])))).toBe("altered");
    expect(await verdictOf(bytes.subarray(9))).toBe("altered");
  });

  const withAttachment = (text: string): Uint8Array =>
    rebuild(bytes, (_, __, data) =>
      data !== null && Buffer.from(data).toString("utf8").startsWith('{"schema"') ? { data: Buffer.from(text) } : null,
    );

  test("covers evidence that is no JSON, of another form, or of a wrong shape", async () => {
    const text = canonicalJson(HONEST);
    for (const wrong of [
      "",
      text.slice(0, -1),
      "null",
      "[]",
      '{"schema":"lotwright-sheet/2"}',
      text.replace('"schema":"lotwright-sheet/1"', '"schema":"lotwright-sheet/9"'),
      text.replace('"rows":[', '"rows":[null,'),
      text.replace('"amount":38620.897861499', '"amount":"38620"'),
      text.replace('{"schema"', '{"__proto__":{"polluted":1},"schema"'),
      text.replace(/"caveats":\[.*?\]\},"conclusion"/, '"caveats":7},"conclusion"'),
    ]) {
      const report = await verify(withAttachment(wrong));
      expect(report).toMatchObject({ verdict: "altered", bytesIntact: true });
      expect(report.sentence).toContain("cannot be read any more");
    }
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
  });

  test("covers values of a shape that only drawing would stumble over: altered, not a crash", async () => {
    const text = canonicalJson(HONEST).replace(/"steps":\[\{/, '"steps":[7,{');
    const report = await verify(withAttachment(text));
    expect(report.verdict).toBe("altered");
    expect(report.problems.join(" ")).toContain("could not be drawn again");
  });

  test("covers a small stream that would unpack without end", async () => {
    const bomb = deflateSync(Buffer.alloc(300 * 2 ** 20), { level: 9 });
    const file = readSheetEvidence(bytes).file;
    const [id] = [...file.objects].find(([, object]) => {
      const data = object.stream();
      return data !== null && Buffer.from(data).toString("utf8").startsWith('{"schema"');
    })!;
    const small = rebuild(bytes, (one, body) =>
      one === id ? { body: body.replace("/Filter /FlateDecode", "/Filter /PlateDecode"), data: bomb } : null,
    );
    const text = Buffer.from(small).toString("latin1").replace("/Filter /PlateDecode", "/Filter /FlateDecode");
    const report = await verify(sealPdf(Buffer.from(text, "latin1")));
    expect(report.verdict).toBe("altered");
    expect(report.sentence).toContain("cannot be unpacked");
  });
});

describe("comparing", () => {
  const conclusion = HONEST.conclusion;

  test("tells 0 from −0, a missing entry from null, and names what differs", () => {
    const again = structuredClone(HONEST.appraisal) as { -readonly [Key in keyof Appraisal]: Appraisal[Key] };
    expect(compareSheet(HONEST, again, conclusion).every(({ equal }) => equal)).toBe(true);
    const ledger = { ...again.ledger, identityError: -0, rows: again.ledger.rows.slice(1) };
    const figures = compareSheet(
      { ...HONEST, appraisal: { ...again, ledger: { ...again.ledger, identityError: 0 } } },
      { ...again, ledger },
      conclusion,
    );
    const different = figures.filter(({ equal }) => !equal).map(({ name }) => name);
    expect(different).toContain("ledger, identity error");
    expect(different).toContain("ledger, rows, how many");
  });

  test("leaves out only what the file cannot give again", () => {
    const again = { ...HONEST.appraisal, evidence: { ...HONEST.appraisal.evidence, read: 1, out: [] } };
    expect(compareSheet(HONEST, again, conclusion).filter(({ equal }) => !equal)).toEqual([]);
    const fewer = { ...HONEST.appraisal, evidence: { ...HONEST.appraisal.evidence, used: 1 } };
    expect(compareSheet(HONEST, fewer, conclusion).filter(({ equal }) => !equal)).toHaveLength(1);
  });
});
