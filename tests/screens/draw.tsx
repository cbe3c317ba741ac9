/** Draws a screen on a workbench to HTML, and to the words a person reads. */
import type { ReactNode } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { type Workbench, WorkbenchContext } from "../../src/screens/workbench/workbench.ts";

export function draw(bench: Workbench, screen: ReactNode): string {
  return renderToStaticMarkup(<WorkbenchContext value={bench}>{screen}</WorkbenchContext>);
}

export function wordsOf(html: string): string {
  return html
    .replace(/<(title|style)[^>]*>.*?<\/\1>/g, "")
    .replace(/<[^>]+>/g, " ")
    .replaceAll("&quot;", '"')
    .replaceAll("&#x27;", "'")
    .replaceAll("&amp;", "&")
    .replace(/[ \n]+/g, " ");
}
