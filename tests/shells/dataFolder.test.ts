/** Where the store is kept, by platform. */
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { dataFolderPath } from "../../src/shells/dataFolder.ts";

describe("dataFolderPath", () => {
  const home = "home-of-someone";

  test("LOTWRIGHT_HOME wins everywhere", () => {
    for (const platform of ["linux", "win32", "darwin"] as const) {
      expect(dataFolderPath({ env: { LOTWRIGHT_HOME: "mine", APPDATA: "x" }, platform, home })).toBe("mine");
    }
  });

  test("otherwise it is the platform's own folder", () => {
    expect(dataFolderPath({ env: {}, platform: "linux", home })).toBe(join(home, ".local", "share", "lotwright"));
    expect(dataFolderPath({ env: { XDG_DATA_HOME: "data" }, platform: "linux", home })).toBe(join("data", "lotwright"));
    expect(dataFolderPath({ env: { APPDATA: "roaming" }, platform: "win32", home })).toBe(join("roaming", "Lotwright"));
    expect(dataFolderPath({ env: {}, platform: "darwin", home })).toContain("Application Support");
  });
});
