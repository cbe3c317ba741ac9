/**
 * How the page reaches the core: the window's bridge where there is one, else POST /api/<request> on its own address with the
 * token that came in the fragment. The token stays in this tab and leaves the address at once.
 */
import type { Transport } from "../../contract/client.ts";
import type { Reply } from "../../contract/reply.ts";

const TOKEN_KEY = "lotwright.token";
const TOKEN_HASH = /^#token=([\w-]+)$/;

type Bridge = { request: (name: string, input: unknown) => Promise<unknown> };

declare global {
  interface Window {
    readonly bridge?: Bridge;
  }
}

export function chooseTransport(page: Window): Transport {
  const { bridge } = page;
  if (bridge !== undefined) return (name, input) => bridge.request(name, input) as Promise<Reply<unknown>>;
  return httpTransport(takeToken(page));
}

function takeToken(page: Window): string {
  const found = TOKEN_HASH.exec(page.location.hash)?.[1];
  if (found !== undefined) {
    page.sessionStorage.setItem(TOKEN_KEY, found);
    page.history.replaceState(null, "", page.location.pathname);
  }
  return found ?? page.sessionStorage.getItem(TOKEN_KEY) ?? "";
}

/** A reply that is none (the program has ended, say) becomes a refusal that says so. */
export function httpTransport(token: string, send: typeof fetch = fetch): Transport {
  return async (name, input) => {
    try {
      const response = await send(`/api/${name}`, {
        method: "POST",
        headers: { "content-type": "application/json", "x-token": token },
        body: JSON.stringify(input),
      });
      return (await response.json()) as Reply<unknown>;
    } catch {
      return {
        ok: false,
        error: {
          family: "request",
          code: "no-answer",
          what: "The program does not answer.",
          where: null,
          whatToDo: "Start Lotwright again; what was saved is kept.",
        },
      };
    }
  };
}
