/** Parts that are mostly text: notes, paragraphs and numbered cautions in two columns, counts, and the block for working out again. */
import type { Counts, ReworkRow, Words } from "../sheetContent.ts";
import { type Band, fitText, mm, type Strip, setLines } from "./flow.ts";
import { PAGE, type Paper, type Tag, TEXT_WIDTH } from "./paper.ts";
import { HAIR, RULE, RULES, STYLES } from "./styles.ts";
import type { Rich, Style } from "./typeface.ts";

export function noteBand(paper: Paper, text: string): Band {
  const box = fitText(paper, text, STYLES.note, TEXT_WIDTH);
  return {
    head: null,
    strips: [
      {
        height: box.height + 1.4,
        draw: (top) =>
          paper.leaf("P", paper.tag("P"), () => setLines(paper, box.lines, PAGE.left, top + 1.4, STYLES.note)),
      },
    ],
  };
}

interface Item {
  readonly mark: string | null;
  readonly rich: Rich;
}

interface Placed {
  readonly item: Item;
  readonly lines: ReturnType<typeof fitText>["lines"];
  readonly height: number;
  readonly isFirst: boolean;
}

/** A text of more lines is set in pieces, so that a page can end between them. */
const CHUNK = 40;
const GUTTER = 7;
const COLUMN = (TEXT_WIDTH - GUTTER) / 2;
const MARK = 4.4;

/** Two columns of about equal height, read down the left one first; each pair of columns is as tall as a third of a page at most. */
function twoColumns(paper: Paper, items: readonly Item[], style: Style, space: number): Band {
  const placed = items.flatMap((item): Placed[] => {
    const { lines } = fitText(paper, item.rich, style, COLUMN - (item.mark === null ? 0 : MARK));
    const chunks: Placed[] = [];
    for (let from = 0; from < lines.length; from += CHUNK) {
      const some = lines.slice(from, from + CHUNK);
      const isLast = from + CHUNK >= lines.length;
      const height = some.length * mm(style.leading) + (isLast ? space : 0);
      chunks.push({ item, lines: some, height, isFirst: from === 0 });
    }
    return chunks;
  });
  let list: Tag | null = null;
  const isList = items.some(({ mark }) => mark !== null);
  const draw = (column: readonly Placed[], left: number, from: number): void => {
    let top = from;
    for (const { item, lines, height, isFirst } of column) {
      if (isList) list ??= paper.tag("L");
      const type = isList ? "LI" : "P";
      const indent = item.mark === null ? 0 : MARK;
      const y = top;
      paper.leaf(type, paper.tag(type, list ?? paper.root), () => {
        if (item.mark !== null && isFirst) setLines(paper, [[{ text: item.mark, bold: true }]], left, y, style);
        setLines(paper, lines, left + indent, y, style);
      });
      top += height;
    }
  };
  const strips = groupsOf(placed).map(([first, second]): Strip => {
    const height = Math.max(sum(first), sum(second));
    return {
      height,
      draw: (top) => {
        draw(first, PAGE.left, top);
        draw(second, PAGE.left + COLUMN + GUTTER, top);
      },
    };
  });
  return { head: null, strips };
}

const sum = (column: readonly Placed[]): number => column.reduce((total, { height }) => total + height, 0);
const GROUP = 90;

/** Items in reading order, cut into groups that fit a page's third, each split where the two columns are nearest in height. */
function groupsOf(placed: readonly Placed[]): [Placed[], Placed[]][] {
  const groups: Placed[][] = [];
  for (const one of placed) {
    const last = groups[groups.length - 1];
    if (last === undefined || sum(last) + one.height > 2 * GROUP) groups.push([one]);
    else last.push(one);
  }
  return groups.map((group) => {
    let best = group.length;
    const taller = (k: number): number => Math.max(sum(group.slice(0, k)), sum(group.slice(k)));
    for (let k = 1; k <= group.length; k++) if (taller(k) < taller(best) - 0.01) best = k;
    return [group.slice(0, best), group.slice(best)];
  });
}

export function paragraphsBand(paper: Paper, items: readonly Words[], size: "small" | "usual"): Band {
  const style = size === "small" ? STYLES.small : STYLES.usual;
  const band = twoColumns(
    paper,
    items.map((rich) => ({ mark: null, rich })),
    style,
    size === "small" ? 0.7 : 0.9,
  );
  return size === "small" ? { head: null, strips: padded(band.strips, 1.2) } : band;
}

function padded(strips: readonly Strip[], space: number): Strip[] {
  return strips.map((strip, index) =>
    index > 0 ? strip : { height: strip.height + space, draw: (top) => strip.draw(top + space) },
  );
}

export function numberedBand(paper: Paper, items: readonly string[]): Band {
  return twoColumns(
    paper,
    items.map((rich, index) => ({ mark: String(index + 1), rich })),
    STYLES.usual,
    0.8,
  );
}

const COUNT_WIDTH = 20;

export function countsBand(paper: Paper, counts: Counts): Band {
  const cells = [{ count: counts.cameIn, words: "came in" }, { count: counts.used, words: "used" }, ...counts.rest];
  const restWidth = (TEXT_WIDTH - 2 * COUNT_WIDTH) / Math.max(1, counts.rest.length);
  const leftOf = (index: number): number =>
    index < 2 ? index * COUNT_WIDTH : 2 * COUNT_WIDTH + (index - 2) * restWidth;
  const boxes = cells.map(({ words }, index) =>
    fitText(paper, words, STYLES.countWords, (index < 2 ? COUNT_WIDTH : Math.min(restWidth, 34)) - 3.2),
  );
  const head = counts.restHead === "" ? 0 : 0.9 + mm(STYLES.countHead.leading);
  const height = head + 0.5 + mm(STYLES.count.leading) + Math.max(...boxes.map((box) => box.height)) + 1.3;
  const draw = (top: number): void => {
    paper.artifact(() => {
      for (const y of [top, top + height]) paper.line(PAGE.left, y, PAGE.right, y, RULES.row, RULE);
      cells.forEach((_, index) => {
        const x = PAGE.left + leftOf(index);
        if (index > 0) paper.line(x, top + (index === 2 ? 0 : head + 0.6), x, top + height, RULES.row, HAIR);
      });
    });
    if (counts.restHead !== "") {
      paper.leaf("P", paper.tag("P"), () =>
        setLines(paper, [counts.restHead], PAGE.left + 2 * COUNT_WIDTH + 2, top + 0.9, STYLES.countHead),
      );
    }
    cells.forEach(({ count }, index) => {
      const x = PAGE.left + leftOf(index) + (index === 0 ? 0 : 2);
      const y = top + head + 0.5;
      paper.leaf("P", paper.tag("P"), () => {
        setLines(paper, [count], x, y, STYLES.count);
        setLines(paper, boxes[index]!.lines, x, y + mm(STYLES.count.leading), STYLES.countWords);
      });
    });
  };
  return { head: null, strips: [{ height, draw }] };
}

const LABEL = 33;
const ASIDE = 66;

export function reworkBand(paper: Paper, rows: readonly ReworkRow[], aside: readonly Words[]): Band {
  const width = TEXT_WIDTH - ASIDE - GUTTER - LABEL;
  const boxes = rows.map((row) => {
    const lines = row.lines.flatMap((line) => fitText(paper, line, STYLES.rework, width).lines);
    const note = row.note === null ? [] : fitText(paper, row.note, STYLES.reworkSoft, width).lines;
    return { lines, note, height: 1.1 + (lines.length + note.length) * mm(STYLES.rework.leading) };
  });
  const texts = aside.map((rich) => fitText(paper, rich, STYLES.aside, ASIDE));
  const left = boxes.reduce((total, { height }) => total + height, 0);
  const right = texts.reduce((total, { height }) => total + height + 1, 0);
  const draw = (from: number): void => {
    const table = paper.tag("Table");
    let top = from + 0.55;
    rows.forEach((row, index) => {
      const { lines, note, height } = boxes[index]!;
      const y = top;
      const line = paper.tag("TR", table);
      paper.leaf("TH", paper.tag("TH", line, { scope: "Row" }), () =>
        setLines(paper, [row.label], PAGE.left, y, STYLES.reworkSoft),
      );
      paper.leaf("TD", paper.tag("TD", line), () => {
        setLines(paper, lines, PAGE.left + LABEL, y, STYLES.rework);
        setLines(paper, note, PAGE.left + LABEL, y + lines.length * mm(STYLES.rework.leading), STYLES.reworkSoft);
      });
      top += height;
    });
    top = from;
    texts.forEach((box) => {
      const y = top;
      paper.leaf("P", paper.tag("P"), () => setLines(paper, box.lines, PAGE.right - ASIDE, y, STYLES.aside));
      top += box.height + 1;
    });
  };
  return { head: null, strips: [{ height: Math.max(left, right), draw }] };
}
