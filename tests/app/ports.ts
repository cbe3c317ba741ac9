/** Ports for the app tests: a real store in a temporary folder, a clock that stands still, SHA-256 of Node. */
import { createHash } from "node:crypto";
import type { Ports } from "../../src/app/ports.ts";
import { freshStore } from "../store/filledStore.ts";

export function testPorts(change: Partial<Ports> = {}): Ports & { readonly logged: unknown[] } {
  const logged: unknown[] = [];
  return {
    store: freshStore(),
    nowUtc: () => "2026-01-02T03:04:05Z",
    today: () => "2026-01-02",
    sha256: (data) => createHash("sha256").update(data).digest("hex"),
    log: (cause) => {
      logged.push(cause);
    },
    programVersion: "0.0.0-test",
    fonts: {},
    ...change,
    logged,
  };
}

/** A file as a request carries it. */
export function file(fileName: string, text: string): { fileName: string; bytesBase64: string } {
  return { fileName, bytesBase64: Buffer.from(text, "utf8").toString("base64") };
}
