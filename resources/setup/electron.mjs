/**
 * Lets Electron's own installer fetch its binary, once. Where the download place can't be reached this is said in one line
 * within seconds, remembered, and not tried again until the packages are installed afresh.
 */
import { existsSync, readFileSync } from "node:fs";
import { connect } from "node:net";
import { join } from "node:path";
import { pinnedNode, readNote, run, say, top, writeNote } from "./tools.mjs";

const REACH_MS = 4000;
const FETCH_MS = 5 * 60_000;
const USUAL_PLACE = "https://github.com/electron/electron/releases/download/";

function isThere() {
  const home = join(top, "node_modules", "electron");
  try {
    return existsSync(join(home, "dist", readFileSync(join(home, "path.txt"), "utf8").trim()));
  } catch {
    return false;
  }
}

/** Whether the download place answers at all; behind a proxy only the installer itself can tell. */
function canReach() {
  const { env } = process;
  if ([env.HTTPS_PROXY, env.https_proxy, env.ALL_PROXY, env.all_proxy].some(Boolean)) return Promise.resolve(true);
  const place = new URL(env.ELECTRON_MIRROR ?? env.npm_config_electron_mirror ?? USUAL_PLACE);
  return new Promise((resolve) => {
    const port = Number(place.port) || (place.protocol === "http:" ? 80 : 443);
    const socket = connect({ host: place.hostname, port });
    const end = (answer) => {
      clearTimeout(limit);
      socket.destroy();
      resolve(answer);
    };
    // The socket's own time limit does not cover looking the name up.
    const limit = setTimeout(() => end(false), REACH_MS);
    socket.once("connect", () => end(true));
    socket.once("error", () => end(false));
  });
}

export async function fetchElectronOnce() {
  if (isThere() || readNote("electron") !== null) return;
  if (process.env.ELECTRON_SKIP_BINARY_DOWNLOAD) return;
  if (await canReach()) {
    say("Fetching Electron's window, once (about 110 MB) …");
    const installer = join(top, "node_modules", "electron", "install.js");
    if (run(pinnedNode(), [installer], { timeoutMs: FETCH_MS, quiet: true }) && isThere()) return;
  }
  writeNote("electron", "could not be fetched");
  say("Electron could not be fetched here; Lotwright goes on in a browser window (to try again: npx install-electron).");
}
