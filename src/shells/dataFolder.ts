/** Where a person's store lives: LOTWRIGHT_HOME, or the platform's usual folder for application data. */
import { mkdirSync } from "node:fs";
import { homedir } from "node:os";
import { join } from "node:path";

type Surroundings = { readonly env: NodeJS.ProcessEnv; readonly platform: NodeJS.Platform; readonly home: string };

const HERE = (): Surroundings => ({ env: process.env, platform: process.platform, home: homedir() });

/** The folder's path; nothing is made yet. */
export function dataFolderPath({ env, platform, home }: Surroundings = HERE()): string {
  if (env.LOTWRIGHT_HOME) return env.LOTWRIGHT_HOME;
  if (platform === "win32") return join(env.APPDATA ?? join(home, "AppData", "Roaming"), "Lotwright");
  if (platform === "darwin") return join(home, "Library", "Application Support", "Lotwright");
  return join(env.XDG_DATA_HOME ?? join(home, ".local", "share"), "lotwright");
}

/** The folder, made if it was not there, readable by its owner only. */
export function dataFolder(): string {
  const path = dataFolderPath();
  mkdirSync(path, { recursive: true, mode: 0o700 });
  return path;
}

export function usualStorePath(): string {
  return join(dataFolder(), "lotwright.sqlite");
}
