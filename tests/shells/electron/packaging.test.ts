/** The packaging configuration against electron-builder's own schema; nothing is packaged and nothing fetched. */
import { existsSync, readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";

const top = fileURLToPath(new URL("../../..", import.meta.url));
const load = createRequire(import.meta.url);
const { validateConfiguration } = load("app-builder-lib/out/util/config/config.js") as {
  validateConfiguration(configuration: unknown, log: unknown): Promise<void>;
};
const { DebugLogger } = load("builder-util") as { DebugLogger: new (isEnabled: boolean) => unknown };
const manifest = JSON.parse(readFileSync(join(top, "package.json"), "utf8")) as {
  build: Record<string, unknown> & { files: string[]; icon: string };
  dependencies: Record<string, string>;
  devDependencies: Record<string, string>;
};

describe("the packaging configuration", () => {
  test("is valid", async () => {
    await expect(
      validateConfiguration(structuredClone(manifest.build), new DebugLogger(false)),
    ).resolves.toBeUndefined();
  });

  test("would be refused with an unknown key, so that the check above means something", async () => {
    await expect(validateConfiguration({ ...manifest.build, asarr: true }, new DebugLogger(false))).rejects.toThrow(
      /asarr/,
    );
  });

  test("ships the build, the fonts and the icon, and leaves the Node runtimes out", () => {
    expect(manifest.build.files).toEqual(expect.arrayContaining(["out/**", "resources/fonts/**"]));
    expect(manifest.build.files.some((pattern) => pattern.includes("node-{linux,win,darwin}"))).toBe(true);
    expect(existsSync(join(top, manifest.build.icon))).toBe(true);
    expect(manifest.build.npmRebuild).toBe(false);
  });

  test("keeps bundled packages out of what is shipped, and every version pinned", () => {
    expect(Object.keys(manifest.dependencies).sort()).toEqual(["better-sqlite3", "pdfkit"]);
    const versions = Object.values({ ...manifest.dependencies, ...manifest.devDependencies });
    expect(versions.filter((version) => !/^\d+\.\d+\.\d+$/.test(version))).toEqual([]);
  });
});
