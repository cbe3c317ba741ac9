// Measures two layouts for user-defined attributes: the store's wide table per class, and one row per sale and attribute.
// By hand: npx node tests/store/measure/measureLayouts.mjs [sales, default 1000000] [wide|tall|both]
// Data is made from a fixed seed in a temporary folder and deleted afterwards.
import { mkdtempSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import BetterSqlite3 from "better-sqlite3";
import { runnerImport } from "vite";

const COUNT = Number(process.argv[2] ?? 1_000_000);
const WHICH = process.argv[3] ?? "both";
const root = fileURLToPath(new URL("../../..", import.meta.url));
const folder = mkdtempSync(join(tmpdir(), "lotwright-measure-"));
const MAKES = ["Brannock", "Corvane", "Dunmere", "Eskdal", "Fenwright", "Garrod", "Holmstead", "Ilvane"];

let state = 20260101;
function random() {
  state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
  return state / 4294967296;
}

function timed(label, work, times = 1) {
  const took = [];
  let result;
  for (let k = 0; k < times; k++) {
    const from = performance.now();
    result = work();
    took.push(performance.now() - from);
  }
  console.log(`${label.padEnd(64)} ${took.map((ms) => ms.toFixed(1)).join(" / ")} ms`);
  return result;
}

/** 14 numbers, 4 choices, one yes/no, one built day; 3 % not known. */
const attributes = Array.from({ length: 20 }, (_, k) => ({
  key: `a${k + 1}`,
  label: `Attribute ${k + 1}`,
  kind: k < 14 ? "number" : k < 18 ? "choice" : k === 18 ? "yesNo" : "built",
  unit: null,
  step: 1,
  levels: k >= 14 && k < 18 ? MAKES : [],
  lowest: null,
  highest: null,
  expectedDirection: null,
  notes: "",
  decimals: 0,
  archived: false,
}));
const CHANNELS = ["auction", "dealer", "private", "asking"];

function makeSale(i) {
  const values = {};
  for (const { key, kind } of attributes) {
    if (random() < 0.03) values[key] = null;
    else if (kind === "number") values[key] = Math.round(random() * 1e5) / 10;
    else if (kind === "choice") values[key] = MAKES[Math.floor(random() * 8)];
    else if (kind === "yesNo") values[key] = random() < 0.5;
    else values[key] = `20${10 + Math.floor(random() * 10)}-0${1 + Math.floor(random() * 9)}-15`;
  }
  return {
    reference: `L-${i}`,
    title: `${MAKES[Math.floor(random() * 8)]} model ${Math.floor(random() * 40)}`,
    soldOn: `202${Math.floor(random() * 6)}-0${1 + Math.floor(random() * 9)}-1${Math.floor(random() * 10)}`,
    priceMinor: 1_000_00 + Math.floor(random() * 90_000_00),
    currencyCode: "EUR",
    priceBasis: { premium: "in", tax: "out" },
    channel: CHANNELS[Math.floor(random() * 4)],
    source: `list ${i % 50}`,
    notes: "",
    values,
  };
}

async function measureWide() {
  const { module } = await runnerImport(join(root, "src/store/openStore.ts"), { root, logLevel: "error" });
  const path = join(folder, "wide.sqlite");
  const store = module.openStore(path);
  const assetClass = {
    name: "Measured",
    itemWord: "item",
    currencyCode: "EUR",
    priceBasis: { premium: "in", tax: "out" },
    invented: true,
    attributes,
  };
  const { id: classId } = store.transaction(() => store.assetClasses.insert(assetClass));
  const incoming = Array.from({ length: COUNT }, (_, i) => ({ row: i + 2, sale: makeSale(i), cells: null }));
  console.log(`wide table per class, ${COUNT} sales x ${attributes.length} attributes`);
  timed("insert with all indexes", () => store.transaction(() => store.sales.insertSales(classId, null, incoming)));
  incoming.length = 0;
  console.log(`file ${(statSync(path).size / 1e6).toFixed(0)} MB`);
  for (let k = 0; k < 3; k++) {
    store.transaction(() => store.assetClasses.raiseRowsVersion(classId));
    timed("scan of every column into arrays (text columns too)", () => store.sales.readColumns(classId));
  }
  await measureAttributesAlone(path, classId, store.attributes.listStored(classId));
  store.transaction(() => store.sales.setAside(classId, [1], "measured", "2026-01-01", "measured"));
  timed("scan again after one sale was set aside", () => store.sales.readColumns(classId));
  const all = {
    search: "",
    soldFrom: null,
    soldTo: null,
    channels: null,
    state: "any",
    verified: "any",
    batchId: null,
    values: {},
  };
  const between = (low, high) => ({ low, high, levels: null, missing: null });
  const levels = (...names) => ({ low: null, high: null, levels: names, missing: null });
  const pages = {
    "no filter, by sold on": [all, "soldOn", true, 0],
    "no filter, by a1, offset 500,000": [all, "a1", false, 500_000],
    "make = Brannock, by price": [{ ...all, values: { a15: levels("Brannock") } }, "price", true, 0],
    "a1 in a tenth, by price": [{ ...all, values: { a1: between(0, 1000) } }, "price", true, 0],
    "a1 in a thousandth, by a2": [{ ...all, values: { a1: between(0, 10) } }, "a2", true, 0],
    "auction, sold in 2024, by a3": [
      { ...all, channels: ["auction"], soldFrom: "2024-01-01", soldTo: "2024-12-31" },
      "a3",
      false,
      0,
    ],
    "make, a1 in a tenth, a2 in a tenth, sold from 2025, by price": [
      {
        ...all,
        soldFrom: "2025-01-01",
        values: { a15: levels("Brannock"), a1: between(0, 1000), a2: between(0, 1000) },
      },
      "price",
      true,
      0,
    ],
    "text found in title, reference, source, notes, by sold on": [{ ...all, search: "model 7" }, "soldOn", true, 0],
  };
  for (const [label, [filter, by, descending, offset]] of Object.entries(pages)) {
    const query = { classId, offset, limit: 50, sort: { by, descending }, filter };
    const page = timed(`page of 50: ${label}`, () => store.sales.listSales(query), 3);
    console.log(`${" ".repeat(12)}${page.total} hits`);
  }
  store.close();
}

/** The attributes of the wide table alone, block by block into typed arrays, packed as readColumns packs them. */
async function measureAttributesAlone(path, classId, stored) {
  const load = async (file) => (await runnerImport(join(root, file), { root, logLevel: "error" })).module;
  const { packColumns, unpackInto } = await load("src/store/packedColumns.ts");
  const { valuesTable } = await load("src/store/attributeTables.ts");
  const db = new BetterSqlite3(path, { readonly: true });
  const packed = packColumns(stored);
  const select = db
    .prepare(
      `SELECT ${packed.map(({ sql }) => sql).join(", ")} FROM ${valuesTable(classId)} WHERE sale_id >= ? AND sale_id < ? ORDER BY sale_id`,
    )
    .raw();
  const scan = () => {
    const arrays = stored.map(() => new Float64Array(COUNT));
    for (let low = 1, at = 0; at < COUNT; low += 8192) {
      const rows = select.all(low, low + 8192);
      for (let r = 0; r < rows.length; r++) {
        for (let k = 0; k < packed.length; k++) {
          const { numberAt, digits } = packed[k];
          if (numberAt === null) unpackInto(arrays, digits, rows[r][k], at + r);
          else arrays[numberAt][at + r] = rows[r][k] ?? Number.NaN;
        }
      }
      at += rows.length;
    }
  };
  timed("scan of the 20 attributes alone into arrays", scan, 5);
  db.close();
}

function measureTall() {
  const path = join(folder, "tall.sqlite");
  const db = new BetterSqlite3(path);
  db.pragma("journal_mode = WAL");
  db.pragma("synchronous = FULL");
  db.exec(`CREATE TABLE sales (id INTEGER PRIMARY KEY, sold_on INTEGER NOT NULL, price_minor INTEGER NOT NULL, title TEXT NOT NULL) STRICT;
    CREATE TABLE facts (sale_id INTEGER NOT NULL, attribute_id INTEGER NOT NULL, value REAL, PRIMARY KEY (sale_id, attribute_id)) STRICT, WITHOUT ROWID`);
  const sale = db.prepare("INSERT INTO sales VALUES (?, ?, ?, ?)");
  const fact = db.prepare("INSERT INTO facts VALUES (?, ?, ?)");
  console.log(`one row per sale and attribute, ${COUNT} sales x ${attributes.length} attributes`);
  timed("insert", () =>
    db.transaction(() => {
      for (let i = 1; i <= COUNT; i++) {
        sale.run(i, 18000 + Math.floor(random() * 2000), 1e5 + Math.floor(random() * 9e6), `model ${i % 40}`);
        for (let k = 1; k <= 20; k++) {
          const value = k > 14 && k < 19 ? Math.floor(random() * 8) : Math.round(random() * 1e5) / 10;
          if (random() >= 0.03) fact.run(i, k, value);
        }
      }
    })(),
  );
  timed("indexes", () =>
    db.exec("CREATE INDEX f ON facts (attribute_id, value, sale_id); CREATE INDEX p ON sales (price_minor); ANALYZE"),
  );
  console.log(`file ${(statSync(path).size / 1e6).toFixed(0)} MB`);
  timed(
    "scan of attributes into arrays",
    () => {
      const arrays = Array.from({ length: 21 }, () => new Float64Array(COUNT).fill(Number.NaN));
      const block = db
        .prepare("SELECT sale_id, attribute_id, value FROM facts WHERE sale_id >= ? AND sale_id < ?")
        .raw();
      for (let low = 1; low <= COUNT; low += 8192)
        for (const row of block.all(low, low + 8192)) arrays[row[1]][row[0] - 1] = row[2];
    },
    2,
  );
  const make = "SELECT 1 FROM facts f WHERE f.sale_id = s.id AND f.attribute_id = 15 AND f.value = 0";
  timed(
    "page of 50: make = level 0, by price",
    () => db.prepare(`SELECT s.id FROM sales s WHERE EXISTS (${make}) ORDER BY s.price_minor DESC LIMIT 50`).all(),
    3,
  );
  timed(
    "its number of hits",
    () => db.prepare("SELECT count(*) FROM facts WHERE attribute_id = 15 AND value = 0").get(),
    3,
  );
  timed(
    "number of hits: a1 in a tenth and a2 in a tenth",
    () =>
      db
        .prepare(
          "SELECT count(*) FROM facts a JOIN facts b ON b.sale_id = a.sale_id AND b.attribute_id = 2 AND b.value <= 1000 WHERE a.attribute_id = 1 AND a.value <= 1000",
        )
        .get(),
    3,
  );
  db.close();
}

try {
  if (WHICH !== "tall") await measureWide();
  if (WHICH !== "wide") measureTall();
} finally {
  rmSync(folder, { recursive: true, force: true });
}
