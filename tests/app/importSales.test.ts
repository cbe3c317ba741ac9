import { describe, expect, it } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import { openDemo } from "../../src/app/openDemo.ts";
import type { Ports } from "../../src/app/ports.ts";
import type { ImportOutcome, ImportPreview } from "../../src/contract/requests.ts";
import type { ColumnMatch, StoredHeldBackRow } from "../../src/domain/importRecord.ts";
import { attribute, HOISTS } from "../store/filledStore.ts";
import { file, testPorts } from "./ports.ts";

/** Six rows and a blank one: three good, one price and one day that can't be read, one row twice. */
const SPRING = `Lot,Title,Sold on,Price,Hours,Make,Cabin
A-1,Brannock H2,2025-03-01,12500,1200,Brannock,yes
A-2,Brannock H3,2025-03-01,free,800,Brannock,no
A-3,Corvane K1,2025-03-02,9900.50,,Corvane,no

A-4,Corvane K1,2025-02-30,9000,4100,Corvane,no
A-1,Brannock H2,2025-03-01,12500,1200,Brannock,yes
A-5,Corvane K2,2025-03-04,15000,350.5,Corvane,
`;

const MATCH: ColumnMatch = {
  columns: [
    { heading: "Lot", target: { to: "reference" } },
    { heading: "Title", target: { to: "title" } },
    { heading: "Sold on", target: { to: "soldOn" } },
    { heading: "Price", target: { to: "price" } },
    { heading: "Hours", target: { to: "newAttribute", label: "Hours", kind: "number", unit: "h" } },
    { heading: "Make", target: { to: "newAttribute", label: "Make", kind: "choice", unit: null } },
    { heading: "Cabin", target: { to: "newAttribute", label: "Cabin", kind: "yesNo", unit: null } },
  ],
  fixed: {
    soldOn: null,
    currencyCode: "EUR",
    channel: "auction",
    source: "spring list",
    priceBasis: { premium: "in", tax: "out" },
  },
};

const OPTIONS = {
  encoding: "utf-8",
  delimiter: ",",
  decimalMark: ".",
  thousandsMark: "",
  dateOrder: "ymd",
  hasHeading: true,
} as const;

function handlersOf(ports: Ports) {
  return createHandlers(ports);
}

async function started(ports = testPorts()) {
  const handlers = handlersOf(ports);
  const outcome = (await handlers.startClassFromFile({
    ...file("spring.csv", SPRING),
    name: "Hoists",
    itemWord: "hoist",
    options: OPTIONS,
    match: MATCH as never,
  })) as ImportOutcome & { classId: number };
  return { ports, handlers, outcome, classId: outcome.classId };
}

function heldRow(ports: Ports, classId: number, row: number): StoredHeldBackRow {
  return ports.store.heldBack.list(classId).find((each) => each.row === row)!;
}

describe("a class started from a file", () => {
  it("accounts for every row: read = accepted + held back + duplicates", async () => {
    const { outcome, ports, classId } = await started();
    expect(outcome.batch).toMatchObject({ read: 6, accepted: 3, heldBack: 2, duplicates: 1, fileName: "spring.csv" });
    expect(outcome.sentence).toBe("6 rows read: 3 brought in, 2 held back, 1 duplicate.");
    expect(outcome.batch.fileDigest).toBe(ports.sha256(new TextEncoder().encode(SPRING)));
    expect(ports.store.heldBack.list(classId).map(({ row }) => row)).toEqual([3, 6]);
    expect(ports.store.batches.duplicates(outcome.batch.id).map(({ row }) => row)).toEqual([7]);
    expect(ports.store.journal.list(0, 10).map(({ act }) => act)).toEqual(["sales-imported", "class-created"]);
  });

  it("has the attributes that the match named, settled from their values", async () => {
    const { ports, classId } = await started();
    const assetClass = ports.store.assetClasses.get(classId);
    expect(assetClass).toMatchObject({
      name: "Hoists",
      currencyCode: "EUR",
      priceBasis: { premium: "in", tax: "out" },
      invented: false,
    });
    expect(assetClass.attributes).toMatchObject([
      { key: "hours", label: "Hours", kind: "number", unit: "h", step: 100, decimals: 1 },
      { key: "make", kind: "choice", levels: ["Brannock", "Corvane"] },
      { key: "cabin", kind: "yesNo" },
    ]);
  });

  it("keeps each sale with its row and the verbatim cells", async () => {
    const { ports, classId, outcome } = await started();
    const sales = ports.store.sales.findSales(classId, [1, 2, 3]);
    expect(sales[1]).toMatchObject({
      title: "Corvane K1",
      reference: "A-3",
      soldOn: "2025-03-02",
      priceMinor: 990_050,
      source: "spring list",
      fileRow: 4,
      batchId: outcome.batch.id,
      values: { hours: null, make: "Corvane", cabin: false },
    });
    expect(ports.store.sales.cells(2)).toEqual(["A-3", "Corvane K1", "2025-03-02", "9900.50", "", "Corvane", "no"]);
  });

  it("is not made at all when not one row is a sale", async () => {
    const ports = testPorts();
    const handlers = handlersOf(ports);
    const hopeless = SPRING.replace(/,\d[\d.]*,(\d|,)/g, ",much,$1");
    expect(() =>
      handlers.startClassFromFile({
        ...file("bad.csv", hopeless),
        name: "Hoists",
        itemWord: "hoist",
        options: OPTIONS,
        match: MATCH as never,
      }),
    ).toThrow("Not one of the");
    expect(ports.store.assetClasses.list()).toEqual([]);
    expect(ports.store.journal.count()).toBe(0);
  });

  it("is refused when its bytes did not arrive whole", async () => {
    const ports = testPorts();
    expect(() =>
      handlersOf(ports).previewImport({
        classId: null,
        fileName: "a.csv",
        bytesBase64: "abc",
        options: null,
        match: null,
      }),
    ).toThrow("whole");
  });
});

describe("the preview of an import", () => {
  it("tells the same counts as the import, and changes nothing", async () => {
    const ports = testPorts();
    const preview = (await handlersOf(ports).previewImport({
      ...file("spring.csv", SPRING),
      classId: null,
      options: null,
      match: MATCH as never,
    })) as ImportPreview;
    expect(preview).toMatchObject({ read: 6, accepted: 3, blankRows: 1, options: OPTIONS });
    expect(preview.heldBack).toHaveLength(2);
    expect(preview.duplicates).toHaveLength(1);
    expect(preview.headings).toEqual(["Lot", "Title", "Sold on", "Price", "Hours", "Make", "Cabin"]);
    expect(preview.sampleRows[0]!.row).toBe(2);
    expect(ports.store.assetClasses.list()).toEqual([]);
    expect(ports.store.journal.count()).toBe(0);
  });

  it("remembers the match that was used for the same headings, and finds the whole file again as duplicates", async () => {
    const { handlers, ports, classId } = await started();
    const before = ports.store.assetClasses.dataVersion(classId);
    const preview = (await handlers.previewImport({
      ...file("again.csv", SPRING),
      classId,
      options: null,
      match: null,
    })) as ImportPreview;
    expect(preview.match.columns.map(({ target }) => target)).toEqual([
      { to: "reference" },
      { to: "title" },
      { to: "soldOn" },
      { to: "price" },
      { to: "attribute", key: "hours" },
      { to: "attribute", key: "make" },
      { to: "attribute", key: "cabin" },
    ]);
    expect(preview).toMatchObject({ read: 6, accepted: 0 });
    expect(preview.duplicates).toHaveLength(4);
    expect(ports.store.assetClasses.dataVersion(classId)).toBe(before);
  });
});

describe("a held-back row", () => {
  it("becomes a sale once it is mended, and the counts still add up", async () => {
    const { handlers, ports, classId, outcome } = await started();
    const { id } = heldRow(ports, classId, 3);
    const mended = await handlers.mendHeldBack({ classId, heldBackId: id, cells: { Price: "8250" } });
    expect(mended).toMatchObject({ accepted: true, row: null, saleId: 4 });
    expect(ports.store.sales.findSales(classId, [4])[0]).toMatchObject({
      priceMinor: 825_000,
      fileRow: 3,
      values: { hours: 800, make: "Brannock", cabin: false },
    });
    const { read, accepted, heldBack, duplicates } = ports.store.batches.get(classId, outcome.batch.id);
    expect([read, accepted, heldBack, duplicates]).toEqual([6, 4, 1, 1]);
    expect(ports.store.journal.list(0, 1)[0]).toMatchObject({
      act: "row-mended",
      facts: { saleId: 4, changed: { Price: "8250" } },
    });
    expect(() => handlers.mendHeldBack({ classId, heldBackId: id, cells: {} })).toThrow("not held back");
  });

  it("stays, with what was typed and the new reason, when the mending does not do", async () => {
    const { handlers, ports, classId } = await started();
    const { id } = heldRow(ports, classId, 3);
    const tried = await handlers.mendHeldBack({ classId, heldBackId: id, cells: { Price: "gratis" } });
    expect(tried).toMatchObject({
      accepted: false,
      saleId: null,
      row: { id, cells: { Price: "gratis", Title: "Brannock H3" } },
    });
    expect((await tried).row!.reasons.map(({ column }) => column)).toEqual(["Price"]);
    expect(ports.store.assetClasses.summary(classId)).toMatchObject({ saleCount: 3, heldBackCount: 2 });
  });

  it("stays, and says why, when mending makes it the same as a sale that is there", async () => {
    const { handlers, ports, classId } = await started();
    const { id } = heldRow(ports, classId, 3);
    const twin = { Lot: "A-1", Title: "Brannock H2", Price: "12500", Hours: "1200", Cabin: "yes" };
    const tried = await handlers.mendHeldBack({ classId, heldBackId: id, cells: twin });
    expect(tried.accepted).toBe(false);
    expect(tried.row!.reasons[0]!.reason).toContain("same sale as sale A-1");
  });

  it("refuses cells under a heading that the file has not", async () => {
    const { handlers, ports, classId } = await started();
    const { id } = heldRow(ports, classId, 3);
    expect(() => handlers.mendHeldBack({ classId, heldBackId: id, cells: { Preis: "1" } })).toThrow(
      'no column "Preis"',
    );
  });

  it("can be left out with a reason and stays counted as held back", async () => {
    const { handlers, ports, classId, outcome } = await started();
    const { id } = heldRow(ports, classId, 6);
    expect(handlers.leaveOutHeldBack({ classId, heldBackId: id, reason: "day unknown" })).toEqual({ left: 1 });
    expect(ports.store.batches.get(classId, outcome.batch.id)).toMatchObject({
      read: 6,
      accepted: 3,
      heldBack: 2,
      duplicates: 1,
    });
    expect(ports.store.journal.list(0, 1)[0]!.sentence).toBe("Row 6 of spring.csv left out: day unknown");
  });
});

describe("levels of a choice", () => {
  it("are open for the first file, and a slip of the pen is held back afterwards, until the list has it", async () => {
    const { handlers, ports, classId } = await started();
    const later = `Lot,Title,Sold on,Price,Hours,Make,Cabin\nC-1,Brannock H2,2025-05-01,11000,1300,Branock,yes\n`;
    const outcome = (await handlers.importSales({
      ...file("later.csv", later),
      classId,
      options: OPTIONS,
      match: MATCH as never,
    })) as ImportOutcome;
    expect(outcome.batch).toMatchObject({ read: 1, accepted: 0, heldBack: 1, duplicates: 0 });
    const held = ports.store.heldBack.list(classId).find(({ batchId }) => batchId === outcome.batch.id)!;
    expect(held.reasons[0]).toMatchObject({ column: "Make", value: "Branock", suggestion: "Brannock" });
    const make = ports.store.assetClasses.get(classId).attributes.find(({ key }) => key === "make")!;
    handlers.changeAttribute({
      classId,
      key: "make",
      attribute: { ...make, levels: [...make.levels, "Branock"] },
    });
    const mended = await handlers.mendHeldBack({ classId, heldBackId: held.id, cells: {} });
    expect(mended).toMatchObject({ accepted: true, saleId: 4 });
    expect(ports.store.sales.findSales(classId, [4])[0]!.values.make).toBe("Branock");
  });
});

describe("the demo", () => {
  const demos = ["Hoists (invented)", "Boats (invented)"].map((name) => ({
    assetClass: { ...HOISTS, name, attributes: [attribute("hours", { label: "Hours", unit: "h" })] },
    fileName: `${name}.csv`,
    bytes: new TextEncoder().encode(SPRING),
  }));

  it("is brought in through the import, and only found when it is opened again", () => {
    const ports = testPorts();
    const { classId } = openDemo(ports, demos);
    expect(ports.store.assetClasses.get(classId)).toMatchObject({ name: "Hoists (invented)", invented: true });
    expect(ports.store.assetClasses.list().map(({ name }) => name)).toEqual(["Boats (invented)", "Hoists (invented)"]);
    const batches = ports.store.batches.list(classId);
    expect(batches).toHaveLength(1);
    expect(batches[0]!.accepted).toBeGreaterThan(0);
    const entries = ports.store.journal.count();
    expect(openDemo(ports, demos)).toEqual({ classId });
    expect(ports.store.batches.list(classId)).toEqual(batches);
    expect(ports.store.journal.count()).toBe(entries);
  });

  it("is made whole or not at all", () => {
    const ports = testPorts();
    expect(() => openDemo(ports, [demos[0]!, { ...demos[1]!, bytes: new Uint8Array() }])).toThrow("empty");
    expect(ports.store.assetClasses.list()).toEqual([]);
  });
});

describe("undoing an import", () => {
  it("takes its sales and held-back rows away whole, once, and lets the file be imported again", async () => {
    const { handlers, ports, classId, outcome } = await started();
    expect(handlers.undoBatch({ classId, batchId: outcome.batch.id })).toEqual({ removed: 3 });
    expect(ports.store.assetClasses.summary(classId)).toMatchObject({ saleCount: 0, heldBackCount: 0 });
    expect(handlers.listBatches({ classId })).toMatchObject([{ undone: true, accepted: 3 }]);
    expect(() => handlers.undoBatch({ classId, batchId: outcome.batch.id })).toThrow("undone already");
    const again = (await handlers.importSales({
      ...file("spring.csv", SPRING),
      classId,
      options: OPTIONS,
      match: MATCH as never,
    })) as ImportOutcome;
    expect(again.batch).toMatchObject({ accepted: 3, heldBack: 2, duplicates: 1 });
    expect(ports.store.sales.readColumns(classId).count).toBe(3);
    expect(ports.store.assetClasses.get(classId).attributes).toHaveLength(3);
  });

  it("leaves the sales of other imports alone", async () => {
    const { handlers, ports, classId, outcome } = await started();
    const second = SPRING.replaceAll("A-", "B-").replaceAll("2025-03", "2025-04");
    await handlers.importSales({ ...file("summer.csv", second), classId, options: OPTIONS, match: MATCH as never });
    handlers.undoBatch({ classId, batchId: outcome.batch.id });
    expect(ports.store.sales.findSales(classId, [4, 5, 6]).map(({ reference }) => reference)).toEqual([
      "B-1",
      "B-3",
      "B-5",
    ]);
    expect(ports.store.sales.readColumns(classId).count).toBe(3);
  });
});
