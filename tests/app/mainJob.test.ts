/** The main job through the handlers, on the demo class: open, appraise, leave out, not known, save, issue, verify. */
import { createHash } from "node:crypto";
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { SheetRequest } from "../../src/domain/sheetRecord.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { readFonts } from "../../src/shells/readFonts.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

const LEVELS = [0.5, 0.8, 0.9, 0.95];
let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;

beforeAll(async () => {
  handlers = createHandlers({
    store: openStore(":memory:"),
    nowUtc: () => "2026-06-02T09:00:00Z",
    today: () => "2026-06-02",
    sha256: (data) => createHash("sha256").update(data).digest("hex"),
    log: (cause) => {
      throw cause;
    },
    programVersion: "0.1.0",
    fonts: readFonts(),
  });
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
});

async function appraise(change: Partial<{ model: PriceModel; subject: Subject }> = {}): Promise<Appraisal> {
  const { appraisal } = await handlers.appraise({ classId, model, subject, levels: LEVELS, ...change } as never);
  return appraisal;
}

test("every sale of the register is evidence or out for a reason", async () => {
  const { evidence } = await appraise();
  expect(evidence).toMatchObject({ read: 640, used: 597 });
  expect(evidence.used + evidence.out.reduce((sum, one) => sum + one.saleIds.length, 0)).toBe(640);
  expect(evidence.out.find((one) => one.reason === "value-missing")!.sentence).toBe("11 sales without hours.");
});

describe("attributes that say the same", () => {
  test("are written as an equation, and the price is the same whichever is left out", async () => {
    const usual = await appraise();
    expect(usual.report.dependencies).toMatchObject([
      { equation: "Power (hp) = 1.341 × Power (kW)", resolvedBy: { key: "power_hp", chosenBy: "program" } },
    ]);
    const [kw, hp] = await Promise.all(
      ["power_kw", "power_hp"].map((key) => appraise({ model: { ...model, leftOut: [key] } })),
    );
    expect(kw!.report.dependencies[0]!.resolvedBy).toMatchObject({ key: "power_kw", chosenBy: "person" });
    expect(kw!.report.attributes).toContain("power_hp");
    expect(hp!.report.attributes).toContain("power_kw");
    expect(Math.abs(kw!.priced!.price.amount / hp!.priced!.price.amount - 1)).toBeLessThan(1e-10);
  });
});

describe("age left out", () => {
  test("hours read several times their own part, with the sign kept (common practice, no source)", async () => {
    const { ledger } = await appraise({ model: { ...model, leftOut: ["built"] } });
    const hours = ledger.rows.find((row) => row.attribute === "hours")!;
    expect(hours.ownPart).toBeLessThan(0);
    expect(hours.coefficient / hours.ownPart).toBeGreaterThan(2.5);
    expect(hours.signTurned).toBe(false);
    expect(hours.sentence).toMatch(/each 1,000.h comes with 1\.\d more years/);
    expect(ledger.headline).toContain("age");
    expect(ledger.identityError).toBeLessThan(1e-12);
  });

  test("age and hours move together at about 0.9 (common practice, no source)", async () => {
    const { report } = await appraise();
    const pair = report.movingTogether.find(({ a, b }) => [a, b].sort().join() === "built,hours")!;
    expect(pair.correlation).toBeGreaterThan(0.87);
    expect(pair.correlation).toBeLessThan(0.93);
    expect(report.widening.find((one) => one.key === "hours")!.times).toBeGreaterThan(1.5);
  });
});

describe("an edition", () => {
  test("is numbered, kept, and not saved twice on the same evidence", async () => {
    const first = await handlers.saveEdition({ classId, model } as never);
    const again = await handlers.saveEdition({ classId, model } as never);
    expect(first).toMatchObject({ number: 1, saleCount: 597 });
    expect(again.id).toBe(first.id);
    const other = await handlers.saveEdition({ classId, model: { ...model, leftOut: ["built"] } } as never);
    expect(other.number).toBe(2);
    expect((await handlers.currentModel({ classId })).edition!.number).toBe(2);
  });
});

describe("a sheet", () => {
  async function request(change: Partial<SheetRequest> = {}): Promise<SheetRequest> {
    const { engagement } = (await handlers.loadDraft({ classId }))!;
    return {
      model,
      subject,
      engagement: engagement!,
      levels: LEVELS,
      overrideReason: null,
      adjustments: [],
      ...change,
    } as SheetRequest;
  }

  async function issue(change: Partial<SheetRequest> = {}) {
    return handlers.issueSheet({ classId, request: await request(change) } as never);
  }

  test("is refused without the terms a headline price needs, all of them named", async () => {
    const { engagement } = await request();
    const bare = { ...engagement, basisOfValue: " ", premise: "", marketLevel: "" };
    await expect(issue({ engagement: bare })).rejects.toMatchObject({
      code: "headline-incomplete",
      what: expect.stringContaining("basis of value, premise of value and market level"),
    });
  });

  test("is refused beyond the evidence, unless a reason is written, which it prints", async () => {
    const far = { ...subject, values: { ...subject.values, hours: 29_000 } };
    await expect(issue({ subject: far })).rejects.toMatchObject({ code: "beyond-evidence" });
    const { sheet } = await issue({
      subject: far,
      overrideReason: "Meter read by two people; no like machine was sold.",
    });
    expect(sheet.state).toBe("issued");
  });

  test("is refused with an adjustment that has no reason", async () => {
    const adjustments = [{ label: "New tyres", amount: 800, reason: "" }];
    await expect(issue({ adjustments })).rejects.toMatchObject({ code: "adjustment-without-reason" });
  });

  test("is verified from its bytes alone, to the last bit, and the journal knows it", async () => {
    const { sheet, bytesBase64 } = await issue();
    const report = await handlers.verifySheet({ bytesBase64 });
    expect(report.problems).toEqual([]);
    expect(report).toMatchObject({ verdict: "stands", bytesIntact: true, differentCount: 0, knownToJournal: true });
    expect(report.equalCount).toBeGreaterThan(500);
    expect(report.sheetNumber).toBe(sheet.number);
    const { entries, chainIntact } = await handlers.listJournal({ offset: 0, limit: 50 });
    expect(entries.find((entry) => entry.act === "sheet-issued" && entry.facts.number === sheet.number)).toBeDefined();
    expect(chainIntact).toBe(true);
  });

  test("is verified by a store that knows nothing, which then says nothing of its journal", async () => {
    const { bytesBase64 } = await issue();
    const elsewhere = createHandlers(testPorts({ fonts: readFonts(), programVersion: "0.1.0" }));
    const report = await elsewhere.verifySheet({ bytesBase64 });
    expect(report).toMatchObject({ verdict: "stands", knownToJournal: null });
    expect(report.sentence).not.toContain("journal");
  });

  test("with one changed byte anywhere is altered, and says so", async () => {
    const { bytesBase64 } = await issue();
    const bytes = Buffer.from(bytesBase64, "base64");
    for (const at of [10, 4321, Math.floor(bytes.length / 2), bytes.length - 3]) {
      const changed = Buffer.from(bytes);
      changed[at] = changed[at]! ^ 1;
      const report = await handlers.verifySheet({ bytesBase64: changed.toString("base64") });
      expect(report.verdict).not.toBe("stands");
      expect(report.bytesIntact).toBe(false);
    }
  });

  test("has the same bytes when the same appraisal is drafted twice", async () => {
    const input = { classId, request: await request() } as never;
    const [first, second] = [await handlers.previewSheet(input), await handlers.previewSheet(input)];
    expect(first.bytesBase64).toBe(second.bytesBase64);
    expect(first.pageCount).toBeGreaterThanOrEqual(4);
  });
});
