/** The loopback server over real HTTP: what it serves, what it refuses, and that it can be reached from this machine only. */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { request as httpRequest } from "node:http";
import { networkInterfaces, tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Reply } from "../../../src/contract/reply.ts";
import { type LoopbackServer, startLoopbackServer } from "../../../src/shells/browser/server.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-server-"));
writeFileSync(join(folder, "index.html"), "<!doctype html><title>Lotwright</title>");

const asked: { name: string; input: unknown }[] = [];
const error = (code: string, family: "request" | "bug" | "fit") =>
  ({ ok: false, error: { family, code, what: "No.", where: null, whatToDo: null } }) as const;
const REPLIES: Record<string, Reply<unknown>> = {
  listClasses: { ok: true, value: [] },
  bad: error("bad-input", "request"),
  broken: error("unexpected", "bug"),
  refused: error("too-few", "fit"),
};

let server: LoopbackServer;
beforeAll(async () => {
  const ask = async (name: string, input: unknown): Promise<Reply<unknown>> => {
    asked.push({ name, input });
    return REPLIES[name] ?? error("no-such-request", "request");
  };
  server = await startLoopbackServer({ ask, rendererFolder: folder, port: 0, largestBodyBytes: 1000 });
});
afterAll(async () => {
  await server.close();
  rmSync(folder, { recursive: true, force: true });
});

interface Answer {
  status: number;
  body: string;
  headers: NodeJS.Dict<string | string[]>;
}

/** By node:http, because fetch would not let a test lie about its Host. */
function send(method: string, path: string, headers: Record<string, string>, body = ""): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const request = httpRequest({ host: "127.0.0.1", port: server.port, method, path, headers }, (response) => {
      let text = "";
      response.on("data", (chunk: Buffer) => (text += chunk.toString()));
      response.on("end", () => resolve({ status: response.statusCode!, body: text, headers: response.headers }));
    });
    request.on("error", reject);
    request.end(body);
  });
}

const own = (): Record<string, string> => ({
  origin: `http://127.0.0.1:${server.port}`,
  "content-type": "application/json",
  "x-token": server.token,
});

describe("the loopback server", () => {
  test("hands a request to the core and its reply back", async () => {
    const answer = await send("POST", "/api/listClasses", own(), '{"a":1}');
    expect(answer.status).toBe(200);
    expect(JSON.parse(answer.body)).toEqual({ ok: true, value: [] });
    expect(asked.at(-1)).toEqual({ name: "listClasses", input: { a: 1 } });
  });

  test("an empty body is an empty input", async () => {
    await send("POST", "/api/listClasses", own());
    expect(asked.at(-1)).toEqual({ name: "listClasses", input: {} });
  });

  test("says in its status whether the input was bad, the core refused, or the program failed", async () => {
    const status = async (name: string): Promise<number> => (await send("POST", `/api/${name}`, own(), "{}")).status;
    expect(await status("bad")).toBe(400);
    expect(await status("refused")).toBe(422);
    expect(await status("broken")).toBe(500);
    expect(await status("unheard")).toBe(404);
  });

  test("refuses a wrong token, a strange host and a strange origin without asking the core", async () => {
    const before = asked.length;
    expect((await send("POST", "/api/listClasses", { ...own(), "x-token": "guess" }, "{}")).status).toBe(401);
    expect((await send("POST", "/api/listClasses", { ...own(), host: "example.org" }, "{}")).status).toBe(403);
    expect((await send("POST", "/api/listClasses", { ...own(), origin: "http://example.org" }, "{}")).status).toBe(403);
    expect((await send("GET", "/", { host: `example.org:${server.port}` })).status).toBe(403);
    expect(asked.length).toBe(before);
  });

  test("refuses what is no JSON, and a body beyond the limit, said or unsaid", async () => {
    expect((await send("POST", "/api/listClasses", own(), "{oops")).status).toBe(400);
    const large = JSON.stringify("x".repeat(2000));
    expect(
      (await send("POST", "/api/listClasses", { ...own(), "content-length": String(large.length) }, large)).status,
    ).toBe(413);
    expect((await send("POST", "/api/listClasses", { ...own(), "transfer-encoding": "chunked" }, large)).status).toBe(
      413,
    );
  });

  test("serves the page with a content policy and never the token", async () => {
    const answer = await send("GET", "/", {});
    expect(answer.status).toBe(200);
    expect(answer.headers["content-security-policy"]).toContain("script-src 'self'");
    expect(answer.headers["x-content-type-options"]).toBe("nosniff");
    expect(answer.body).not.toContain(server.token);
    expect((await send("GET", "/../package.json", {})).status).toBe(404);
  });

  test("keeps the token in the fragment, and makes another one at each launch", async () => {
    expect(new URL(server.address).hash).toBe(`#token=${server.token}`);
    expect(server.token.length).toBeGreaterThanOrEqual(43);
    const other = await startLoopbackServer({ ask: async () => REPLIES.listClasses!, rendererFolder: folder, port: 0 });
    expect(other.token).not.toBe(server.token);
    await other.close();
  });

  test("an address for a command line leads in once and then no more", async () => {
    const path = new URL(server.addressForOnce()).pathname;
    const first = await send("GET", path, {});
    expect([first.status, first.headers.location]).toEqual([302, `/#token=${server.token}`]);
    expect((await send("GET", path, {})).status).toBe(404);
    expect((await send("GET", "/open/guess", {})).status).toBe(404);
    expect((await send("GET", new URL(server.addressForOnce()).pathname, { host: "example.org" })).status).toBe(403);
  });

  test("does not answer on the machine's other addresses", async () => {
    const outward = Object.values(networkInterfaces())
      .flat()
      .find((one) => one !== undefined && !one.internal && one.family === "IPv4");
    const reach = (host: string): Promise<boolean> =>
      fetch(`http://${host}:${server.port}/`).then(
        () => true,
        () => false,
      );
    expect(await reach("127.0.0.1")).toBe(true);
    if (outward !== undefined) expect(await reach(outward.address)).toBe(false);
  });
});
