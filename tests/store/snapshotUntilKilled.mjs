// Child of columnSnapshot.test.ts: ends the copy and has it written again, over and over, until killed.
import { fileURLToPath } from "node:url";
import BetterSqlite3 from "better-sqlite3";
import { runnerImport } from "vite";

const [path, classId] = [process.argv[2], Number(process.argv[3])];
const root = fileURLToPath(new URL("../..", import.meta.url));
const { module } = await runnerImport(`${root}src/store/openStore.ts`, { root, configFile: false, logLevel: "error" });
const db = new BetterSqlite3(path);
for (let round = 1; ; round++) {
  db.prepare("UPDATE sales SET price_minor = price_minor + 100 WHERE class_id = ?").run(classId);
  const store = module.openStore(path);
  store.sales.readColumns(classId);
  store.close();
  process.stdout.write(`${round}\n`);
}
