/** Each fact that keeps a stranger out, one at a time, from a request that would be allowed. */
import { describe, expect, test } from "vitest";
import { isRequestAllowed, type RequestFacts } from "../../../src/shells/browser/isRequestAllowed.ts";

const PORT = 4711;
const TOKEN = "right-token";
const good: RequestFacts = {
  method: "POST",
  path: "/api/listClasses",
  host: `127.0.0.1:${PORT}`,
  origin: `http://127.0.0.1:${PORT}`,
  fetchSite: "same-origin",
  contentType: "application/json; charset=utf-8",
  token: TOKEN,
};
const statusOf = (change: Partial<RequestFacts>): number => {
  const permission = isRequestAllowed({ ...good, ...change }, PORT, TOKEN);
  return permission.allowed ? 200 : permission.status;
};

describe("isRequestAllowed", () => {
  test("lets the program's own page ask, by number and by name", () => {
    expect(statusOf({})).toBe(200);
    expect(statusOf({ host: `localhost:${PORT}`, origin: `http://localhost:${PORT}` })).toBe(200);
    expect(statusOf({ fetchSite: undefined })).toBe(200);
  });

  test("refuses another host, also one that only begins like ours", () => {
    for (const host of [
      undefined,
      "",
      "example.org",
      `127.0.0.1:${PORT + 1}`,
      "127.0.0.1",
      `127.0.0.1:${PORT}.example.org`,
    ]) {
      expect(statusOf({ host })).toBe(403);
    }
  });

  test("refuses another origin, a missing one and a request from another site", () => {
    for (const origin of [
      undefined,
      "null",
      "http://example.org",
      `https://127.0.0.1:${PORT}`,
      `http://localhost:${PORT}`,
    ]) {
      expect(statusOf({ origin })).toBe(403);
    }
    for (const fetchSite of ["cross-site", "same-site", "none"]) expect(statusOf({ fetchSite })).toBe(403);
  });

  test("refuses a missing, wrong, shortened or lengthened token", () => {
    for (const token of [undefined, "", "wrong", "right-toke", "right-token ", "Right-token"]) {
      expect(statusOf({ token })).toBe(401);
    }
  });

  test("takes requests by POST as JSON only, and files by GET without a token", () => {
    expect(statusOf({ method: "GET" })).toBe(405);
    expect(statusOf({ contentType: "text/plain" })).toBe(415);
    expect(statusOf({ contentType: undefined })).toBe(415);
    expect(statusOf({ method: "GET", path: "/", token: undefined, origin: undefined, fetchSite: "none" })).toBe(200);
    expect(statusOf({ method: "POST", path: "/", token: TOKEN })).toBe(405);
    expect(statusOf({ method: "GET", path: "/", host: "example.org" })).toBe(403);
  });
});
