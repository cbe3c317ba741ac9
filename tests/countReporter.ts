/** Writes what vitest counted to the file named in LOTWRIGHT_TEST_COUNTS, for tests/runAll.ts to add up. */
import { writeFileSync } from "node:fs";
import type { Reporter, TestModule } from "vitest/node";

export interface TestCounts {
  passed: number;
  failed: number;
  skipped: number;
  /** Skipped tests by what they need and did not find: "chromium" → 12. */
  missing: Record<string, number>;
}

const NEEDS = /\(needs ([a-z]+)\)/;

function countModule(module: TestModule, counts: TestCounts): void {
  for (const test of module.children.allTests()) {
    const { state } = test.result();
    if (state === "passed") counts.passed++;
    if (state === "failed") counts.failed++;
    if (state !== "skipped") continue;
    counts.skipped++;
    const tool = NEEDS.exec(test.fullName)?.[1];
    if (tool !== undefined) counts.missing[tool] = (counts.missing[tool] ?? 0) + 1;
  }
  // A file that can't even be read has no tests to count, and must not pass for that.
  if (module.errors().length > 0) counts.failed++;
}

export default class CountReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    const path = process.env.LOTWRIGHT_TEST_COUNTS;
    if (path === undefined) return;
    const counts: TestCounts = { passed: 0, failed: errors.length, skipped: 0, missing: {} };
    for (const module of modules) countModule(module, counts);
    writeFileSync(path, JSON.stringify(counts));
  }
}
