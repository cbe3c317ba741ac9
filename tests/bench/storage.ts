// The way from the disk: a store of a million sales to arrays, and a file of sales to cells.
import { join } from "node:path";
import BetterSqlite3 from "better-sqlite3";
import Papa from "papaparse";
import { type Attribute, plainAttribute } from "../../src/domain/attribute.ts";
import type { NewSale } from "../../src/domain/sale.ts";
import { readSalesFile } from "../../src/import/readSalesFile.ts";
import { openStore } from "../../src/store/openStore.ts";
import { type BenchData, drawData } from "./drawData.ts";
import { plainFigure, ratioFigure, type Timed, takeTurns, timeOnce } from "./measure.ts";
import { PAPAPARSE, reachOf } from "./rows.ts";
import { type Session, sized } from "./session.ts";

/** 20 attributes beside price and sold-on day. */
const NUMERIC = 16;
const LEVELS = [6, 5, 25, 16];
const BATCH = 50_000;

function attributes(): Attribute[] {
  const numbers = Array.from({ length: NUMERIC }, (_, j) =>
    plainAttribute({ key: `n${j}`, label: `Number ${j}`, kind: "number", decimals: 2 }),
  );
  const choices = LEVELS.map((count, c) => {
    const levels = Array.from({ length: count }, (_, at) => `level ${at}`);
    return plainAttribute({ key: `c${c}`, label: `Choice ${c}`, kind: "choice", levels });
  });
  return [...numbers, ...choices];
}

function saleAt({ numbers, codes, response }: BenchData, i: number): NewSale {
  const values: Record<string, number | string> = {};
  numbers.forEach((column, j) => {
    values[`n${j}`] = column[i]!;
  });
  codes.forEach((column, c) => {
    values[`c${c}`] = `level ${column[i]}`;
  });
  return {
    reference: null,
    title: "invented",
    soldOn: `202${i % 6}-0${1 + (i % 9)}-1${i % 10}`,
    priceMinor: Math.round(100 * response[i]!),
    currencyCode: "EUR",
    priceBasis: { premium: "in", tax: "out" },
    channel: "auction",
    source: "benchmark",
    notes: "",
    values,
  };
}

function fillStore(path: string, rows: number): number {
  const store = openStore(path);
  const data = drawData({ rows, numeric: NUMERIC, levels: LEVELS });
  const { id: classId } = store.assetClasses.insert({
    name: "Invented",
    itemWord: "item",
    currencyCode: "EUR",
    priceBasis: { premium: "in", tax: "out" },
    invented: true,
    attributes: attributes(),
  });
  for (let from = 0; from < rows; from += BATCH) {
    const sales = Array.from({ length: Math.min(BATCH, rows - from) }, (_, k) => ({
      row: null,
      cells: null,
      sale: saleAt(data, from + k),
    }));
    store.transaction(() => store.sales.insertSales(classId, null, sales));
  }
  store.close();
  return classId;
}

/** Milliseconds of the first reading in a window opened for it. */
function readAnew(path: string, classId: number, rows: number): number {
  const store = openStore(path, { busyTimeoutMs: 0 });
  try {
    const ms = timeOnce(() => {
      const { ids } = store.sales.readColumns(classId);
      if (ids.length !== rows) throw new Error(`${ids.length} sales came back where ${rows} were put in`);
      return ids;
    });
    return ms;
  } finally {
    store.close();
  }
}

async function load(session: Session): Promise<void> {
  if (!session.wants("load")) return;
  const rows = session.isQuick ? 60_000 : 1_000_000;
  session.say(`filling a store with ${rows} sales (not timed) …`);
  const path = join(session.folder, "sales.sqlite");
  const classId = fillStore(path, rows);
  const other = new BetterSqlite3(path);
  session.say("reading it …");
  const forget = (): void => {
    other.exec("DELETE FROM snapshot_stamps");
  };
  // While another window is writing, no copy can be left behind: what is timed is the rows alone.
  const fromRows: Timed = () => {
    forget();
    const store = openStore(path, { busyTimeoutMs: 0 });
    other.exec("BEGIN IMMEDIATE");
    try {
      return timeOnce(() => store.sales.readColumns(classId).ids);
    } finally {
      other.exec("ROLLBACK");
      store.close();
    }
  };
  const firstTime: Timed = () => {
    forget();
    return readAnew(path, classId, rows);
  };
  const fromCopy: Timed = () => readAnew(path, classId, rows);
  const [rowsMs, firstMs, copyMs] = await takeTurns([fromRows, firstTime, fromCopy]);
  other.close();
  const figure = (what: string, ms: readonly number[]): void =>
    session.add(plainFigure({ row: "load", what }, "ms", ms, reachOf("load", what)));
  figure("rows to arrays", rowsMs!);
  figure("rows to arrays, columnar copy written too (first time)", firstMs!);
  figure("from the columnar copy", copyMs!);
}

function textOf({ numbers, codes, response }: BenchData): string {
  const heading = ["price", ...numbers.map((_, j) => `number ${j}`), ...codes.map((_, c) => `choice ${c}`)].join(",");
  const lines = Array.from(response, (price, i) =>
    [
      price.toFixed(2),
      ...numbers.map((column) => column[i]!.toFixed(2)),
      ...codes.map((column) => `"level ${column[i]}"`),
    ].join(","),
  );
  return `${heading}\n${lines.join("\n")}\n`;
}

async function importing(session: Session): Promise<void> {
  if (!session.wants("import")) return;
  session.say("reading a file of sales …");
  const data = drawData({ rows: sized(session, 100_000), numeric: 17, levels: LEVELS });
  const bytes = new TextEncoder().encode(textOf(data));
  const ours: Timed = () => timeOnce(() => readSalesFile(bytes, "sales.csv", null));
  const plain: Timed = () => timeOnce(() => Papa.parse<string[]>(new TextDecoder().decode(bytes), { delimiter: "," }));
  const [mine, theirs] = await takeTurns([ours, plain]);
  session.add(ratioFigure({ row: "import", what: PAPAPARSE }, mine!, theirs!, reachOf("import", PAPAPARSE)));
}

export async function benchStorage(session: Session): Promise<void> {
  await load(session);
  await importing(session);
}
