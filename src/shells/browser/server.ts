/**
 * The loopback shell: the screens' files and one door to the core, POST /api/<request> with JSON in and a reply out. It listens
 * on 127.0.0.1 only, and makes a new token at every launch.
 */
import { randomBytes } from "node:crypto";
import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import type { Transport } from "../../contract/client.ts";
import type { Reply } from "../../contract/reply.ts";
import { rendererFile, SAFETY_HEADERS } from "../rendererFiles.ts";
import { isApiPath, isRequestAllowed, type RequestFacts } from "./isRequestAllowed.ts";

/** A file of a million sales, as base64, stays below this; one string in Node can't grow past half a gigabyte. */
const LARGEST_BODY_BYTES = 256 * 1024 * 1024;
const TOKEN_BYTES = 32;
const TICKET_MS = 60_000;
const TICKET_PATH = "/open/";

export interface LoopbackOptions {
  readonly ask: Transport;
  readonly rendererFolder: string;
  /** 0 takes any free port. */
  readonly port: number;
  readonly largestBodyBytes?: number;
}

export interface LoopbackServer {
  readonly port: number;
  readonly token: string;
  /** What to open: the token is in the fragment, which a browser never sends. */
  readonly address: string;
  /**
   * An address for a command line, which other people on the machine may be able to read: it leads to `address` once, within
   * a minute, and then no more.
   */
  addressForOnce(): string;
  close(): Promise<void>;
}

function refusal(code: string, what: string): Reply<never> {
  return { ok: false, error: { family: "request", code, what, where: null, whatToDo: null } };
}

function header(request: IncomingMessage, name: string): string | undefined {
  const value = request.headers[name];
  return Array.isArray(value) ? value[0] : value;
}

function factsOf(request: IncomingMessage): RequestFacts {
  return {
    method: request.method ?? "",
    path: (request.url ?? "/").split("?")[0]!,
    host: header(request, "host"),
    origin: header(request, "origin"),
    fetchSite: header(request, "sec-fetch-site"),
    contentType: header(request, "content-type"),
    token: header(request, "x-token"),
  };
}

function sendJson(response: ServerResponse, status: number, reply: Reply<unknown>): void {
  const headers = { ...SAFETY_HEADERS, "content-type": "application/json; charset=utf-8" };
  response.writeHead(status, headers).end(JSON.stringify(reply));
}

/** The body as text, or null when it is larger than allowed. */
async function readBody(request: IncomingMessage, largest: number): Promise<string | null> {
  if (Number(request.headers["content-length"] ?? 0) > largest) return null;
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of request as AsyncIterable<Buffer>) {
    size += chunk.length;
    if (size > largest) return null;
    chunks.push(chunk);
  }
  return Buffer.concat(chunks).toString("utf8");
}

function statusOf(reply: Reply<unknown>): number {
  if (reply.ok) return 200;
  if (reply.error.family === "bug") return 500;
  if (reply.error.code === "no-such-request") return 404;
  return reply.error.code === "bad-input" ? 400 : 422;
}

async function answerApi(request: IncomingMessage, response: ServerResponse, name: string, options: LoopbackOptions) {
  const body = await readBody(request, options.largestBodyBytes ?? LARGEST_BODY_BYTES);
  if (body === null) {
    // The rest of the body is not wanted: the connection ends with this answer.
    response.setHeader("connection", "close");
    sendJson(response, 413, refusal("too-large", "The file is too large to send through the browser window."));
    return;
  }
  let input: unknown;
  try {
    input = body === "" ? {} : JSON.parse(body);
  } catch {
    sendJson(response, 400, refusal("bad-json", "The request is not JSON."));
    return;
  }
  const reply = await options.ask(name, input);
  sendJson(response, statusOf(reply), reply);
}

async function answerFile(request: IncomingMessage, response: ServerResponse, path: string, folder: string) {
  const file = await rendererFile(folder, path);
  if (file === null) {
    response.writeHead(404, { ...SAFETY_HEADERS, "content-type": "text/plain; charset=utf-8" }).end("Not here.\n");
    return;
  }
  response.writeHead(200, { ...SAFETY_HEADERS, "content-type": file.type, "content-length": file.bytes.length });
  response.end(request.method === "HEAD" ? undefined : file.bytes);
}

function listen(server: Server, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once("error", reject);
    server.listen({ host: "127.0.0.1", port }, () => resolve((server.address() as AddressInfo).port));
  });
}

/** Single-use tickets: each is good for one redirect while it is fresh. */
function createTickets() {
  const freshUntil = new Map<string, number>();
  return {
    issue(): string {
      const ticket = randomBytes(TOKEN_BYTES).toString("base64url");
      freshUntil.set(ticket, Date.now() + TICKET_MS);
      return ticket;
    },
    redeem(ticket: string): boolean {
      const until = freshUntil.get(ticket) ?? 0;
      freshUntil.delete(ticket);
      return Date.now() < until;
    },
  };
}

export async function startLoopbackServer(options: LoopbackOptions): Promise<LoopbackServer> {
  const token = randomBytes(TOKEN_BYTES).toString("base64url");
  const tickets = createTickets();
  let port = 0;
  const server = createServer((request, response) => {
    const facts = factsOf(request);
    const permission = isRequestAllowed(facts, port, token);
    if (!permission.allowed) {
      sendJson(response, permission.status, refusal("not-allowed", permission.why));
      return;
    }
    if (facts.path.startsWith(TICKET_PATH) && tickets.redeem(facts.path.slice(TICKET_PATH.length))) {
      // A browser keeps the fragment of a redirect to itself.
      response.writeHead(302, { ...SAFETY_HEADERS, location: `/#token=${token}` }).end();
      return;
    }
    const work = isApiPath(facts.path)
      ? answerApi(request, response, facts.path.slice("/api/".length), options)
      : answerFile(request, response, facts.path, options.rendererFolder);
    // A connection that breaks half-way has nobody left to tell.
    work.catch(() => response.destroy());
  });
  port = await listen(server, options.port);
  const close = (): Promise<void> =>
    new Promise((resolve) => {
      server.close(() => resolve());
      server.closeAllConnections();
    });
  const base = `http://127.0.0.1:${port}`;
  const addressForOnce = (): string => `${base}${TICKET_PATH}${tickets.issue()}`;
  return { port, token, address: `${base}/#token=${token}`, addressForOnce, close };
}
