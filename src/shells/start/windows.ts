/** Which window can be opened on this machine, and with which words. */
import { existsSync, readFileSync } from "node:fs";
import { delimiter, join } from "node:path";

type Environment = NodeJS.ProcessEnv;

/** Windows and macOS always have one; elsewhere X11 or Wayland say so. */
export function hasDisplay(env: Environment = process.env, platform: NodeJS.Platform = process.platform): boolean {
  return platform === "win32" || platform === "darwin" || Boolean(env.DISPLAY) || Boolean(env.WAYLAND_DISPLAY);
}

/**
 * Electron's binary as its installer noted it, or null. Never by loading the electron package, which would go and fetch a
 * missing binary from the network.
 */
export function findElectron(root: string): string | null {
  const home = join(root, "node_modules", "electron");
  try {
    const path = join(home, "dist", readFileSync(join(home, "path.txt"), "utf8").trim());
    return existsSync(path) ? path : null;
  } catch {
    return null;
  }
}

const NAMES = [
  "chromium",
  "chromium-browser",
  "google-chrome",
  "google-chrome-stable",
  "microsoft-edge",
  "brave-browser",
];

function usualPlaces(env: Environment): string[] {
  const programs = [env.PROGRAMFILES, env["PROGRAMFILES(X86)"], env.LOCALAPPDATA].filter(
    (folder) => folder !== undefined,
  );
  return [
    ...programs.map((folder) => join(folder, "Microsoft", "Edge", "Application", "msedge.exe")),
    ...programs.map((folder) => join(folder, "Google", "Chrome", "Application", "chrome.exe")),
    "/Applications/Google Chrome.app/Contents/MacOS/Google Chrome",
    "/Applications/Chromium.app/Contents/MacOS/Chromium",
  ];
}

/** A browser that can show a page as a window of its own; CHROMIUM names one that goes before all others. */
export function findBrowser(env: Environment = process.env): string | null {
  const onPath = (env.PATH ?? "")
    .split(delimiter)
    .filter((folder) => folder !== "")
    .flatMap((folder) => NAMES.map((name) => join(folder, name)));
  const named = env.CHROMIUM === undefined ? [] : [env.CHROMIUM];
  return [...named, ...onPath, ...usualPlaces(env)].find((path) => existsSync(path)) ?? null;
}

/** Chromium refuses its own sandbox to root; only our own pages are ever shown in it. */
function rootFlags(): string[] {
  return process.getuid?.() === 0 ? ["--no-sandbox"] : [];
}

export function electronCommand(root: string): string[] {
  return [...rootFlags(), root];
}

/** A profile of its own, so that closing the window ends the process, and nothing that speaks to the network. */
export function browserCommand(address: string, dataFolder: string): string[] {
  return [
    ...rootFlags(),
    `--app=${address}`,
    `--user-data-dir=${join(dataFolder, "window")}`,
    "--window-size=1360,860",
    "--no-first-run",
    "--no-default-browser-check",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
    "--disable-domain-reliability",
    "--disable-client-side-phishing-detection",
    "--no-pings",
  ];
}
