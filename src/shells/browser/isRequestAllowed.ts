/**
 * Who may talk to the loopback server. Any page in any browser on this machine can send requests to 127.0.0.1, and a name
 * can be made to point there; so Host and Origin must be our own address, and a request to the core must carry the token that
 * was made for this launch and never leaves the address bar's fragment.
 */
import { createHash, timingSafeEqual } from "node:crypto";

export interface RequestFacts {
  readonly method: string;
  readonly path: string;
  readonly host: string | undefined;
  readonly origin: string | undefined;
  /** Sec-Fetch-Site, which browsers set and pages can't. */
  readonly fetchSite: string | undefined;
  readonly contentType: string | undefined;
  readonly token: string | undefined;
}

export type Permission =
  | { readonly allowed: true }
  | { readonly allowed: false; readonly status: 401 | 403 | 405 | 415; readonly why: string };

const refuse = (status: 401 | 403 | 405 | 415, why: string): Permission => ({ allowed: false, status, why });

/** Equal or not, in a time that does not tell how far they agree. */
function isSameToken(given: string | undefined, token: string): boolean {
  const digest = (text: string): Buffer => createHash("sha256").update(text).digest();
  return timingSafeEqual(digest(given ?? ""), digest(token)) && given !== undefined;
}

function isOwnHost(host: string | undefined, port: number): boolean {
  return host === `127.0.0.1:${port}` || host === `localhost:${port}`;
}

export function isApiPath(path: string): boolean {
  return path.startsWith("/api/");
}

/** Decides by the facts alone; the body has not been read yet. */
export function isRequestAllowed(facts: RequestFacts, port: number, token: string): Permission {
  if (!isOwnHost(facts.host, port)) return refuse(403, "This address is not the program's own.");
  if (facts.origin !== undefined && facts.origin !== `http://${facts.host}`) {
    return refuse(403, "The request comes from another page.");
  }
  if (!isApiPath(facts.path)) {
    if (facts.method === "GET" || facts.method === "HEAD") return { allowed: true };
    return refuse(405, "Files can only be read.");
  }
  if (facts.method !== "POST") return refuse(405, "Requests to the core are sent by POST.");
  if (facts.origin === undefined) return refuse(403, "The request does not say which page it comes from.");
  if (facts.fetchSite !== undefined && facts.fetchSite !== "same-origin") {
    return refuse(403, "The request comes from another page.");
  }
  if (!isSameToken(facts.token, token)) {
    return refuse(401, "The token of this launch is missing or wrong; open the address that the program printed.");
  }
  if (facts.contentType?.split(";")[0]?.trim().toLowerCase() !== "application/json") {
    return refuse(415, "Requests to the core are JSON.");
  }
  return { allowed: true };
}
