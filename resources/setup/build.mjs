/** Builds out/ when the sources differ from those it was made from. */
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { giveUp, pinnedNode, run, say, top } from "./tools.mjs";

const SOURCES = ["src", "resources/build", "electron.vite.config.ts", "package.json", "package-lock.json", "tsconfig.json"];
const ENTRIES = ["main/index.js", "main/cli.js", "main/server.js", "main/start.js", "main/computeBlocks.js", "preload/index.cjs", "renderer/index.html"];

function filesUnder(path) {
  const whole = join(top, path);
  if (!existsSync(whole)) return [];
  try {
    return readdirSync(whole, { withFileTypes: true })
      .sort((a, b) => (a.name < b.name ? -1 : 1))
      .flatMap((entry) => filesUnder(`${path}/${entry.name}`));
  } catch (cause) {
    if (cause.code === "ENOTDIR") return [path];
    throw cause;
  }
}

/** Digest over names and contents, so that a deleted or renamed file counts and a touched one does not. */
function sourceDigest() {
  const hash = createHash("sha256");
  for (const path of SOURCES.flatMap(filesUnder)) {
    hash.update(`${path}\0`).update(readFileSync(join(top, path))).update("\0");
  }
  return hash.digest("hex");
}

export function build() {
  const stamp = join(top, "out", "built-from");
  const digest = sourceDigest();
  const isThere = ENTRIES.every((entry) => existsSync(join(top, "out", entry)));
  if (isThere && existsSync(stamp) && readFileSync(stamp, "utf8") === digest) return;
  say("Building Lotwright (a few seconds) …");
  const tool = join(top, "node_modules", "electron-vite", "bin", "electron-vite.js");
  if (!run(pinnedNode(), [tool, "build", "--logLevel", "warn"])) giveUp("The build failed; its own words are above.");
  writeFileSync(stamp, digest);
}
