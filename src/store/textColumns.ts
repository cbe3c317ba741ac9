/** Texts of sales without a million strings: by code from a short list, or looked up in the sales when they are asked for. */
import type { Database } from "better-sqlite3";
import type { TextColumn } from "../domain/sale.ts";

/** texts[codes[i]] for sale i. */
export function codedTexts<Text extends string | null>(
  codes: Uint8Array | Uint16Array | Uint32Array,
  texts: readonly Text[],
): TextColumn<Text> {
  return { length: codes.length, at: (i) => texts[codes[i]!] };
}

/** Sales per look into the table. */
const BLOCK = 4096;

/** Titles and references of the sales numbered `ids` (ascending), a block at a time; a sale that is gone reads "". */
export function saleTexts(
  db: Database,
  ids: Float64Array,
): { titles: TextColumn; references: TextColumn<string | null> } {
  const select = db
    .prepare<[number, number], [number, string, string | null]>(
      "SELECT id, title, reference FROM sales WHERE id BETWEEN ? AND ? ORDER BY id",
    )
    .raw();
  const blocks = new Map<number, { titles: string[]; references: (string | null)[] }>();
  const blockOf = (i: number) => {
    const number = Math.floor(i / BLOCK);
    const known = blocks.get(number);
    if (known !== undefined) return known;
    const own = ids.subarray(number * BLOCK, (number + 1) * BLOCK);
    const found = new Map(select.all(own[0]!, own.at(-1)!).map(([id, ...texts]) => [id, texts]));
    const titles = Array.from(own, (id) => found.get(id)?.[0] ?? "");
    const references = Array.from(own, (id) => found.get(id)?.[1] ?? null);
    const block = { titles, references };
    blocks.set(number, block);
    return block;
  };
  const isIn = (i: number): boolean => Number.isInteger(i) && i >= 0 && i < ids.length;
  return {
    titles: { length: ids.length, at: (i) => (isIn(i) ? blockOf(i).titles[i % BLOCK] : undefined) },
    references: { length: ids.length, at: (i) => (isIn(i) ? blockOf(i).references[i % BLOCK] : undefined) },
  };
}
