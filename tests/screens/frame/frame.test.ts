import { describe, expect, test, vi } from "vitest";
import { findActs } from "../../../src/screens/frame/Palette.tsx";
import { chooseTransport, httpTransport } from "../../../src/screens/frame/transport.ts";
import { hrefOf, routeOf } from "../../../src/screens/frame/useRoute.ts";

describe("where you are", () => {
  test("the address names a place and its sub-place", () => {
    expect(routeOf("#/appraise/pull")).toEqual({ path: "appraise", sub: "pull" });
    expect(routeOf("#/sales")).toEqual({ path: "sales", sub: null });
    expect(routeOf("")).toEqual({ path: "", sub: null });
    expect(routeOf(hrefOf("appraise", "pull"))).toEqual({ path: "appraise", sub: "pull" });
  });
});

describe("the way to the core", () => {
  test("the window's bridge is taken where there is one", async () => {
    const request = vi.fn(async () => ({ ok: true, value: 1 }));
    const transport = chooseTransport({ bridge: { request } } as unknown as Window);
    expect(await transport("listClasses", {})).toEqual({ ok: true, value: 1 });
    expect(request).toHaveBeenCalledWith("listClasses", {});
  });

  test("in a browser the token leaves the address and goes along with each request", async () => {
    const kept = new Map<string, string>();
    const replaceState = vi.fn();
    const page = {
      location: { hash: "#token=abc-1", pathname: "/" },
      sessionStorage: { setItem: (key: string, value: string) => kept.set(key, value), getItem: () => null },
      history: { replaceState },
    };
    chooseTransport(page as unknown as Window);
    expect([...kept.values()]).toEqual(["abc-1"]);
    expect(replaceState).toHaveBeenCalledWith(null, "", "/");
  });

  test("the request is JSON to its own address with the token in its header", async () => {
    const send = vi.fn(async () => new Response(JSON.stringify({ ok: true, value: 7 })));
    expect(await httpTransport("abc", send as unknown as typeof fetch)("appraise", { a: 1 })).toEqual({
      ok: true,
      value: 7,
    });
    const [url, init] = send.mock.calls[0] as unknown as [string, RequestInit];
    expect(url).toBe("/api/appraise");
    expect(init.headers).toMatchObject({ "x-token": "abc" });
    expect(init.body).toBe('{"a":1}');
  });

  test("no answer is a refusal that says what to do", async () => {
    const broken = (() => Promise.reject(new TypeError("gone"))) as unknown as typeof fetch;
    const reply = await httpTransport("", broken)("listClasses", {});
    expect(reply).toMatchObject({ ok: false, error: { code: "no-answer" } });
  });
});

describe("find or do", () => {
  const acts = ["Go to Price model", "Go to Sales", "Leave out: Age"].map((label) => ({ label, run: () => undefined }));
  test("finds by the beginnings of words in any order", () => {
    expect(findActs(acts, "mod pri").map((act) => act.label)).toEqual(["Go to Price model"]);
    expect(findActs(acts, "age")).toHaveLength(1);
    expect(findActs(acts, "")).toHaveLength(3);
    expect(findActs(acts, "zebra")).toEqual([]);
  });
});
