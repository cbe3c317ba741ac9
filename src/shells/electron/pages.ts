/** The screens as pages of lotwright://app: the same files and the same content policy as on the loopback address. */
import type { Protocol } from "electron";
import { rendererFolder } from "../programFiles.ts";
import { rendererFile, SAFETY_HEADERS } from "../rendererFiles.ts";

export const APP_SCHEME = "lotwright";
export const APP_ORIGIN = `${APP_SCHEME}://app`;
export const START_PAGE = `${APP_ORIGIN}/`;

/** True for an address of our own pages, read by its parts and not by its beginning. */
export function isOwnAddress(address: string): boolean {
  if (!URL.canParse(address)) return false;
  const url = new URL(address);
  return url.protocol === `${APP_SCHEME}:` && url.host === "app";
}

export async function pageResponse(address: string, folder: string): Promise<Response> {
  const file = isOwnAddress(address) ? await rendererFile(folder, new URL(address).pathname) : null;
  if (file === null) return new Response("Not here.", { status: 404, headers: SAFETY_HEADERS });
  return new Response(file.bytes, { headers: { ...SAFETY_HEADERS, "content-type": file.type } });
}

export function servePages(protocol: Protocol): void {
  protocol.handle(APP_SCHEME, (request) => pageResponse(request.url, rendererFolder()));
}
