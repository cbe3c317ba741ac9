/** Which separator splits the first rows most evenly, judged with quotes understood. */
import type { ReadingOptions } from "../domain/importRecord.ts";

type Delimiter = ReadingOptions["delimiter"];

const CANDIDATES: readonly { readonly mark: Delimiter; readonly name: string }[] = [
  { mark: "\t", name: "tabs" },
  { mark: ";", name: "semicolons" },
  { mark: "|", name: "upright bars" },
  { mark: ",", name: "commas" },
];
const SAMPLE_ROWS = 200;

/** Cells per record of the first records; blank records are left out. */
function widths(text: string, mark: string): number[] {
  const found: number[] = [];
  let quoted = false;
  let atStart = true;
  let width = 1;
  let filled = false;
  for (let k = 0; k < text.length && found.length < SAMPLE_ROWS; k++) {
    const character = text[k]!;
    if (quoted) {
      if (character === '"') quoted = false;
    } else if (character === '"' && atStart) {
      quoted = true;
      filled = true;
    } else if (character === "\n") {
      if (filled) found.push(width);
      [width, filled, atStart] = [1, false, true];
      continue;
    } else if (character === mark) {
      width++;
      atStart = true;
      continue;
    } else if (character === '"') {
      quoted = text[k - 1] === '"';
    } else filled = true;
    atStart = false;
  }
  if (filled && found.length < SAMPLE_ROWS) found.push(width);
  return found;
}

export interface DetectedDelimiter {
  readonly delimiter: Delimiter;
  readonly sentence: string;
}

/** The separator with which most rows are as wide as the first; of near equals, the one that makes more cells. */
export function detectDelimiter(text: string): DetectedDelimiter {
  const judged = CANDIDATES.map(({ mark, name }) => {
    const counts = widths(text, mark);
    const first = counts[0] ?? 1;
    const alike = counts.filter((count) => count === first).length;
    return { mark, name, first, share: first > 1 ? alike / counts.length : 0 };
  });
  const best = judged.reduce((a, b) => {
    if (Math.abs(a.share - b.share) > 0.05) return b.share > a.share ? b : a;
    return b.first > a.first ? b : a;
  });
  if (best.share === 0) return { delimiter: ",", sentence: "No separator was found; each row reads as one cell." };
  const rows = best.share === 1 ? "every row looked at" : `${Math.round(best.share * 100)} % of the rows looked at`;
  const sentence = `Cells are separated by ${best.name}: ${rows} has ${best.first} cells, as the first one.`;
  return {
    delimiter: best.mark,
    sentence: sentence.replace("% of the rows looked at has", "% of the rows looked at have"),
  };
}
