/**
 * The screens' own files as a response: for the loopback server and for the window's protocol alike. Only what lies inside
 * the built renderer folder is ever read, and each answer carries the page's content policy.
 */
import { readFile } from "node:fs/promises";
import { extname, resolve, sep } from "node:path";

/**
 * Scripts, styles and fonts only from here, no inline script, no connection elsewhere; blob: shows a sheet's PDF, which is
 * an object inside a frame in Chromium's viewer.
 */
export const CONTENT_POLICY = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "font-src 'self'",
  "connect-src 'self'",
  "frame-src blob:",
  "object-src blob:",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-ancestors 'none'",
].join("; ");

export const SAFETY_HEADERS: Readonly<Record<string, string>> = {
  "content-security-policy": CONTENT_POLICY,
  "x-content-type-options": "nosniff",
  "referrer-policy": "no-referrer",
  "cross-origin-opener-policy": "same-origin",
  "cross-origin-resource-policy": "same-origin",
  "permissions-policy": "camera=(), microphone=(), geolocation=(), usb=(), serial=(), payment=()",
  "cache-control": "no-store",
};

const TYPES: Readonly<Record<string, string>> = {
  ".html": "text/html; charset=utf-8",
  ".js": "text/javascript; charset=utf-8",
  ".css": "text/css; charset=utf-8",
  ".svg": "image/svg+xml",
  ".png": "image/png",
  ".ico": "image/x-icon",
  ".woff": "font/woff",
  ".woff2": "font/woff2",
  ".json": "application/json",
};

export interface FileResponse {
  readonly bytes: Uint8Array<ArrayBuffer>;
  readonly type: string;
}

/** The file for an address path ("/" is index.html), or null: not there, of an unknown type, or outside the folder. */
export async function rendererFile(folder: string, addressPath: string): Promise<FileResponse | null> {
  let path: string;
  try {
    path = decodeURIComponent(addressPath);
  } catch {
    return null;
  }
  const root = resolve(folder);
  const file = resolve(root, `.${path === "/" ? "/index.html" : path}`);
  const type = TYPES[extname(file)];
  if (type === undefined || path.includes("\0") || !file.startsWith(root + sep)) return null;
  try {
    return { bytes: new Uint8Array(await readFile(file)), type };
  } catch {
    return null;
  }
}
