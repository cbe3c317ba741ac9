import BetterSqlite3 from "better-sqlite3";
import { describe, expect, it } from "vitest";
import type { ModelReport } from "../../src/domain/appraisal.ts";
import { EVERYTHING, type PriceModel } from "../../src/domain/priceModel.ts";
import type { Store } from "../../src/store/openStore.ts";
import { fill, freshStore, sale } from "./filledStore.ts";

const MODEL: PriceModel = {
  response: "lnPrice",
  attributes: [{ key: "hours", form: "line", reference: null }],
  leftOut: [],
  market: "none",
  filter: EVERYTHING,
};

function saveEdition(store: Store, classId: number, saleIds: readonly number[] = [1]) {
  return store.editions.insert({
    assetClassId: classId,
    savedAtUtc: "2026-01-02T03:04:05Z",
    savedBy: "A. Valuer",
    model: MODEL,
    evidenceFingerprint: "f".repeat(64),
    saleIds,
    summary: {
      n: 3,
      p: 2,
      s: 0.1,
      r2: 0.9,
      looR2: 0.8,
      coefficients: [{ attribute: "hours", level: null, estimate: -1e-4 }],
    },
    report: { model: MODEL, n: 3, averagePrice: 0.1 + 0.2 } as unknown as ModelReport,
  });
}

function issueSheet(store: Store, classId: number, digest = "d1") {
  return store.sheets.insert({
    assetClassId: classId,
    editionId: store.editions.latest(classId)!.id,
    number: store.sheets.nextNumber(2026),
    title: "Brannock H2",
    amount: 12_345.678901234567,
    low: 10_000,
    high: 15_000,
    currencyCode: "EUR",
    effectiveOn: "2026-01-02",
    issuedAtUtc: "2026-01-02T03:04:05Z",
    issuedBy: "A. Valuer",
    digest,
    bytes: new Uint8Array([37, 80, 68, 70, 0, 255]),
  });
}

function append(store: Store, sentence: string, act = "test", facts: Record<string, unknown> = { n: 1 }) {
  return store.journal.append({
    atUtc: "2026-01-02T03:04:05Z",
    by: "A. Valuer",
    act,
    assetClassId: null,
    sentence,
    facts,
  });
}

describe("editions", () => {
  it("are numbered within their class and come back as they were saved", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    saveEdition(store, classId, [3, 1, 2 ** 40]);
    const second = saveEdition(store, classId, []);
    expect(second.number).toBe(2);
    expect(store.editions.list(classId).map(({ number }) => number)).toEqual([2, 1]);
    const first = store.editions.list(classId)[1]!;
    expect(first.model).toEqual(MODEL);
    expect(first.saleCount).toBe(3);
    expect(store.editions.saleIds(first.id)).toEqual([3, 1, 2 ** 40]);
    expect(store.editions.report(first.id)!.averagePrice).toBe(0.1 + 0.2);
    expect(store.editions.latest(classId)).toEqual(second);
    expect(store.editions.find(99)).toBeNull();
  });

  it("can't be changed, deleted or replaced, not even from outside the program", () => {
    const store = freshStore();
    saveEdition(store, fill(store, [sale()]));
    const db = new BetterSqlite3(store.path);
    expect(() => db.exec("UPDATE editions SET model_json = '{}'")).toThrow("never changed");
    expect(() => db.exec("DELETE FROM editions")).toThrow("never deleted");
    expect(() => db.exec("INSERT OR REPLACE INTO editions SELECT * FROM editions")).toThrow("never replaced");
    db.close();
  });
});

describe("sheets", () => {
  it("are numbered within the year and keep their bytes and amounts to the last bit", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    saveEdition(store, classId);
    const sheet = issueSheet(store, classId);
    expect(sheet.number).toBe("2026-0001");
    expect(sheet.amount).toBe(12_345.678901234567);
    expect(sheet.editionNumber).toBe(1);
    expect([...store.sheets.bytes(sheet.id)]).toEqual([37, 80, 68, 70, 0, 255]);
    expect(store.sheets.nextNumber(2026)).toBe("2026-0002");
    expect(store.sheets.nextNumber(2027)).toBe("2027-0001");
    expect(store.sheets.findByDigest("d1")!.id).toBe(sheet.id);
    expect(store.sheets.findByDigest("other")).toBeNull();
  });

  it("can be withdrawn once with a reason, and never otherwise changed", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    saveEdition(store, classId);
    const sheet = issueSheet(store, classId);
    const db = new BetterSqlite3(store.path);
    expect(() => db.exec("UPDATE sheets SET amount = 1")).toThrow("never changed");
    expect(() => db.exec("UPDATE sheets SET state = 'withdrawn'")).toThrow("never changed");
    expect(() => db.exec("UPDATE sheets SET state = 'withdrawn', state_reason = 'x', bytes = x'00'")).toThrow(
      "never changed",
    );
    expect(() => db.exec("DELETE FROM sheets")).toThrow("never deleted");
    const withdrawn = store.sheets.changeState(sheet.id, "withdrawn", "wrong serial number");
    expect([withdrawn.state, withdrawn.stateReason]).toEqual(["withdrawn", "wrong serial number"]);
    expect(() => store.sheets.changeState(sheet.id, "superseded", "again")).toThrow("withdrawn already");
    expect(() => db.exec("UPDATE sheets SET state = 'issued', state_reason = 'x'")).toThrow("never changed");
    db.close();
  });

  it("refuse a number that is taken", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    saveEdition(store, classId);
    const sheet = issueSheet(store, classId);
    expect(() => store.sheets.insert({ ...sheet, editionId: 1, digest: "d2", bytes: new Uint8Array() })).toThrow(
      "2026-0001",
    );
  });
});

describe("the journal", () => {
  it("chains each entry to the one before it and lists the newest first", () => {
    const store = freshStore();
    const first = append(store, "One.");
    const second = append(store, "Two.");
    expect(first.previousDigest).toBe("0".repeat(64));
    expect(second.previousDigest).toBe(first.digest);
    expect(store.journal.list(0, 10)).toEqual([second, first]);
    expect(store.journal.list(1, 10)).toEqual([first]);
    expect(store.journal.verifyChain()).toEqual({
      intact: true,
      brokenAt: null,
      sentence: "The journal is whole: 2 entries, each fits the one before it.",
    });
  });

  it("is whole when it is empty", () => {
    expect(freshStore().journal.verifyChain().intact).toBe(true);
  });

  it("refuses change, deletion, replacement and an entry out of turn", () => {
    const store = freshStore();
    append(store, "One.");
    append(store, "Two.");
    const db = new BetterSqlite3(store.path);
    expect(() => db.exec("UPDATE journal SET sentence = 'x'")).toThrow("never changed");
    expect(() => db.exec("DELETE FROM journal WHERE id = 2")).toThrow("never shortened");
    expect(() => db.exec("INSERT OR REPLACE INTO journal SELECT * FROM journal WHERE id = 2")).toThrow("appended");
    db.close();
  });

  const tamperings = {
    "a sentence that is altered": "UPDATE journal SET sentence = 'Nothing happened.' WHERE id = 2",
    "a time that is altered": "UPDATE journal SET at_utc = '2020-01-01T00:00:00Z' WHERE id = 2",
    "facts that are altered": `UPDATE journal SET facts_json = '{"n":2}' WHERE id = 2`,
    "an entry that is taken out": "DELETE FROM journal WHERE id = 2",
    "the first entry taken out": "DELETE FROM journal WHERE id = 1",
  };
  for (const [what, sql] of Object.entries(tamperings)) {
    it(`finds ${what}, even with the triggers removed`, () => {
      const store = freshStore();
      for (const sentence of ["One.", "Two.", "Three."]) append(store, sentence);
      const db = new BetterSqlite3(store.path);
      db.exec("DROP TRIGGER journal_is_not_changed; DROP TRIGGER journal_is_not_deleted");
      db.exec(sql);
      db.close();
      const verdict = store.journal.verifyChain();
      expect(verdict.intact).toBe(false);
      expect(verdict.brokenAt).toBeGreaterThanOrEqual(2);
      expect(verdict.sentence).toContain("altered");
    });
  }

  it("finds that the end was cut off when it told of a sheet", () => {
    const store = freshStore();
    const classId = fill(store, [sale()]);
    saveEdition(store, classId);
    append(store, "Before.");
    const sheet = issueSheet(store, classId);
    append(store, "Sheet issued.", "sheet-issued", { digest: sheet.digest });
    expect(store.journal.verifyChain().intact).toBe(true);
    expect(store.journal.findSheetIssued(sheet.digest)!.sentence).toBe("Sheet issued.");
    expect(store.journal.findSheetIssued("another")).toBeNull();
    const db = new BetterSqlite3(store.path);
    db.exec("DROP TRIGGER journal_is_not_deleted; DELETE FROM journal WHERE id = 2");
    db.close();
    expect(store.journal.verifyChain().sentence).toContain("shortened");
  });
});

describe("drafts and settings", () => {
  it("keep the last that was written", () => {
    const store = freshStore();
    const classId = fill(store, []);
    const subject = {
      title: "H2",
      serial: null,
      identifiedBy: null,
      values: { hours: null },
      effectiveOn: "2026-01-01",
    };
    expect(store.drafts.read(classId)).toBeNull();
    store.drafts.write(classId, { subject, engagement: null, savedAtUtc: "2026-01-01T00:00:00Z" });
    store.drafts.write(classId, {
      subject: { ...subject, title: "H3" },
      engagement: null,
      savedAtUtc: "2026-01-02T00:00:00Z",
    });
    expect(store.drafts.read(classId)).toEqual({
      subject: { ...subject, title: "H3" },
      engagement: null,
      savedAtUtc: "2026-01-02T00:00:00Z",
    });
    expect(store.settings.read()).toEqual({ person: "", credentials: "", practice: "", practiceLine: "" });
    const settings = { person: "A. Valuer", credentials: "", practice: "Practice", practiceLine: "" };
    store.settings.write(settings);
    expect(store.settings.read()).toEqual(settings);
  });
});
