/**
 * The built program as a person meets it: the loopback shell on a store of its own and a browser in front of it. Pictures of each
 * place go to .artefacts/, for people to look at; axe-core reads each place in both themes.
 */
import { type ChildProcess, spawn } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { type Browser, chromium, type Page } from "playwright-core";
import { CHROMIUM_FLAGS } from "../tools.ts";

const top = fileURLToPath(new URL("../..", import.meta.url));
const server = join(top, "out", "main", "server.js");
const pictures = join(top, ".artefacts");
const axeSource = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");

export const demoFile = (name: string): string => join(top, "demo-db", name);

export interface Workshop {
  readonly page: Page;
  readonly folder: string;
  /** What the page wrote to its console as an error, and what it threw. */
  readonly complaints: readonly string[];
  /** Ends the program and leaves the page open. */
  endProgram(): Promise<void>;
  close(): Promise<void>;
}

const SIZE = { width: 1440, height: 900 };
const START_MS = 20_000;

function addressOf(child: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let words = "";
    const late = setTimeout(() => reject(new Error(`the server said no address: ${words}`)), START_MS);
    const listen = (chunk: Buffer): void => {
      words += chunk.toString();
      const found = /http:\/\/\S+/.exec(words);
      if (found === null) return;
      clearTimeout(late);
      resolve(found[0]);
    };
    child.stdout?.on("data", listen);
    child.stderr?.on("data", listen);
    child.on("exit", (code) => reject(new Error(`the server ended with ${code}: ${words}`)));
  });
}

/** Opens the built program on an empty store. Needs `npm test` or `npm run build` to have built it. */
export async function openWorkshop(executablePath: string): Promise<Workshop> {
  if (!existsSync(server)) throw new Error("out/ is not built: run npm test, which builds it first");
  const folder = mkdtempSync(join(tmpdir(), "lotwright-scenario-"));
  const child = spawn(process.execPath, [server, "--store", join(folder, "store.sqlite")], {
    stdio: ["ignore", "pipe", "pipe"],
  });
  let browser: Browser | null = null;
  const endProgram = async (): Promise<void> => {
    if (child.exitCode !== null || child.signalCode !== null) return;
    const ended = new Promise((resolve) => child.once("exit", resolve));
    child.kill();
    await ended;
  };
  const close = async (): Promise<void> => {
    await browser?.close();
    await endProgram();
    rmSync(folder, { recursive: true, force: true });
  };
  try {
    const address = await addressOf(child);
    browser = await chromium.launch({ executablePath, args: [...CHROMIUM_FLAGS] });
    const page = await browser.newPage({ viewport: SIZE, colorScheme: "light", reducedMotion: "reduce" });
    const complaints: string[] = [];
    page.on("pageerror", (error) => complaints.push(error.message));
    page.on("console", (message) => {
      if (message.type() === "error") complaints.push(message.text());
    });
    await page.goto(address);
    return { page, folder, complaints, endProgram, close };
  } catch (cause) {
    await close();
    throw cause;
  }
}

interface AxeResults {
  readonly violations: readonly {
    readonly id: string;
    readonly impact: string | null;
    readonly nodes: readonly { readonly html: string; readonly failureSummary?: string }[];
  }[];
}

/** Serious and critical findings of axe-core, each with the first element it names; empty when there is none. */
export async function seriousFindings(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  const results = (await page.evaluate(
    "axe.run(document, { resultTypes: ['violations'], iframes: false })",
  )) as AxeResults;
  return results.violations
    .filter(({ impact }) => impact === "serious" || impact === "critical")
    .map(
      ({ id, nodes }) => `${id} ×${nodes.length}: ${nodes[0]?.html.slice(0, 160)} ${nodes[0]?.failureSummary ?? ""}`,
    );
}

async function setTheme(page: Page, theme: "light" | "dark"): Promise<void> {
  await page.evaluate((next) => {
    localStorage.setItem("lotwright.theme", next);
    document.documentElement.dataset.theme = next;
  }, theme);
}

/** Takes a picture of the place in both themes and gives axe's serious findings of both. */
export async function lookAt(page: Page, name: string): Promise<string[]> {
  mkdirSync(pictures, { recursive: true });
  const findings: string[] = [];
  for (const theme of ["dark", "light"] as const) {
    await setTheme(page, theme);
    await page.waitForTimeout(80);
    await page.screenshot({ path: join(pictures, `${name}-${theme}.png`) });
    findings.push(...(await seriousFindings(page)).map((finding) => `${name}, ${theme}: ${finding}`));
  }
  return findings;
}

/** True when the page needs no sideways scrolling at this width. */
export async function fitsIn(page: Page, width: number): Promise<boolean> {
  await page.setViewportSize({ width, height: SIZE.height });
  await page.waitForTimeout(120);
  const fits = await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth);
  await page.setViewportSize(SIZE);
  return fits;
}
