import { describe, expect, it } from "vitest";
import { createHandlers, dispatch } from "../../src/app/handlers.ts";
import type { Ports } from "../../src/app/ports.ts";
import type { Reply } from "../../src/contract/reply.ts";
import { requestInputs } from "../../src/contract/requests.ts";
import { attribute, fill, HOISTS, sale } from "../store/filledStore.ts";
import { testPorts } from "./ports.ts";

function ask(ports: Ports, name: string, input: unknown): Promise<Reply<unknown>> {
  return dispatch(createHandlers(ports), ports.log, name, input);
}

async function value<T = Record<string, unknown>>(reply: Promise<Reply<unknown>>): Promise<T> {
  const answer = await reply;
  if (!answer.ok) throw new Error(answer.error.what);
  return answer.value as T;
}

const REGISTER = {
  offset: 0,
  limit: 50,
  sort: { by: "id", descending: false },
  filter: {
    search: "",
    soldFrom: null,
    soldTo: null,
    channels: null,
    state: "any",
    verified: "any",
    batchId: null,
    values: {},
  },
};

const acts = (ports: Ports) => ports.store.journal.list(0, 100).map(({ act }) => act);

describe("dispatch", () => {
  it("refuses a request it does not know, and names of every object's own", async () => {
    const ports = testPorts();
    for (const name of ["sellEverything", "constructor", "__proto__", "toString"]) {
      expect(await ask(ports, name, {})).toMatchObject({
        ok: false,
        error: { family: "request", code: "no-such-request" },
      });
    }
    expect(ports.logged).toEqual([]);
  });

  it("refuses bad input before anything runs, naming the field", async () => {
    const reply = await ask(testPorts(), "setAsideSales", { classId: 1, saleIds: [], reason: "x" });
    expect(reply).toMatchObject({ ok: false, error: { code: "bad-input" } });
    expect(JSON.stringify(reply)).toContain("saleIds");
  });

  it("passes a refusal on as it is, and a bug as one calm sentence with its cause in the log", async () => {
    const ports = testPorts();
    expect(await ask(ports, "describeClass", { classId: 7 })).toMatchObject({
      ok: false,
      error: { code: "no-such-class", family: "store" },
    });
    const bug = new Error("a wire came loose");
    const broken = {
      listClasses: () => {
        throw bug;
      },
    };
    const reply = await dispatch(broken, ports.log, "listClasses", {});
    expect(reply).toMatchObject({ ok: false, error: { family: "bug" } });
    expect(JSON.stringify(reply)).not.toContain("wire");
    expect(ports.logged).toEqual([bug]);
  });

  it("answers every request", () => {
    const answered = Object.keys(createHandlers(testPorts()));
    expect(answered.sort()).toEqual(Object.keys(requestInputs).sort());
  });
});

describe("classes and attributes", () => {
  it("are made, changed and archived, each with its journal entry", async () => {
    const ports = testPorts();
    const made = await value<{ id: number; dataVersion: number }>(ask(ports, "createClass", { assetClass: HOISTS }));
    await value(ask(ports, "addAttribute", { classId: made.id, attribute: attribute("lift", { label: "Lift" }) }));
    const lift = attribute("lift", { label: "Lift height", unit: "m", decimals: 1 });
    await value(ask(ports, "changeAttribute", { classId: made.id, key: "lift", attribute: lift }));
    const after = await value<{ attributes: { key: string; archived: boolean }[]; dataVersion: number }>(
      ask(ports, "archiveAttribute", { classId: made.id, key: "lift", archived: true }),
    );
    expect(after.attributes.at(-1)).toEqual({ ...lift, archived: true });
    expect(after.dataVersion).toBeGreaterThan(made.dataVersion);
    expect(acts(ports)).toEqual(["attribute-archived", "attribute-changed", "attribute-added", "class-created"]);
    expect(await ask(ports, "createClass", { assetClass: HOISTS })).toMatchObject({
      ok: false,
      error: { code: "class-exists" },
    });
    expect(acts(ports)).toHaveLength(4);
    const { summary } = await value<{ summary: { attributeCount: number } }>(
      ask(ports, "describeClass", { classId: made.id }),
    );
    expect(summary.attributeCount).toBe(4);
  });
});

describe("sales in the register", () => {
  it("are set aside with a reason, put back and verified by the person in the settings", async () => {
    const ports = testPorts();
    const classId = fill(ports.store, [sale(), sale(), sale()]);
    const settings = { person: "A. Valuer", credentials: "", practice: "", practiceLine: "" };
    expect(await value(ask(ports, "changeSettings", settings))).toEqual(settings);
    expect(await value(ask(ports, "setAsideSales", { classId, saleIds: [1, 2], reason: " burnt " }))).toEqual({
      changed: 2,
    });
    expect(await value(ask(ports, "putBackSales", { classId, saleIds: [2, 3] }))).toEqual({ changed: 1 });
    expect(await value(ask(ports, "verifySales", { classId, saleIds: [3], how: "invoice" }))).toEqual({ changed: 1 });
    const page = await value<{ total: number; rows: unknown[] }>(ask(ports, "listSales", { ...REGISTER, classId }));
    expect(page).toMatchObject({
      total: 3,
      rows: [
        { setAside: { reason: "burnt", by: "A. Valuer", on: "2026-01-02" } },
        { setAside: null, verification: null },
        { verification: { by: "A. Valuer", on: "2026-01-02", how: "invoice" } },
      ],
    });
    const [verified, putBack, setAside] = ports.store.journal.list(0, 3);
    expect(setAside).toMatchObject({
      by: "A. Valuer",
      sentence: "2 sales set aside: burnt",
      facts: { saleIds: [1, 2], reason: "burnt" },
    });
    expect(putBack!.sentence).toBe("1 sale put back.");
    expect(verified!.sentence).toBe("1 sale verified: invoice");
  });

  it("leave no journal entry when nothing changed", async () => {
    const ports = testPorts();
    const classId = fill(ports.store, [sale()]);
    expect(await value(ask(ports, "putBackSales", { classId, saleIds: [1] }))).toEqual({ changed: 0 });
    expect(ports.store.journal.count()).toBe(0);
  });
});

describe("plain records", () => {
  it("keep a draft and say nothing of it in the journal", async () => {
    const ports = testPorts();
    const classId = fill(ports.store, []);
    const subject = {
      title: "H2",
      serial: null,
      identifiedBy: null,
      values: { hours: null },
      effectiveOn: "2026-01-01",
    };
    expect(await value(ask(ports, "loadDraft", { classId }))).toBeNull();
    await value(ask(ports, "saveDraft", { classId, subject, engagement: null }));
    expect(await value(ask(ports, "loadDraft", { classId }))).toEqual({
      subject,
      engagement: null,
      savedAtUtc: "2026-01-02T03:04:05Z",
    });
    expect(await ask(ports, "saveDraft", { classId: 99, subject, engagement: null })).toMatchObject({
      ok: false,
      error: { code: "no-such-class" },
    });
    expect(ports.store.journal.count()).toBe(0);
  });

  it("read and withdraw a sheet; its bytes stay as issued", async () => {
    const ports = testPorts();
    const { store } = ports;
    const classId = fill(store, [sale()]);
    const edition = store.editions.insert({
      assetClassId: classId,
      savedAtUtc: "2026-01-02T03:04:05Z",
      savedBy: "A. Valuer",
      model: {
        response: "price",
        attributes: [],
        leftOut: [],
        market: "none",
        filter: { channels: null, soldFrom: null, soldTo: null, verifiedOnly: false },
      },
      evidenceFingerprint: "f",
      saleIds: [1],
      summary: { n: 1, p: 1, s: null, r2: null, looR2: null, coefficients: [] },
      report: {} as never,
    });
    store.sheets.insert({
      assetClassId: classId,
      editionId: edition.id,
      number: "2026-0001",
      title: "H2",
      amount: 1,
      low: 0,
      high: 2,
      currencyCode: "EUR",
      effectiveOn: "2026-01-01",
      issuedAtUtc: "2026-01-02T03:04:05Z",
      issuedBy: "A. Valuer",
      digest: "d",
      bytes: new Uint8Array([1, 2, 255]),
    });
    expect(await value(ask(ports, "withdrawSheet", { sheetId: 1, reason: "wrong plate" }))).toMatchObject({
      state: "withdrawn",
      stateReason: "wrong plate",
    });
    expect(await value(ask(ports, "readSheet", { sheetId: 1 }))).toMatchObject({
      sheet: { number: "2026-0001" },
      bytesBase64: "AQL/",
    });
    expect(await ask(ports, "withdrawSheet", { sheetId: 1, reason: "again" })).toMatchObject({
      ok: false,
      error: { code: "sheet-closed" },
    });
    expect(await ask(ports, "readSheet", { sheetId: 2 })).toMatchObject({
      ok: false,
      error: { code: "no-such-sheet" },
    });
    expect(await value<unknown[]>(ask(ports, "listSheets", { classId }))).toHaveLength(1);
    expect(await value<unknown[]>(ask(ports, "listEditions", { classId }))).toHaveLength(1);
    expect(acts(ports)).toEqual(["sheet-withdrawn"]);
  });

  it("list the journal by pages with the verdict on its chain", async () => {
    const ports = testPorts();
    for (const name of ["One", "Two", "Three"])
      await value(ask(ports, "createClass", { assetClass: { ...HOISTS, name } }));
    const page = await value<{ entries: { id: number }[] }>(ask(ports, "listJournal", { offset: 1, limit: 1 }));
    expect(page).toMatchObject({
      total: 3,
      chainIntact: true,
      chainSentence: "The journal is whole: 3 entries, each fits the one before it.",
    });
    expect(page.entries.map(({ id }) => id)).toEqual([2]);
  });
});
