/** Which files a page may be given. */
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import { CONTENT_POLICY, rendererFile } from "../../src/shells/rendererFiles.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-pages-"));
const pages = join(folder, "renderer");
mkdirSync(join(pages, "assets"), { recursive: true });
writeFileSync(join(pages, "index.html"), "<!doctype html>start");
writeFileSync(join(pages, "assets", "a.js"), "export {};");
writeFileSync(join(pages, "notes.sqlite"), "secret");
writeFileSync(join(folder, "outside.js"), "secret");
mkdirSync(join(folder, "renderer-other"));
writeFileSync(join(folder, "renderer-other", "b.js"), "secret");
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe("rendererFile", () => {
  test("gives the start page for / and files by their path, with their type", async () => {
    expect(Buffer.from((await rendererFile(pages, "/"))!.bytes).toString()).toContain("start");
    expect((await rendererFile(pages, "/assets/a.js"))!.type).toBe("text/javascript; charset=utf-8");
  });

  test("gives nothing outside its folder, however the path is written", async () => {
    const tries = [
      "/../outside.js",
      "/%2e%2e/outside.js",
      "/assets/../../outside.js",
      "/..%2foutside.js",
      "/../renderer-other/b.js",
    ];
    for (const path of tries) expect(await rendererFile(pages, path)).toBeNull();
  });

  test("gives nothing for an unknown type, a missing file or a broken address", async () => {
    for (const path of ["/notes.sqlite", "/missing.js", "/%E0%A4%A", "/assets", "/a.js%00"]) {
      expect(await rendererFile(pages, path)).toBeNull();
    }
  });
});

describe("the content policy", () => {
  test("allows no inline and no evaluated script, and nothing from elsewhere", () => {
    expect(CONTENT_POLICY).not.toContain("unsafe");
    expect(CONTENT_POLICY).not.toMatch(/https?:|\*/);
    expect(CONTENT_POLICY).toContain("default-src 'none'");
  });
});
