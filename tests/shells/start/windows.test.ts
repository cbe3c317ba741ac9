/** Which window `npm start` opens, judged from what is on the machine. */
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { delimiter, join } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import { browserCommand, findBrowser, findElectron, hasDisplay } from "../../../src/shells/start/windows.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-windows-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe("the window that is opened", () => {
  test("needs a display on Linux, which X11 or Wayland announce", () => {
    expect(hasDisplay({}, "linux")).toBe(false);
    expect(hasDisplay({ DISPLAY: ":1" }, "linux")).toBe(true);
    expect(hasDisplay({ WAYLAND_DISPLAY: "wayland-0" }, "linux")).toBe(true);
    expect(hasDisplay({}, "win32") && hasDisplay({}, "darwin")).toBe(true);
  });

  test("is Electron only when its binary is really there", () => {
    const home = join(folder, "node_modules", "electron");
    expect(findElectron(folder)).toBeNull();
    mkdirSync(join(home, "dist"), { recursive: true });
    writeFileSync(join(home, "path.txt"), "electron");
    expect(findElectron(folder)).toBeNull();
    writeFileSync(join(home, "dist", "electron"), "");
    expect(findElectron(folder)).toBe(join(home, "dist", "electron"));
  });

  test("is the browser that CHROMIUM names before one on the path", () => {
    const [first, second] = [join(folder, "a"), join(folder, "b")];
    for (const place of [first, second]) {
      mkdirSync(place);
      writeFileSync(join(place, "chromium"), "");
    }
    const PATH = ["", join(folder, "none"), first].join(delimiter);
    expect(findBrowser({ PATH })).toBe(join(first, "chromium"));
    expect(findBrowser({ PATH, CHROMIUM: join(second, "chromium") })).toBe(join(second, "chromium"));
    expect(findBrowser({ PATH, CHROMIUM: join(folder, "missing") })).toBe(join(first, "chromium"));
  });

  test("shows one page in a profile of its own and stays off the network", () => {
    const words = browserCommand("http://127.0.0.1:1/open/x", folder);
    expect(words).toContain("--app=http://127.0.0.1:1/open/x");
    expect(words).toContain(`--user-data-dir=${join(folder, "window")}`);
    expect(words).toContain("--disable-background-networking");
  });
});
