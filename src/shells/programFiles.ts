/** Where the program's own files are, run from the build, from a package or from the sources. */
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";

/** The folder that holds package.json, looked for upwards from this file. */
export function programRoot(from: string = dirname(fileURLToPath(import.meta.url))): string {
  for (let folder = from; ; folder = dirname(folder)) {
    if (existsSync(join(folder, "package.json"))) return folder;
    if (dirname(folder) === folder) throw new Error("The program's own folder could not be found.");
  }
}

export function programVersion(): string {
  const text = readFileSync(join(programRoot(), "package.json"), "utf8");
  return (JSON.parse(text) as { version: string }).version;
}

export const rendererFolder = (): string => join(programRoot(), "out", "renderer");
export const preloadFile = (): string => join(programRoot(), "out", "preload", "index.cjs");
export const iconFile = (): string => join(programRoot(), "resources", "icon.png");
/** What a thread runs that helps to sum rows. */
export const blockThreadFile = (): URL => pathToFileURL(join(programRoot(), "out", "main", "computeBlocks.js"));
