/**
 * `npm start`: first the main job on the demo class, in memory and said in a paragraph; then the window — Electron where its
 * binary and a display are there, else the same screens in a browser window of their own, else the address to open.
 */
import { spawn } from "node:child_process";
import { AppError, sentenceOf } from "../../domain/errors.ts";
import { askingOver, CoreFailure } from "../asking.ts";
import { serveUntilInterrupted, startServing } from "../browser/serve.ts";
import { dataFolder, usualStorePath } from "../dataFolder.ts";
import { demoParagraph } from "../demoParagraph.ts";
import { runDemo } from "../demoRun.ts";
import { logToFile, openWorkshop } from "../openWorkshop.ts";
import { programRoot } from "../programFiles.ts";
import { browserCommand, electronCommand, findBrowser, findElectron, hasDisplay } from "./windows.ts";

/** An Electron that ends sooner than this, and badly, could not open at all. */
const OPENING_MS = 15_000;

async function sayDemo(): Promise<void> {
  const workshop = openWorkshop({ storePath: ":memory:" });
  try {
    process.stdout.write(`${demoParagraph(await runDemo(askingOver(workshop.ask)))}\n`);
  } finally {
    workshop.close();
  }
}

/** Exit code of the program, or null when it could not be started. */
function runWindow(command: string, args: readonly string[], words: "inherit" | "ignore"): Promise<number | null> {
  return new Promise((resolve) => {
    const child = spawn(command, args, { stdio: ["ignore", words, words] });
    const end = (): void => void child.kill();
    process.once("SIGINT", end);
    process.once("SIGTERM", end);
    child.once("error", () => resolve(null));
    child.once("exit", (code) => resolve(code ?? 0));
  });
}

/** True when Electron opened; false when it is missing or failed at once. */
async function openElectron(): Promise<boolean> {
  const electron = findElectron(programRoot());
  if (electron === null || !hasDisplay()) return false;
  const began = Date.now();
  const code = await runWindow(electron, electronCommand(programRoot()), "inherit");
  if (code === 0 || Date.now() - began > OPENING_MS) return true;
  process.stderr.write("Electron's window could not be opened; going on in a browser window.\n");
  return false;
}

async function openBrowser(): Promise<void> {
  const workshop = openWorkshop({ storePath: usualStorePath() });
  try {
    const browser = hasDisplay() ? findBrowser() : null;
    if (browser === null) return await serveUntilInterrupted(workshop, 0);
    const server = await startServing(workshop, 0);
    process.stdout.write("Lotwright is open in a window of its own; close it, or press Ctrl-C here, to end.\n");
    const code = await runWindow(browser, browserCommand(server.addressForOnce(), dataFolder()), "ignore");
    await server.close();
    if (code !== null && code === 0) return;
    process.stderr.write("The browser window could not be opened.\n");
    await serveUntilInterrupted(workshop, 0);
  } finally {
    workshop.close();
  }
}

export async function start(): Promise<number> {
  try {
    await sayDemo();
    if (!(await openElectron())) await openBrowser();
    return 0;
  } catch (cause) {
    const isRefusal = cause instanceof AppError;
    const plain = isRefusal ? cause.toPlain() : cause instanceof CoreFailure ? cause.plain : null;
    if (plain === null) logToFile(cause);
    process.stderr.write(`${plain === null ? "Something went wrong inside the program." : sentenceOf(plain)}\n`);
    return isRefusal ? 1 : 2;
  }
}
