/**
 * `npm test`: types, style and the tests, and at the end one line "N passed, N failed" alone. Types and style count as one
 * check each. Whatever could not be run counts as failed, never as passed.
 */
import { spawn } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import type { TestCounts } from "./countReporter.ts";

const top = fileURLToPath(new URL("..", import.meta.url));
const tool = (path: string): string => join(top, "node_modules", path);

/** True when the tool ended with 0; its words are printed together, so that two tools at once do not mix. */
function check(name: string, args: string[], env: NodeJS.ProcessEnv = process.env, live = false): Promise<boolean> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, {
      cwd: top,
      env,
      stdio: live ? "inherit" : ["ignore", "pipe", "pipe"],
    });
    let words = "";
    for (const stream of [child.stdout, child.stderr]) stream?.on("data", (text: Buffer) => (words += text.toString()));
    child.on("error", () => resolve(false));
    child.on("close", (code) => {
      if (!live) console.log(code === 0 ? `${name}: passed` : `${name}: FAILED\n${words}`);
      resolve(code === 0);
    });
  });
}

async function runTests(): Promise<TestCounts> {
  const folder = mkdtempSync(join(tmpdir(), "lotwright-counts-"));
  const path = join(folder, "counts.json");
  const reporters = ["--reporter=default", "--reporter=./tests/countReporter.ts"];
  const args = [tool("vitest/vitest.mjs"), "run", "--config", "tests/vitest.config.ts", ...reporters];
  const wentWell = await check(
    "tests",
    [...args, ...process.argv.slice(2)],
    { ...process.env, LOTWRIGHT_TEST_COUNTS: path },
    true,
  );
  const nothing: TestCounts = { passed: 0, failed: 0, skipped: 0, missing: {} };
  const counts = existsSync(path) ? (JSON.parse(readFileSync(path, "utf8")) as TestCounts) : nothing;
  rmSync(folder, { recursive: true, force: true });
  if (!wentWell && counts.failed === 0) counts.failed = 1;
  if (wentWell && counts.passed === 0) counts.failed++;
  return counts;
}

const quick = await Promise.all([
  check("types", [tool("typescript/bin/tsc"), "--noEmit"]),
  check("style", [tool("@biomejs/biome/bin/biome"), "check", "--config-path=.biome.json", "."]),
]);
const counts = await runTests();
const passed = counts.passed + quick.filter(Boolean).length;
const failed = counts.failed + quick.filter((ok) => !ok).length;

for (const [name, number] of Object.entries(counts.missing)) {
  console.log(`\n*** ${number} TESTS SKIPPED: they need ${name}, which was not found on this machine. ***`);
}
const skipped = counts.skipped > 0 ? `, ${counts.skipped} skipped` : "";
console.log(`\n${passed} passed, ${failed} failed${skipped}`);
process.exitCode = failed === 0 ? 0 : 1;
