/** What the build has made: every entry is there, nothing tells where it was built, and the preload stands alone. */
import { existsSync, readdirSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";

const top = fileURLToPath(new URL("../..", import.meta.url));
const out = join(top, "out");
const isBuilt = existsSync(join(out, "built-from"));

describe.skipIf(!isBuilt)("the build", () => {
  const files = isBuilt
    ? readdirSync(out, { recursive: true, encoding: "utf8" }).filter((path) => /\.(c?js|html|css)$/.test(path))
    : [];
  const text = (path: string): string => readFileSync(join(out, path), "utf8");

  test("has every entry", () => {
    for (const path of [
      "main/index.js",
      "main/server.js",
      "main/cli.js",
      "main/start.js",
      "preload/index.cjs",
      "renderer/index.html",
    ]) {
      expect(existsSync(join(out, path))).toBe(true);
    }
  });

  test("holds no path of the machine it was built on", () => {
    expect(files.filter((path) => text(path).includes(top))).toEqual([]);
  });

  /** Everything that is loaded before the first line of an entry runs. */
  function loadedAtOnce(path: string, seen = new Set<string>()): Set<string> {
    if (seen.has(path)) return seen;
    seen.add(path);
    for (const match of text(path).matchAll(/(?:^|[;}\n])\s*(?:import|export)\b[^"'`()]*["']([^"']+)["']/g)) {
      const to = match[1]!;
      if (to.startsWith(".")) loadedAtOnce(join(dirname(path), to), seen);
      else seen.add(to);
    }
    return seen;
  }

  test("checks the Node version before the database is loaded, in every entry that Node runs", () => {
    for (const name of ["cli", "server", "start"]) {
      expect([...loadedAtOnce(`main/${name}.js`)]).not.toContain("better-sqlite3");
      expect(text(`main/${name}.js`)).toMatch(/import\(/);
    }
    const everything = files
      .filter((path) => path.startsWith("main"))
      .map(text)
      .join();
    expect(everything).toContain("better-sqlite3");
  });

  test("has a preload that asks for electron only", () => {
    const asked = [...text("preload/index.cjs").matchAll(/require\(["'`]([^"'`]+)["'`]\)/g)].map((match) => match[1]);
    expect(asked).toEqual(["electron"]);
  });

  test("has a page without inline script or style", () => {
    const page = text("renderer/index.html");
    expect(page).not.toMatch(/<script(?![^>]*\bsrc=)/);
    expect(page).not.toMatch(/<style|\sstyle=|\son[a-z]+=/);
  });
});
