import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../../src/app/handlers.ts";
import type { PricePart } from "../../../src/domain/appraisal.ts";
import type { StoredHeldBackRow } from "../../../src/domain/importRecord.ts";
import type { Sale } from "../../../src/domain/sale.ts";
import { columnsFor, priceText, valueText } from "../../../src/screens/sales/columns.ts";
import { EvidenceCounts } from "../../../src/screens/sales/EvidenceCounts.tsx";
import { evidenceSentence, outLines, stateOfSales } from "../../../src/screens/sales/evidenceState.ts";
import {
  channelWords,
  isFiltered,
  NO_FILTER,
  soldWords,
  stateWords,
  valueWords,
  withValue,
} from "../../../src/screens/sales/filters.ts";
import { byFile, fileWords, mainReason } from "../../../src/screens/sales/HeldBackRows.tsx";
import { headingsAtFault } from "../../../src/screens/sales/MendRow.tsx";
import { initialsOf, RegisterRow } from "../../../src/screens/sales/RegisterRow.tsx";
import { reasonOf, setAsideWords } from "../../../src/screens/sales/setAsideWords.ts";
import type { Workbench } from "../../../src/screens/workbench/workbench.ts";
import { testPorts } from "../../app/ports.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

let bench: Workbench;
let sales: readonly Sale[];

type Handlers = ReturnType<typeof createHandlers>;

/** The demo in a store of the test's own. */
async function demoHandlers(): Promise<Handlers> {
  const handlers = createHandlers(testPorts());
  await handlers.openDemo({});
  return handlers;
}

/** All sales that the filter lets through. */
async function listed(handlers: Handlers, filter = NO_FILTER): Promise<readonly Sale[]> {
  const found: Sale[] = [];
  const query = { classId: bench.classId!, sort: { by: "id", descending: false }, filter, limit: 500 };
  for (const offset of [0, 500]) found.push(...(await handlers.listSales({ ...query, offset } as never)).rows);
  return found;
}

beforeAll(async () => {
  bench = await demoBench();
  sales = await listed(await demoHandlers());
});

describe("the state of a sale", () => {
  test("is that of the fit's own account, for every sale of the register", () => {
    const account = bench.appraisal!.evidence;
    const stateOf = stateOfSales(account, bench.assetClass!.attributes);
    const words = sales.map((sale) => stateOf(sale));
    expect(words.filter(({ mark }) => mark === "in")).toHaveLength(account.used);
    expect(words.filter(({ mark }) => mark === "setAside")).toHaveLength(14);
    expect(words.filter(({ words: said }) => said === "filtered: asking")).toHaveLength(18);
    expect(words.filter(({ words: said }) => said === "hours missing")).toHaveLength(11);
  });

  test("is unknown while there is no account, but a set-aside is known by the sale itself", () => {
    const stateOf = stateOfSales(null, []);
    expect(stateOf({ id: 1, setAside: null }).mark).toBe("unknown");
    expect(stateOf({ id: 1, setAside: { reason: "forced sale", by: "A", on: "2026-01-01" } }).words).toBe(
      "set aside: forced sale",
    );
  });

  test("follows a sale that was put back before the account has", () => {
    const account = bench.appraisal!.evidence;
    const id = account.out.find(({ reason }) => reason === "set-aside")!.saleIds[0]!;
    expect(stateOfSales(account, [])({ id, setAside: null }).mark).toBe("in");
  });

  test("adds up on the page: register less each line is the evidence, and each list leads to as many sales", async () => {
    const account = bench.appraisal!.evidence;
    const lines = outLines(account, bench.model!);
    expect(account.read - lines.reduce((sum, { count }) => sum + count, 0)).toBe(account.used);
    const handlers = await demoHandlers();
    for (const { count, filter } of lines) expect((await listed(handlers, filter!)).length).toBe(count);
    const words = wordsOf(
      draw(bench, <EvidenceCounts account={account} model={bench.model!} whose="now" onList={() => undefined} />),
    );
    expect(words).toContain("597 of 640 sales are evidence; 43 are not, and each says why.");
    expect(words).toContain("−14 set aside by a person, with a reason");
  });

  test("says so when every sale counts", () => {
    const account = { ...bench.appraisal!.evidence, read: 12, used: 12, out: [] };
    expect(evidenceSentence(account)).toEqual({ strong: "12", rest: " of 12 sales are evidence: all of them." });
  });
});

describe("a row of the register", () => {
  test("says its state in words, its place among all rows, and what is not known", () => {
    const sale = sales.find(({ values }) => values.hours === null || values.hours === undefined)!;
    const stateOf = stateOfSales(bench.appraisal!.evidence, bench.assetClass!.attributes);
    const columns = columnsFor(bench.assetClass!, 940);
    const html = draw(
      bench,
      <table>
        <tbody>
          <RegisterRow
            index={41}
            sale={sale}
            columns={columns}
            state={stateOf(sale)}
            isPicked={false}
            isSettingAside={false}
            cursorColumn={null}
            onPoint={() => undefined}
            onPick={() => undefined}
          />
        </tbody>
      </table>,
    );
    expect(html).toContain('aria-rowindex="43"');
    expect(wordsOf(html)).toContain("not known");
    expect(wordsOf(html)).toMatch(/hours missing|filtered|set aside/);
  });

  test("shows the age at sale of a built day, and cents only where there are some", () => {
    const built = bench.assetClass!.attributes.find(({ kind }) => kind === "built")!;
    expect(valueText(built, "2016-01-01", "2026-01-01")).toBe("10.0");
    expect(valueText(built, null, "2026-01-01")).toBe("");
    expect(priceText({ ...sales[0]!, priceMinor: 1_234_500, currencyCode: "EUR" })).toBe("12,345");
    expect(priceText({ ...sales[0]!, priceMinor: 1_234_550, currencyCode: "EUR" })).toBe("12,345.50");
    expect([initialsOf("M. Ansell"), initialsOf("Thorley"), initialsOf("not stated")]).toEqual(["MA", "Thorley", ""]);
  });

  test("gives attributes room as far as the width goes, and hides what is hidden", () => {
    const ids = (width: number, hidden?: ReadonlySet<string>) =>
      columnsFor(bench.assetClass!, width, hidden).map(({ id }) => id);
    expect(ids(500)).toEqual(["reference", "soldOn", "title", "price", "verified", "state"]);
    expect(ids(700)).toContain("channel");
    expect(ids(920)).toContain("hours");
    expect(ids(920, new Set(["hours"]))).not.toContain("hours");
    expect(ids(3000)).toHaveLength(7 + 11);
  });
});

describe("setting aside", () => {
  const inEvidence = { mark: "in", words: "in evidence" } as const;

  test("says by how much the price would move without a sale that pulls it", () => {
    const priced = bench.appraisal!.priced!;
    const pull = priced.pull.top[0]!;
    const sale = sales.find(({ id }) => id === pull.sale)!;
    const words = setAsideWords(priced, [sale], [inEvidence], "EUR");
    expect(words).toMatch(/^It carries \d\.\d\u00a0% of this price\. Without it the price moves by [+−]?€/);
    expect(words).toContain("as rounded");
  });

  test("promises no move for a sale that pulls little, is no evidence, or where nothing is priced", () => {
    const priced = bench.appraisal!.priced!;
    const listed = new Set(priced.pull.top.map(({ sale }) => sale));
    const far = sales.find(({ id }) => !listed.has(id))!;
    expect(setAsideWords(priced, [far], [inEvidence], "EUR")).toMatch(/not among the 40 sales .* less than/);
    const out = { mark: "filtered", words: "filtered: asking" } as const;
    expect(setAsideWords(priced, [far], [out], "EUR")).toContain("so the price stays");
    expect(setAsideWords(null, [far], [inEvidence], "EUR")).toContain("no price on the table");
  });

  test("adds up what several sales carry", () => {
    const priced: PricePart = bench.appraisal!.priced!;
    const two = priced.pull.top.slice(0, 2).map(({ sale }) => sales.find(({ id }) => id === sale)!);
    const words = setAsideWords(priced, two, [inEvidence, inEvidence], "EUR");
    const sum = (priced.pull.top[0]!.weight + priced.pull.top[1]!.weight) * 100;
    expect(words).toContain(`${sum.toFixed(1)}\u00a0% of this price`);
  });

  test("puts the chosen reason and the person's own words together", () => {
    expect(reasonOf("forced sale", "")).toBe("forced sale");
    expect(reasonOf("forced sale", " seized ")).toBe("forced sale: seized");
    expect(reasonOf(null, "traded in")).toBe("traded in");
    expect(reasonOf(null, "  ")).toBe("");
  });
});

describe("filters in words", () => {
  test("say what is set and nothing when nothing is", () => {
    expect(isFiltered(NO_FILTER)).toBe(false);
    expect(isFiltered({ ...NO_FILTER, search: "quern" })).toBe(false);
    expect(soldWords({ ...NO_FILTER, soldFrom: "2025-01-02" })).toBe("from 2\u00a0Jan\u00a02025");
    expect(channelWords({ ...NO_FILTER, channels: ["auction", "dealer", "private"] })).toBe("all but asking");
    expect(channelWords({ ...NO_FILTER, channels: [] })).toBe("none");
    expect(stateWords({ ...NO_FILTER, state: "in", verified: "no" })).toBe("not set aside, not verified");
  });

  test("keep one part per attribute and drop an empty one", () => {
    const hours = bench.assetClass!.attributes.find(({ key }) => key === "hours")!;
    const narrowed = withValue(NO_FILTER, "hours", { low: 1000 });
    expect(isFiltered(narrowed)).toBe(true);
    expect(valueWords(hours, narrowed.values.hours!)).toBe("hours from 1,000");
    expect(withValue(narrowed, "hours", { low: null })).toEqual(NO_FILTER);
  });
});

describe("held-back rows", () => {
  const row = (id: number, batchId: number, over: Partial<StoredHeldBackRow> = {}): StoredHeldBackRow => ({
    id,
    batchId,
    row: id,
    fileName: "list.csv",
    cells: { Lot: "7", Price: "38.500,—", Sold: "31.02.2025" },
    reasons: [],
    ...over,
  });
  const reason = (column: string | null, suggestion: string | null) => ({
    column,
    value: "x",
    reason: "Why.",
    suggestion,
  });

  test("stand by their file, the last one first", () => {
    const files = byFile([row(5, 1), row(2, 2), row(1, 2)]);
    expect(files.map((own) => own.map(({ id }) => id))).toEqual([[1, 2], [5]]);
    const batch = { id: 2, fileName: "list.csv", read: 46, accepted: 37 } as never;
    expect(fileWords(files[0]![0]!, [batch])).toBe("list.csv: 46 rows, 37 taken in");
  });

  test("are shown by the reason that can be answered with one press", () => {
    const suggested = reason("Price", "38500");
    expect(mainReason([reason("Sold", null), suggested])).toBe(suggested);
    expect(mainReason([])).toBeNull();
  });

  test("are mended in the cells at fault, or in all when no single cell is", () => {
    expect(headingsAtFault(row(1, 1, { reasons: [reason("Sold", null), reason("Price", null)] }))).toEqual([
      "Price",
      "Sold",
    ]);
    expect(headingsAtFault(row(1, 1, { reasons: [reason(null, null)] }))).toEqual(["Lot", "Price", "Sold"]);
  });
});
