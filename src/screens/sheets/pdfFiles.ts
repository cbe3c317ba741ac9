/** Bytes of a PDF between the contract's base64 and what a page can show, save and read. */

import { RequestRefused } from "../../contract/client.ts";
import type { Reply } from "../../contract/reply.ts";

export function blobOf(bytesBase64: string): Blob {
  const text = atob(bytesBase64);
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i++) bytes[i] = text.charCodeAt(i);
  return new Blob([bytes], { type: "application/pdf" });
}

export async function base64Of(file: Blob): Promise<string> {
  const bytes = new Uint8Array(await file.arrayBuffer());
  const PIECE = 0x8000;
  let text = "";
  for (let at = 0; at < bytes.length; at += PIECE) text += String.fromCharCode(...bytes.subarray(at, at + PIECE));
  return btoa(text);
}

/** Saves through the window's own dialog where there is one, else as a download. */
export async function saveFile(fileName: string, bytesBase64: string): Promise<void> {
  if (window.bridge !== undefined) {
    const reply = (await window.bridge.request("saveFile", { fileName, bytesBase64 })) as Reply<unknown>;
    if (!reply.ok) throw new RequestRefused(reply.error);
    return;
  }
  const url = URL.createObjectURL(blobOf(bytesBase64));
  const link = document.createElement("a");
  link.href = url;
  link.download = fileName;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
