/**
 * One PDF under the pen: mm from the page's top left corner, base lines for text. Everything drawn is either part of a tagged
 * element or a named artifact. What is set is also written down in `placed`, so that a test can measure that nothing overflows.
 */
import PDFDocument from "pdfkit";
import { FACES, type SheetFonts } from "../sheetFonts.ts";
import {
  createTypeface,
  faceOf,
  type OpenFont,
  PT_PER_MM,
  type Rich,
  type Style,
  spansOf,
  type Typeface,
} from "./typeface.ts";

export const PAGE = { width: 210, height: 297, left: 20, right: 193, top: 17.5, firstTop: 11, bottom: 282 } as const;
export const TEXT_WIDTH = PAGE.right - PAGE.left;

export interface Placed {
  readonly page: number;
  readonly left: number;
  readonly right: number;
  readonly baseline: number;
  readonly size: number;
  readonly text: string;
}

type Doc = InstanceType<typeof PDFDocument>;
/** Members of the writer that its types leave out. */
interface Inside {
  _font: {
    widthOfString(text: string, size: number, features?: readonly string[]): number;
    font: { hasGlyphForCodePoint(code: number): boolean };
  };
  markStructureContent(tag: string): unknown;
}
/** A tagged element; its content is drawn through Paper.leaf. */
export interface Tag {
  add(child: unknown): unknown;
  end(): void;
}

export interface PaperOptions {
  readonly info: Readonly<Record<string, string | Date>>;
  readonly lang: string;
}

export class Paper {
  readonly doc: Doc;
  readonly typeface: Typeface;
  readonly placed: Placed[] = [];
  readonly root: Tag;
  page = 0;
  private readonly opened = new Map<string, OpenFont>();

  constructor(fonts: SheetFonts, options: PaperOptions) {
    this.doc = new PDFDocument({
      size: "A4",
      margin: 0,
      pdfVersion: "1.7",
      tagged: true,
      lang: options.lang,
      displayTitle: true,
      bufferPages: true,
      autoFirstPage: false,
      info: options.info,
      font: null as unknown as string,
    } as PDFKit.PDFDocumentOptions);
    for (const { latin, further } of Object.values(FACES)) {
      for (const name of [latin, further]) this.doc.registerFont(name, Buffer.from(fonts[name]!));
    }
    this.typeface = createTypeface((font) => this.open(font));
    this.root = this.doc.struct("Document") as unknown as Tag;
    this.doc.addStructure(this.root as never);
    this.addPage();
  }

  private get inside(): Inside {
    return this.doc as unknown as Inside;
  }

  private open(name: string): OpenFont {
    const known = this.opened.get(name);
    if (known !== undefined) return known;
    this.doc.font(name);
    const font = this.inside._font;
    const widths = new Map<string, number>();
    const opened: OpenFont = {
      has: (code) => font.font.hasGlyphForCodePoint(code),
      width: (text, size, tabular) => {
        const key = tabular ? `#${text}` : text;
        let width = widths.get(key);
        if (width === undefined) {
          width = font.widthOfString(text, 1000, tabular ? ["tnum"] : undefined);
          widths.set(key, width);
        }
        return (width * size) / 1000;
      },
    };
    this.opened.set(name, opened);
    return opened;
  }

  addPage(): void {
    this.doc.addPage();
    this.page = this.doc.bufferedPageRange().count - 1;
  }

  /** A new element under `parent`; Figure wants `alt`. */
  tag(type: string, parent: Tag = this.root, options: { alt?: string; scope?: "Column" | "Row" } = {}): Tag {
    const tag = this.doc.struct(type as never, options as never) as unknown as Tag;
    parent.add(tag);
    return tag;
  }

  /** Draws content of a tagged element. Leaves do not nest. */
  leaf(type: string, tag: Tag, draw: () => void): void {
    tag.add(this.inside.markStructureContent(type));
    draw();
    this.doc.endMarkedContent();
  }

  /** Rules, grounds, running heads: nothing that a reader must hear. */
  artifact(draw: () => void, type: "Layout" | "Pagination" = "Layout"): void {
    this.doc.markContent("Artifact" as never, { type } as never);
    draw();
    this.doc.endMarkedContent();
  }

  /**
   * Sets one line on its base line; `at` is its left end, right end or middle. Gives its width in mm. A blank without ink follows
   * it, so that words of two lines do not grow together when the page is copied or read aloud.
   */
  text(rich: Rich, at: number, baseline: number, style: Style, align: "left" | "right" | "middle" = "left"): number {
    const width = this.typeface.width(rich, style);
    const left = align === "left" ? at : align === "right" ? at - width : at - width / 2;
    const runs = spansOf(rich).flatMap((span) => this.typeface.runs(span.text, faceOf(style, span)));
    if (runs.length > 0 && !/[-–/]$/.test(runs[runs.length - 1]!.text))
      runs.push({ font: FACES[style.face].latin, text: " " });
    this.doc.fillColor(style.color).fontSize(style.size);
    let x = left;
    for (const run of runs) {
      this.doc.font(run.font).text(run.text, x * PT_PER_MM, baseline * PT_PER_MM, {
        lineBreak: false,
        baseline: "alphabetic",
        ...(style.tabular === true ? { features: ["tnum"] } : {}),
      } as PDFKit.Mixins.TextOptions);
      x += this.open(run.font).width(run.text, style.size, style.tabular === true) / PT_PER_MM;
    }
    const text = spansOf(rich)
      .map((span) => span.text)
      .join("");
    this.placed.push({ page: this.page, left, right: left + width, baseline, size: style.size, text });
    return width;
  }

  /** Sets a label under or over `at`, moved in where it would leave the text area. */
  tickLabel(words: string, at: number, baseline: number, style: Style): void {
    const half = this.typeface.width(words, style) / 2;
    this.text(words, Math.max(PAGE.left + half, Math.min(PAGE.right - half, at)), baseline, style, "middle");
  }

  line(
    x1: number,
    y1: number,
    x2: number,
    y2: number,
    width: number,
    color: string,
    dash?: readonly [number, number],
  ): void {
    const k = PT_PER_MM;
    this.doc.lineWidth(width).strokeColor(color);
    if (dash !== undefined) this.doc.dash(dash[0], { space: dash[1] });
    this.doc
      .moveTo(x1 * k, y1 * k)
      .lineTo(x2 * k, y2 * k)
      .stroke();
    if (dash !== undefined) this.doc.undash();
  }

  /** Rectangle in mm; stroke width in pt. */
  rect(x: number, y: number, w: number, h: number, paint: { fill?: string; stroke?: string; width?: number }): void {
    const k = PT_PER_MM;
    this.doc.rect(x * k, y * k, w * k, h * k);
    this.paint(paint);
  }

  roundedRect(
    x: number,
    y: number,
    w: number,
    h: number,
    r: number,
    paint: { fill?: string; stroke?: string; width?: number },
  ): void {
    const k = PT_PER_MM;
    this.doc.roundedRect(x * k, y * k, w * k, h * k, r * k);
    this.paint(paint);
  }

  circle(x: number, y: number, r: number, paint: { fill?: string; stroke?: string; width?: number }): void {
    const k = PT_PER_MM;
    this.doc.circle(x * k, y * k, r * k);
    this.paint(paint);
  }

  polygon(
    points: readonly (readonly [number, number])[],
    paint: { fill?: string; stroke?: string; width?: number },
  ): void {
    const k = PT_PER_MM;
    this.doc.polygon(...points.map(([x, y]) => [x * k, y * k] as [number, number]));
    this.paint(paint);
  }

  private paint({ fill, stroke, width = 0.5 }: { fill?: string; stroke?: string; width?: number }): void {
    if (stroke !== undefined) this.doc.lineWidth(width).strokeColor(stroke);
    if (fill !== undefined) this.doc.fillColor(fill);
    if (fill !== undefined && stroke !== undefined) this.doc.fillAndStroke();
    else if (fill !== undefined) this.doc.fill();
    else this.doc.stroke();
  }

  /** White rectangle with 45° lines cut at its sides, and an outline: "down" and "carried" without a tint. */
  hatch(x: number, y: number, w: number, h: number, color: string): void {
    this.rect(x, y, w, h, { fill: "#FFFFFF" });
    const gap = 1.15;
    for (let c = -h + (gap - ((x - y + h) % gap)); c < w; c += gap) {
      const from = Math.max(0, c);
      const to = Math.min(w, c + h);
      if (to - from > 0.02) this.line(x + from, y + h - (from - c), x + to, y + h - (to - c), 0.65, color);
    }
    this.rect(x, y, w, h, { stroke: color, width: 0.75 });
  }

  bookmark(title: string, y: number): void {
    this.doc.outline.addItem(title, { pageNumber: this.page, top: y * PT_PER_MM } as never);
  }

  /** All bytes of the file. */
  finish(): Promise<Uint8Array> {
    const chunks: Buffer[] = [];
    return new Promise((resolve, reject) => {
      this.doc.on("data", (chunk: Buffer) => chunks.push(Buffer.from(chunk)));
      this.doc.on("end", () => resolve(new Uint8Array(Buffer.concat(chunks))));
      this.doc.on("error", reject);
      this.doc.end();
    });
  }
}
