/**
 * Set-up before `npm start`, `npm test`, `npm run lotwright` and `npm run bench` (which builds for itself): packages, the build,
 * and what the occasion asks for besides.
 * Plain JavaScript without packages, for any Node from 18 on. Silent when there is nothing to do; all messages go to stderr,
 * so that a command's own output stays clean. Usage: node prepare.mjs [start|test|lotwright|bench]
 */
import { build } from "./build.mjs";
import { findOrInstallChromium } from "./chromium.mjs";
import { fetchElectronOnce } from "./electron.mjs";
import { installPackages } from "./packages.mjs";
import { giveUp, withLock } from "./tools.mjs";

const occasion = process.argv[2] ?? "lotwright";

if (Number(process.versions.node.split(".")[0]) < 18) giveUp("Node 20.19 or later is needed to set up Lotwright.");

try {
  await withLock("packages", installPackages);
  if (occasion !== "bench") await withLock("build", build);
  if (occasion === "start") await fetchElectronOnce();
  if (occasion === "test") findOrInstallChromium();
} catch (cause) {
  giveUp(cause instanceof Error ? cause.message : String(cause));
}
