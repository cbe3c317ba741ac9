/** Faces, sizes (pt), leadings (pt) and colours of the sheet, each used for one purpose. */
import type { Style } from "./typeface.ts";

export const INK = "#1E2A32";
export const SOFT = "#5B6670";
export const RULE = "#CFC7B6";
export const HAIR = "#DDD6C8";
export const VERDIGRIS = "#1C6E68";
export const SLATE = "#33526E";
export const BRASS = "#A8761A";
/** Brass darkened so that small text on white keeps its contrast. */
export const BRASS_TEXT = "#7D5610";
export const BRICK = "#9A2F2A";
export const WHITE = "#FFFFFF";

const serif = (size: number, leading: number, color = INK): Style => ({ face: "serif", size, leading, color });
const sans = (size: number, leading: number, color = INK): Style => ({ face: "sans", size, leading, color });

export const STYLES = {
  practice: { face: "serifBold", size: 14, leading: 16, color: INK },
  practiceLine: sans(7.2, 10, SOFT),
  numberLine: { face: "sansBold", size: 7.2, leading: 10, color: INK },
  stateLine: sans(7.2, 10, SOFT),
  exampleLabel: { face: "sansMedium", size: 6.8, leading: 10, color: BRASS_TEXT },
  title: { face: "serifBold", size: 21, leading: 24, color: INK },
  titleSmall: { face: "serifBold", size: 17, leading: 20, color: INK },
  identification: serif(9.4, 12.6),
  basisLine: { face: "sansMedium", size: 7.6, leading: 10, color: VERDIGRIS },
  price: { face: "serifBold", size: 38, leading: 41, color: INK, tabular: true },
  priceInWords: { face: "serifItalic", size: 10.4, leading: 13.4, color: INK },
  terms: serif(8.8, 12),
  heading: { face: "serifBold", size: 12.5, leading: 14.5, color: INK },
  lead: serif(9.3, 12.3),
  note: sans(7, 9.3, SOFT),
  factLabel: sans(6.8, 8.6, SOFT),
  fact: serif(8.3, 10.5),
  factSmall: serif(7.8, 9.9),
  caveat: serif(8.6, 10.9),
  effect: sans(7.4, 10.9),
  signature: sans(6.6, 8, SOFT),
  certification: sans(7.2, 9),
  head: sans(6.8, 8.4, SOFT),
  cell: sans(7.5, 9.6),
  cellBold: { face: "sansBold", size: 7.5, leading: 9.6, color: INK },
  cellSoft: sans(7.5, 9.6, SOFT),
  sentence: serif(8, 10.1),
  small: serif(8.1, 10.3),
  usual: serif(8.6, 11.4),
  count: { face: "serifBold", size: 12, leading: 14, color: INK },
  countWords: sans(6.7, 8.4, SOFT),
  countHead: { face: "sansMedium", size: 6.9, leading: 8.4, color: SOFT },
  axis: sans(6.5, 8, SOFT),
  rework: sans(7.4, 9.8),
  reworkSoft: sans(7.4, 9.8, SOFT),
  aside: serif(8.3, 10.9),
  running: sans(7, 9, SOFT),
  runningPractice: { face: "serifBold", size: 8, leading: 10, color: INK },
} as const satisfies Readonly<Record<string, Style>>;

/** Rules, pt. */
export const RULES = { section: 0.7, head: 0.5, row: 0.35 } as const;
