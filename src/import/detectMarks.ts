/**
 * Decimal and thousands marks from the evidence of whole columns: 1.234,5 and 0,75 decide; 38.500 alone does not, and when
 * nothing else in the file does either, the sentence says that it could be read both ways.
 */
import type { ReadingOptions } from "../domain/importRecord.ts";
import type { RawRow } from "./rawTable.ts";
import { looksLikeDay } from "./readDay.ts";
import type { Marks } from "./readNumber.ts";

const NUMBER_IN_CELL =
  /^[\p{Sc}A-Za-z\s+\-\u2212]{0,5}?(\d[\d.,'\u2019 \u00a0\u202f]*?)(?:[.,]?[-\u2013\u2014]+)?\s*(?:\p{Sc}|%|[A-Za-z]{1,4})?$/u;

interface Votes {
  comma: number;
  point: number;
  /** Grouping seen, by mark; "." and "," also hold the cells that could be decimals. */
  grouped: Record<string, number>;
  eitherPoint: number;
  eitherComma: number;
  example: string | null;
}

function noVotes(): Votes {
  return { comma: 0, point: 0, grouped: {}, eitherPoint: 0, eitherComma: 0, example: null };
}

function add(votes: Votes, mark: string): void {
  votes.grouped[mark] = (votes.grouped[mark] ?? 0) + 1;
}

function vote(votes: Votes, text: string): void {
  if (/^\d{1,3}(?:\.\d{3})+,\d+$/.test(text) || /^\d{1,3}(?:\.\d{3}){2,}$/.test(text)) {
    votes.comma++;
    add(votes, ".");
  } else if (/^\d{1,3}(?:,\d{3})+\.\d+$/.test(text) || /^\d{1,3}(?:,\d{3}){2,}$/.test(text)) {
    votes.point++;
    add(votes, ",");
  } else if (/^[1-9]\d{0,2}\.\d{3}$/.test(text)) {
    votes.eitherPoint++;
    votes.example ??= text;
  } else if (/^[1-9]\d{0,2},\d{3}$/.test(text)) {
    votes.eitherComma++;
    votes.example ??= text;
  } else if (/^\d*,\d+$/.test(text)) votes.comma++;
  else if (/^\d*\.\d+$/.test(text)) votes.point++;
  else {
    const spaced = /^\d{1,3}(?:([ \u00a0\u202f'\u2019])\d{3})+(?:([.,])\d+)?$/.exec(text);
    if (spaced === null) return;
    add(votes, /['\u2019]/.test(spaced[1]!) ? "'" : " ");
    if (spaced[2] === ",") votes.comma++;
    if (spaced[2] === ".") votes.point++;
  }
}

function merge(into: Votes, votes: Votes): void {
  into.comma += votes.comma;
  into.point += votes.point;
  into.eitherPoint += votes.eitherPoint;
  into.eitherComma += votes.eitherComma;
  into.example ??= votes.example;
  for (const [mark, count] of Object.entries(votes.grouped)) into.grouped[mark] = (into.grouped[mark] ?? 0) + count;
}

/** Only columns of which most filled cells are numbers have a say; model names and references have none. */
function votesOfColumn(rows: readonly RawRow[], column: number): Votes {
  const votes = noVotes();
  let filled = 0;
  let numbers = 0;
  for (const { cells } of rows) {
    const cell = cells[column]?.trim() ?? "";
    if (cell === "") continue;
    filled++;
    if (filled === 200 && numbers < 60) return noVotes();
    if (/^\d+$/.test(cell)) {
      numbers++;
      continue;
    }
    const inside = NUMBER_IN_CELL.exec(cell);
    if (inside === null || looksLikeDay(cell)) continue;
    numbers++;
    vote(votes, inside[1]!);
  }
  return numbers * 2 > filled ? votes : noVotes();
}

function decide(votes: Votes, delimiter: string, chosen: "." | "," | undefined): { mark: "." | ","; sentence: string } {
  const name = (mark: "." | ",") => (mark === "," ? "comma" : "point");
  if (chosen !== undefined) return { mark: chosen, sentence: `The decimal mark is a ${name(chosen)}, as chosen.` };
  if (votes.comma > 0 || votes.point > 0) {
    const mark = votes.comma > votes.point ? "," : ".";
    const [most, least] = mark === "," ? [votes.comma, votes.point] : [votes.point, votes.comma];
    const against = least === 0 ? "" : `; ${least === 1 ? "1 says" : `${least} say`} otherwise`;
    return {
      mark,
      sentence: `The decimal mark is a ${name(mark)}: ${most === 1 ? "1 cell shows" : `${most} cells show`} it${against}.`,
    };
  }
  if (votes.eitherPoint + votes.eitherComma > 0) {
    const asThousands = votes.eitherPoint > votes.eitherComma ? "," : ".";
    const mark = delimiter === "," ? "." : delimiter === ";" ? "," : asThousands;
    const seen = votes.eitherPoint > votes.eitherComma ? "." : ",";
    const as = seen === mark ? "decimals" : "thousands";
    return {
      mark,
      sentence: `Numbers such as ${votes.example} could have thousands or decimals behind the mark; read as ${as}.`,
    };
  }
  const mark = delimiter === ";" ? "," : ".";
  return { mark, sentence: `No number has decimals, so the decimal mark is not seen; taken as a ${name(mark)}.` };
}

const GROUP_NAMES: Readonly<Record<string, string>> = { ",": "comma", ".": "point", " ": "space", "'": "apostrophe" };

function thousandsOf(votes: Votes, decimalMark: "." | ","): Marks["thousandsMark"] {
  const counts = new Map<string, number>(Object.entries(votes.grouped));
  if (decimalMark === ",") counts.set(".", (counts.get(".") ?? 0) + votes.eitherPoint);
  else counts.set(",", (counts.get(",") ?? 0) + votes.eitherComma);
  counts.delete(decimalMark);
  let best: Marks["thousandsMark"] = "";
  let most = 0;
  for (const [mark, count] of counts) if (count > most) [best, most] = [mark as Marks["thousandsMark"], count];
  return best;
}

/** Marks of the whole file, and a sentence for each. Chosen ones win; a thousands mark equal to the decimal mark is none. */
export function detectMarks(
  rows: readonly RawRow[],
  headings: readonly string[],
  delimiter: string,
  chosen: Partial<ReadingOptions> | null,
): { marks: Marks; sentences: readonly string[] } {
  const votes = noVotes();
  for (let column = 0; column < headings.length; column++) merge(votes, votesOfColumn(rows, column));
  const decimal = decide(votes, delimiter, chosen?.decimalMark);
  const found = chosen?.thousandsMark ?? thousandsOf(votes, decimal.mark);
  const thousandsMark = found === decimal.mark ? "" : found;
  const why = chosen?.thousandsMark === undefined ? "" : ", as chosen";
  const thousands =
    thousandsMark === ""
      ? `Thousands are not marked${why}.`
      : `Thousands are marked with a ${GROUP_NAMES[thousandsMark]}${why}.`.replace("a apo", "an apo");
  return { marks: { decimalMark: decimal.mark, thousandsMark }, sentences: [decimal.sentence, thousands] };
}
