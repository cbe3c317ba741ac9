/** Rows of tables: cells in columns, wrapped, tagged as header or data cells, with a hairline or an ink rule below. */
import { type Band, fitText, mm, type Strip, setLines, type TextBox } from "./flow.ts";
import { PAGE, type Paper, type Tag } from "./paper.ts";
import { HAIR, INK, RULES, STYLES } from "./styles.ts";
import type { Rich, Style } from "./typeface.ts";

export interface Column {
  /** mm from the left margin. */
  readonly left: number;
  readonly width: number;
  readonly align: "left" | "right";
}

export interface Cell {
  readonly rich: Rich;
  readonly style?: Style;
  /** Columns that the cell reaches over. */
  readonly span?: number;
}

export interface Row {
  readonly cells: readonly Cell[];
  readonly minHeight: number;
  readonly pad: number;
  readonly rule: "hair" | "ink" | "none";
  readonly isHead?: boolean;
  /** The picture of the row, drawn between its top and bottom. */
  picture?(top: number, height: number): void;
}

/** A cell with more lines than this ends in an ellipsis; what people wrote stands in full under the assumptions. */
export const CELL_LINES = 12;

/** A table as it is drawn; its tag is made when its first row is. */
export class Table {
  private tag: Tag | null = null;
  private figure: Tag | null = null;
  private readonly paper: Paper;
  private readonly columns: readonly Column[];
  private readonly alt: string | null;

  constructor(paper: Paper, columns: readonly Column[], alt: string | null = null) {
    this.paper = paper;
    this.columns = columns;
    this.alt = alt;
  }

  private boxes(row: Row): TextBox[] {
    let at = 0;
    return row.cells.map((cell) => {
      const span = cell.span ?? 1;
      const column = this.columns[at]!;
      const last = this.columns[at + span - 1]!;
      at += span;
      const width = last.left + last.width - column.left;
      const style = cell.style ?? (row.isHead === true ? STYLES.head : STYLES.cell);
      return fitText(this.paper, cell.rich, style, width, CELL_LINES);
    });
  }

  strip(row: Row): Strip {
    const boxes = this.boxes(row);
    const height = Math.max(row.minHeight, 2 * row.pad + Math.max(0, ...boxes.map((box) => box.height)));
    return { height, draw: (top) => this.draw(row, boxes, top, height) };
  }

  private draw(row: Row, boxes: readonly TextBox[], top: number, height: number): void {
    const { paper } = this;
    this.tag ??= paper.tag("Table");
    if (row.rule !== "none") {
      const y = top + height;
      paper.artifact(() =>
        paper.line(
          PAGE.left,
          y,
          PAGE.right,
          y,
          row.rule === "ink" ? RULES.head : RULES.row,
          row.rule === "ink" ? INK : HAIR,
        ),
      );
    }
    const line = paper.tag("TR", this.tag);
    let at = 0;
    row.cells.forEach((cell, index) => {
      const box = boxes[index]!;
      const column = this.columns[at]!;
      at += cell.span ?? 1;
      const style = cell.style ?? (row.isHead === true ? STYLES.head : STYLES.cell);
      const type = row.isHead === true || index === 0 ? "TH" : "TD";
      const tag = paper.tag(type, line, type === "TH" ? { scope: row.isHead === true ? "Column" : "Row" } : {});
      const y = row.isHead === true ? top + height - row.pad - box.height : top + (height - box.height) / 2;
      const x = PAGE.left + (column.align === "left" ? column.left : column.left + column.width);
      paper.leaf(type, tag, () => setLines(paper, box.lines, x, y, style, column.align));
    });
    const picture = row.picture;
    if (picture === undefined) return;
    if (this.alt !== null && row.isHead !== true) {
      this.figure ??= paper.tag("Figure", paper.root, { alt: this.alt });
      paper.leaf("Figure", this.figure, () => picture.call(row, top, height));
    } else paper.artifact(() => picture.call(row, top, height));
  }

  band(head: Row, rows: readonly Row[]): Band {
    const strips = rows.map((row) => this.strip(row));
    return { head: this.strip({ ...head, isHead: true }), strips };
  }
}

/** Width that the texts of a column need, mm. */
export function columnWidth(paper: Paper, texts: readonly Rich[], style: Style, atLeast = 0): number {
  return texts.reduce<number>((width, text) => Math.max(width, paper.typeface.width(text, style) + 0.05), atLeast);
}

/** A head of a column in two lines, broken at its best blank. */
export function headWidth(paper: Paper, text: string, style: Style = STYLES.head): number {
  const words = text.split(" ");
  let best = paper.typeface.width(text, style);
  for (let k = 1; k < words.length; k++) {
    const [above, below] = [words.slice(0, k).join(" "), words.slice(k).join(" ")];
    best = Math.min(best, Math.max(paper.typeface.width(above, style), paper.typeface.width(below, style)));
  }
  return best + 0.05;
}

export const cellLeading = mm(STYLES.cell.leading);
