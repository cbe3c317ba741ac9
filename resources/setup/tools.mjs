/** Small helpers of the set-up: saying, running, remembering, and one set-up at a time. */
import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

export const top = join(dirname(fileURLToPath(import.meta.url)), "..", "..");
/** Notes of the set-up live beside the packages they speak of, and go when those are installed afresh. */
const notes = join(top, "node_modules", ".lotwright");

export function say(sentence) {
  process.stderr.write(`${sentence}\n`);
}

export function giveUp(sentence) {
  say(`Lotwright could not be set up. ${sentence}`);
  process.exit(2);
}

/** Runs a program with its words on stderr; true when it ended well within the time limit. */
export function run(file, args, { timeoutMs, env = process.env, quiet = false } = {}) {
  const words = quiet ? "ignore" : 2;
  const done = spawnSync(file, args, { cwd: top, stdio: ["ignore", words, words], timeout: timeoutMs, env });
  return done.status === 0;
}

/** The pinned Node where the packages hold one for this machine, else the Node that runs this. */
export function pinnedNode() {
  const own = join(top, "node_modules", ".bin", "node");
  return process.platform !== "win32" && existsSync(own) ? own : process.execPath;
}

/** npm as it was started, else the npm of this Node's folder or PATH. */
export function runNpm(args) {
  const npm = process.env.npm_execpath;
  if (npm !== undefined && npm.endsWith(".js")) return run(process.execPath, [npm, ...args]);
  return run("npm", args);
}

export function readNote(name) {
  try {
    return readFileSync(join(notes, name), "utf8");
  } catch {
    return null;
  }
}

export function writeNote(name, text) {
  mkdirSync(notes, { recursive: true });
  writeFileSync(join(notes, name), text);
}

const LOCK_WAIT_MS = 10 * 60_000;
const LOCK_POLL_MS = 200;

function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (cause) {
    return cause.code === "EPERM";
  }
}

/** Two commands at once must not install or build into the same folders: the second waits for the first. */
export async function withLock(name, work) {
  const path = join(top, `.setup-${name}.lock`);
  const until = Date.now() + LOCK_WAIT_MS;
  for (;;) {
    try {
      writeFileSync(path, String(process.pid), { flag: "wx" });
      break;
    } catch (cause) {
      if (cause.code !== "EEXIST") throw cause;
      if (Date.now() > until) throw new Error(`Another set-up seems to hang; remove ${path} if none is running.`);
      if (lockIsStale(path)) rmSync(path, { force: true });
      else await new Promise((resolve) => setTimeout(resolve, LOCK_POLL_MS));
    }
  }
  const release = () => rmSync(path, { force: true });
  process.once("exit", release);
  try {
    return await work();
  } finally {
    release();
    process.removeListener("exit", release);
  }
}

function lockIsStale(path) {
  try {
    const pid = Number(readFileSync(path, "utf8"));
    // An empty file is one that its owner is still writing, unless it stays so.
    if (pid === 0) return Date.now() - statSync(path).mtimeMs > 5000;
    return !isAlive(pid);
  } catch {
    return false;
  }
}
