/**
 * Programs that some tests look through: a browser, PDF tools. A group that needs one is skipped where it is missing, and says
 * so in its name, from which `npm test` counts it aloud.
 */
import { existsSync } from "node:fs";
import { delimiter, join } from "node:path";
import { describe } from "vitest";

const NAMES = {
  chromium: ["chromium", "chromium-browser", "google-chrome", "google-chrome-stable"],
  pdftotext: ["pdftotext"],
  pdftoppm: ["pdftoppm"],
  qpdf: ["qpdf"],
} as const;
export type Tool = keyof typeof NAMES;

/** Path of the program, or null. CHROMIUM names a browser that is to be used before any other. */
export function findTool(tool: Tool): string | null {
  const named = tool === "chromium" ? process.env.CHROMIUM : undefined;
  if (named !== undefined && existsSync(named)) return named;
  for (const folder of (process.env.PATH ?? "").split(delimiter)) {
    for (const name of NAMES[tool]) if (folder !== "" && existsSync(join(folder, name))) return join(folder, name);
  }
  return null;
}

/** A group of tests that is given the program's path, or is skipped whole. */
export function describeNeeding(tool: Tool, name: string, tests: (path: string) => void): void {
  const path = findTool(tool);
  describe.skipIf(path === null)(`${name} (needs ${tool})`, () => tests(path ?? ""));
}

/** Chromium flags for tests: no sandbox (it can't be had as root), nothing in the background, nothing over the network. */
export const CHROMIUM_FLAGS = [
  "--no-sandbox",
  "--disable-gpu",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
] as const;
