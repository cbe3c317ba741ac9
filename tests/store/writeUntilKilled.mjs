// Child of openStore.test.ts: commits ten sales and a journal entry at a time, says each number once it is committed, until killed.
import { fileURLToPath } from "node:url";
import { runnerImport } from "vite";

const [path, classId] = [process.argv[2], Number(process.argv[3])];
const root = fileURLToPath(new URL("../..", import.meta.url));
const { module } = await runnerImport(`${root}src/store/openStore.ts`, { root, configFile: false, logLevel: "error" });
const store = module.openStore(path);
const sale = {
  reference: null,
  title: "Brannock H2",
  soldOn: "2025-03-01",
  priceMinor: 1_234_500,
  currencyCode: "EUR",
  priceBasis: { premium: "in", tax: "out" },
  channel: "auction",
  source: "spring list",
  notes: "",
  values: { hours: 1200 },
};
const ten = Array.from({ length: 10 }, () => ({ row: null, sale, cells: null }));
for (let commits = 1; ; commits++) {
  store.transaction(() => {
    store.sales.insertSales(classId, null, ten);
    store.journal.append({
      atUtc: "2026-01-01T00:00:00Z",
      by: "test",
      act: "sales-imported",
      assetClassId: classId,
      sentence: "Ten.",
      facts: {},
    });
  });
  process.stdout.write(`${commits}\n`);
}
