/** Whether a drawn sheet keeps to its page, measured on every line of text that was set. */
import { PAGE } from "../../src/sheet/draw/paper.ts";
import type { RenderedSheet } from "../../src/sheet/renderSheetPdf.ts";

/** Nothing may stand outside the page's text area, but for heads and feet, nor run into the same line's next text. */
export function overflowing(sheet: RenderedSheet): string[] {
  return sheet.placed
    .filter(({ left, right, baseline }) => {
      const head = baseline < PAGE.firstTop + 0.5;
      const foot = baseline > 289;
      const tall = !head && !foot && baseline > PAGE.bottom + 0.3;
      return left < PAGE.left - 0.3 || right > PAGE.right + 0.3 || tall;
    })
    .map(
      ({ page, left, right, baseline, text }) =>
        `page ${page + 1}: ${left.toFixed(1)}–${right.toFixed(1)} at ${baseline.toFixed(1)}: ${text}`,
    );
}

/** Pairs of texts on one base line that run into each other. */
export function colliding(sheet: RenderedSheet): string[] {
  const found: string[] = [];
  const { placed } = sheet;
  for (let i = 0; i < placed.length; i++) {
    for (let j = i + 1; j < placed.length; j++) {
      const [a, b] = [placed[i]!, placed[j]!];
      if (a.page !== b.page || Math.abs(a.baseline - b.baseline) > 1.2 || a.text.trim() === "" || b.text.trim() === "")
        continue;
      if (a.right > b.left + 0.15 && b.right > a.left + 0.15)
        found.push(`page ${a.page + 1} at ${a.baseline.toFixed(1)}: ${a.text} | ${b.text}`);
    }
  }
  return found;
}
