/** The guard that stands before the database driver. */
import { describe, expect, test } from "vitest";
import { nodeRefusal } from "../../src/shells/nodeVersion.ts";

describe("nodeRefusal", () => {
  test("lets 22.12 and everything later pass", () => {
    for (const version of ["v22.12.0", "v22.13.1", "v24.21.0", "v26.0.0"]) expect(nodeRefusal(version)).toBeNull();
  });

  test("refuses what is older, naming the version and the way to start", () => {
    for (const version of ["v18.20.0", "v20.20.2", "v22.11.0"]) {
      expect(nodeRefusal(version)).toContain(version);
      expect(nodeRefusal(version)).toContain("npm start");
    }
  });
});
