/** Finds a Chromium for the browser tests; on Debian as root, installs the distribution's own when there is none. */
import { existsSync } from "node:fs";
import { delimiter, join } from "node:path";
import { readNote, run, say, writeNote } from "./tools.mjs";

const NAMES = ["chromium", "chromium-browser", "google-chrome", "google-chrome-stable"];
const APT_MS = 8 * 60_000;

function onPath(name) {
  return (process.env.PATH ?? "")
    .split(delimiter)
    .filter((folder) => folder !== "")
    .some((folder) => existsSync(join(folder, name)));
}

function isThere() {
  const named = process.env.CHROMIUM;
  return (named !== undefined && existsSync(named)) || NAMES.some(onPath);
}

function mayInstall() {
  return process.getuid?.() === 0 && existsSync("/etc/debian_version") && onPath("apt-get");
}

export function findOrInstallChromium() {
  if (isThere() || readNote("chromium") !== null) return;
  if (mayInstall()) {
    say("Installing Chromium from the distribution's packages for the browser tests (once; a minute or two) …");
    const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
    const limits = { timeoutMs: APT_MS, env, quiet: true };
    run("apt-get", ["update", "-qq", "-o", "Acquire::Retries=1", "-o", "Acquire::http::Timeout=20"], limits);
    const asked = ["install", "-y", "-qq", "--no-install-recommends", "chromium"];
    if (run("apt-get", asked, limits) && isThere()) return;
  }
  writeNote("chromium", "not found");
  say("No Chromium was found: the browser tests will be skipped (name one in CHROMIUM to run them).");
}
