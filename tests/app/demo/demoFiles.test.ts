import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { demoFiles } from "../../../src/app/demo/demoFiles.ts";

const folder = fileURLToPath(new URL("../../../demo-db/", import.meta.url));

describe("demo-db", () => {
  it.each(demoFiles().map(({ fileName, bytes }) => [fileName, bytes] as const))(
    "holds %s exactly as the generator writes it",
    (fileName, bytes) => {
      expect(Buffer.from(bytes).equals(readFileSync(folder + fileName))).toBe(true);
    },
  );

  it("holds nothing else but its README", () => {
    expect(
      readdirSync(folder)
        .filter((name) => !name.startsWith("."))
        .sort(),
    ).toEqual(["README.md", ...demoFiles().map(({ fileName }) => fileName)].sort());
  });

  it("comes out the same twice in one run", () => {
    const again = demoFiles();
    demoFiles().forEach(({ bytes }, k) => {
      expect(Buffer.from(bytes).equals(Buffer.from(again[k]!.bytes))).toBe(true);
    });
  });
});
