/**
 * Page 1, which never breaks: it is measured at one degree of tightness after another until it fits, and then drawn. What had to
 * be shortened is handed back, to be printed in full on a later page.
 */
import type { Fact, FirstPage, Sheet } from "../sheetContent.ts";
import { caveatsHeight, drawCaveats, isCaveatCut } from "./drawCaveats.ts";
import { drawGauge, gaugeHeight } from "./drawGauge.ts";
import { baselineOf, fitText, hairline, mm, paragraph, setLines, type TextBox } from "./flow.ts";
import { PAGE, type Paper, TEXT_WIDTH } from "./paper.ts";
import { BRASS, INK, RULES, SOFT, STYLES, WHITE } from "./styles.ts";
import type { Style } from "./typeface.ts";

/** How tightly the page is set. */
interface Tightness {
  readonly fact: Style;
  readonly short: boolean;
  readonly gaugeTrim: number;
  readonly signRow: number;
  readonly signLine: number;
  readonly factLines: number;
  readonly caveatLines: number;
  readonly titleLines: number;
}

const LOOSE: Tightness = {
  fact: STYLES.fact,
  short: false,
  gaugeTrim: 0,
  signRow: 7,
  signLine: 9.6,
  factLines: 12,
  caveatLines: 4,
  titleLines: 3,
};
const DEGREES: readonly Tightness[] = [
  LOOSE,
  { ...LOOSE, fact: STYLES.factSmall },
  { ...LOOSE, fact: STYLES.factSmall, short: true },
  { ...LOOSE, fact: STYLES.factSmall, short: true, gaugeTrim: 3 },
  { ...LOOSE, fact: STYLES.factSmall, short: true, gaugeTrim: 3, signRow: 5.8, signLine: 8 },
  {
    fact: STYLES.factSmall,
    short: true,
    gaugeTrim: 3,
    signRow: 5.8,
    signLine: 8,
    factLines: 3,
    caveatLines: 3,
    titleLines: 2,
  },
  {
    fact: STYLES.factSmall,
    short: true,
    gaugeTrim: 3,
    signRow: 5.8,
    signLine: 8,
    factLines: 2,
    caveatLines: 2,
    titleLines: 1,
  },
  {
    fact: STYLES.factSmall,
    short: true,
    gaugeTrim: 3,
    signRow: 5.4,
    signLine: 7.4,
    factLines: 1,
    caveatLines: 1,
    titleLines: 1,
  },
];

const LETTERHEAD_WIDTH = 112;
const HERO_TOP = 28.3;
const HERO_WIDTH = 112;
const PANEL = { left: 136, width: 57 } as const;
const COLUMNS: readonly (readonly [left: number, width: number])[] = [
  [0, 52],
  [57, 62],
  [124, 49],
];

/** Draws page 1; gives what could not stand there whole. */
export function drawFirstPage(paper: Paper, sheet: Sheet): Fact[] {
  const { first } = sheet;
  const degree = DEGREES.find((one) => bottomOf(paper, first, one) <= PAGE.bottom) ?? DEGREES[DEGREES.length - 1]!;
  letterhead(paper, sheet);
  paper.bookmark("The price", HERO_TOP - 4);
  let top = hero(paper, first, degree);
  drawGauge(paper, first.gauge, top, degree.gaugeTrim);
  top += gaugeHeight(first.gauge, degree.gaugeTrim) + 3;
  top = facts(paper, first, top, degree);
  top = heading(paper, first.caveatHeading, top + 2.2);
  if (first.caveats.length === 0) {
    const place = { x: PAGE.left, top: top + 0.6, width: TEXT_WIDTH };
    top +=
      0.6 + paragraph(paper, {}, "The program found nothing in this evidence to caution about.", place, STYLES.caveat);
  } else top = drawCaveats(paper, first.caveats, top + 0.6, degree.caveatLines);
  top = heading(paper, "Signature and certification", top + 3);
  signature(paper, first, top + 0.4, degree);
  return cutOf(paper, sheet, degree);
}

/** What page 1 shows shortened, each with its name. */
function cutOf(paper: Paper, { first, practice, practiceLine }: Sheet, degree: Tightness): Fact[] {
  const named = (label: string, words: string): Fact => ({ label, words, short: words });
  const cut: Fact[] = [];
  if (fitText(paper, practice, STYLES.practice, LETTERHEAD_WIDTH, 1).clamped) cut.push(named("Practice", practice));
  if (fitText(paper, practiceLine, STYLES.practiceLine, LETTERHEAD_WIDTH, 1).clamped) {
    cut.push(named("Practice, further", practiceLine));
  }
  if (titleBox(paper, first, degree).box.clamped) cut.push(named("Item", first.title));
  if (identificationBox(paper, first).clamped) cut.push(named("Description", first.identification));
  cut.push(...first.facts.flat().filter((fact, index) => isCut(paper, fact, columnWidth(first, index), degree)));
  for (const row of first.caveats) {
    if (!isCaveatCut(paper, row, degree.caveatLines)) continue;
    const read = row.wouldRead.length === 0 ? "" : ` (${row.wouldRead.join("; ")})`;
    cut.push(named(`Caveat ${row.number}`, `${row.headline} ${row.text}${read}`));
  }
  return cut;
}

function identificationBox(paper: Paper, first: FirstPage): TextBox {
  return fitText(paper, first.identification, STYLES.identification, TEXT_WIDTH, 2);
}

function columnWidth(first: FirstPage, index: number): number {
  let rest = index;
  for (let column = 0; column < first.facts.length; column++) {
    if (rest < first.facts[column]!.length) return COLUMNS[column]![1];
    rest -= first.facts[column]!.length;
  }
  return COLUMNS[0]![1];
}

function isCut(paper: Paper, fact: Fact, width: number, degree: Tightness): boolean {
  if (degree.short && fact.short !== fact.words) return true;
  return factBox(paper, fact, width, degree).clamped;
}

function titleBox(paper: Paper, first: FirstPage, degree: Tightness): { box: TextBox; style: Style } {
  const one = fitText(paper, first.title, STYLES.title, TEXT_WIDTH);
  if (one.lines.length === 1) return { box: one, style: STYLES.title };
  return {
    box: fitText(paper, first.title, STYLES.titleSmall, TEXT_WIDTH, degree.titleLines),
    style: STYLES.titleSmall,
  };
}

function heroHeight(paper: Paper, first: FirstPage, degree: Tightness): number {
  const identification = first.identification === "" ? 0 : 0.8 + identificationBox(paper, first).height;
  return titleBox(paper, first, degree).box.height + identification + 3 + priceHeight(paper, first);
}

function priceHeight(paper: Paper, first: FirstPage): number {
  const words = fitText(paper, first.priceInWords, STYLES.priceInWords, HERO_WIDTH).height;
  const basis = fitText(paper, first.basisLine, STYLES.basisLine, HERO_WIDTH, 2).height;
  const terms = 1 + fitText(paper, first.terms, STYLES.terms, HERO_WIDTH, 6).height;
  return Math.max(basis + mm(STYLES.price.leading) + words + terms, panelHeight(first));
}

function factBox(paper: Paper, fact: Fact, width: number, degree: Tightness): TextBox {
  return fitText(paper, degree.short ? fact.short : fact.words, degree.fact, width, degree.factLines);
}

function factsHeight(paper: Paper, first: FirstPage, degree: Tightness): number {
  const columns = first.facts.map((column, index) =>
    column.reduce(
      (sum, fact) => sum + mm(STYLES.factLabel.leading) + factBox(paper, fact, COLUMNS[index]![1], degree).height + 1.1,
      0,
    ),
  );
  return 2 + Math.max(0, ...columns);
}

const HEADING = 1.6 + mm(STYLES.heading.leading);

function bottomOf(paper: Paper, first: FirstPage, degree: Tightness): number {
  const caveats =
    first.caveats.length === 0 ? mm(STYLES.caveat.leading) : caveatsHeight(paper, first.caveats, degree.caveatLines);
  return (
    HERO_TOP +
    heroHeight(paper, first, degree) +
    5 +
    gaugeHeight(first.gauge, degree.gaugeTrim) +
    3 +
    factsHeight(paper, first, degree) +
    2.2 +
    HEADING +
    0.6 +
    caveats +
    3 +
    HEADING +
    0.4 +
    signatureHeight(degree)
  );
}

function letterhead(paper: Paper, sheet: Sheet): void {
  const rule = 24.2;
  const bottom = rule - 2;
  const practice = paper.tag("P");
  const name = fitText(paper, sheet.practice, STYLES.practice, LETTERHEAD_WIDTH, 1).lines;
  const line = fitText(paper, sheet.practiceLine, STYLES.practiceLine, LETTERHEAD_WIDTH, 1).lines;
  const top = bottom - mm(STYLES.practice.leading + STYLES.practiceLine.leading);
  paper.leaf("P", practice, () => {
    setLines(paper, name, PAGE.left, top, STYLES.practice);
    setLines(paper, line, PAGE.left, top + mm(STYLES.practice.leading), STYLES.practiceLine);
  });
  const right = bottom - 2 * mm(STYLES.stateLine.leading);
  paper.leaf("P", paper.tag("P"), () => {
    setLines(paper, [sheet.numberLine], PAGE.right, right, STYLES.numberLine, "right");
    setLines(paper, [sheet.stateLine], PAGE.right, right + mm(10), STYLES.stateLine, "right");
  });
  if (sheet.exampleLabel !== null) exampleLabel(paper, sheet.exampleLabel, right - 4.9);
  paper.artifact(() => paper.line(PAGE.left, rule, PAGE.right, rule, RULES.section, INK));
}

function exampleLabel(paper: Paper, label: string, top: number): void {
  const style = STYLES.exampleLabel;
  const width = paper.typeface.width(label, style) + 3.2;
  const left = PAGE.right - width;
  paper.artifact(() => paper.roundedRect(left, top, width, 3.9, 0.8, { stroke: BRASS, width: 0.6, fill: WHITE }));
  paper.leaf("P", paper.tag("P"), () => {
    paper.text(label, left + 1.6, top + 0.18 + baselineOf(style), style);
  });
}

function hero(paper: Paper, first: FirstPage, degree: Tightness): number {
  let top = HERO_TOP;
  const { box, style } = titleBox(paper, first, degree);
  paper.leaf("H1", paper.tag("H1"), () => setLines(paper, box.lines, PAGE.left, top, style));
  top += box.height;
  if (first.identification !== "") {
    const lines = identificationBox(paper, first);
    paper.leaf("P", paper.tag("P"), () => setLines(paper, lines.lines, PAGE.left, top + 0.8, STYLES.identification));
    top += 0.8 + lines.height;
  }
  top += 3;
  priceBlock(paper, first, top);
  panel(paper, first, top);
  return top + priceHeight(paper, first) + 5;
}

function priceBlock(paper: Paper, first: FirstPage, from: number): void {
  let top = from;
  const place = (): { x: number; top: number; width: number } => ({ x: PAGE.left, top, width: HERO_WIDTH });
  const basis = fitText(paper, first.basisLine, STYLES.basisLine, HERO_WIDTH, 2);
  paper.leaf("P", paper.tag("P"), () => setLines(paper, basis.lines, PAGE.left, top, STYLES.basisLine));
  top += basis.height;
  const wide = paper.typeface.width(first.price, STYLES.price);
  const size = wide <= HERO_WIDTH ? STYLES.price.size : (STYLES.price.size * HERO_WIDTH) / wide;
  const baseline = top + baselineOf(STYLES.price);
  paper.leaf("P", paper.tag("P"), () => {
    paper.text(first.price, PAGE.left, baseline, { ...STYLES.price, size });
  });
  top += mm(STYLES.price.leading);
  top += paragraph(paper, {}, first.priceInWords, place(), STYLES.priceInWords) + 1;
  const terms = fitText(paper, first.terms, STYLES.terms, HERO_WIDTH, 6);
  paper.leaf("P", paper.tag("P"), () => setLines(paper, terms.lines, PAGE.left, top, STYLES.terms));
}

const PANEL_ROW = 4.9;
const PANEL_LABEL = 19;

function panelHeight(first: FirstPage): number {
  return mm(STYLES.factLabel.leading) + 1.2 + first.restsOn.length * PANEL_ROW;
}

function panel(paper: Paper, first: FirstPage, top: number): void {
  const right = PANEL.left + PANEL.width;
  paper.leaf("P", paper.tag("P"), () => {
    paper.text("What the price rests on", PANEL.left, top + baselineOf(STYLES.basisLine), {
      ...STYLES.basisLine,
      color: SOFT,
    });
  });
  const table = paper.tag("Table");
  const start = top + mm(STYLES.basisLine.leading) + 0.9;
  first.restsOn.forEach((fact, index) => {
    const y = start + index * PANEL_ROW;
    paper.artifact(() => hairline(paper, y, PANEL.left, right));
    const row = paper.tag("TR", table);
    paper.leaf("TH", paper.tag("TH", row, { scope: "Row" }), () => {
      paper.text(fact.label, PANEL.left, y + 3.35, { ...STYLES.cellSoft, size: 7.2 });
    });
    const words = fitText(paper, fact.words, { ...STYLES.cell, size: 7.2 }, PANEL.width - PANEL_LABEL, 1).lines;
    paper.leaf("TD", paper.tag("TD", row), () => {
      paper.text(words[0]!, PANEL.left + PANEL_LABEL, y + 3.35, { ...STYLES.cell, size: 7.2 });
    });
  });
  const end = start + first.restsOn.length * PANEL_ROW;
  paper.artifact(() => hairline(paper, end, PANEL.left, right));
}

function facts(paper: Paper, first: FirstPage, from: number, degree: Tightness): number {
  paper.artifact(() => paper.line(PAGE.left, from, PAGE.right, from, RULES.section, INK));
  first.facts.forEach((column, index) => {
    const [left, width] = COLUMNS[index]!;
    let top = from + 2;
    for (const fact of column) {
      const box = factBox(paper, fact, width, degree);
      paper.leaf("P", paper.tag("P"), () => {
        setLines(paper, [fact.label], PAGE.left + left, top, STYLES.factLabel);
        setLines(paper, box.lines, PAGE.left + left, top + mm(STYLES.factLabel.leading), degree.fact);
      });
      top += mm(STYLES.factLabel.leading) + box.height + 1.1;
    }
  });
  return from + factsHeight(paper, first, degree);
}

function heading(paper: Paper, words: string, top: number): number {
  paper.artifact(() => paper.line(PAGE.left, top, PAGE.right, top, RULES.section, INK));
  const place = { x: PAGE.left, top: top + 1.6, width: TEXT_WIDTH };
  return top + 1.6 + paragraph(paper, { type: "H2" }, words, place, STYLES.heading);
}

const SIGN_WIDTH = 66;
const CERTIFICATION = { left: 73, column: 47.5, gutter: 5 } as const;

function signatureHeight({ signRow, signLine }: Tightness): number {
  const left = 3 * (signLine + mm(STYLES.signature.leading));
  return Math.max(left, 0.8 + mm(STYLES.note.leading) + 5 * signRow);
}

function signature(paper: Paper, first: FirstPage, top: number, { signRow, signLine }: Tightness): void {
  first.signatureLines.forEach((words, index) => {
    const y = top + signLine + index * (signLine + mm(STYLES.signature.leading));
    paper.artifact(() => paper.line(PAGE.left, y, PAGE.left + SIGN_WIDTH, y, index === 0 ? 0.9 : 0.5, INK));
    paper.leaf("P", paper.tag("P"), () => setLines(paper, [words], PAGE.left, y + 0.15, STYLES.signature));
  });
  const left = PAGE.left + CERTIFICATION.left;
  paper.leaf("P", paper.tag("P"), () => setLines(paper, [first.certificationNote], left, top + 0.8, STYLES.note));
  const start = top + 0.8 + mm(STYLES.note.leading);
  first.certificationTopics.forEach((topic, index) => {
    const x = left + (index % 2) * (CERTIFICATION.column + CERTIFICATION.gutter);
    const y = start + (Math.floor(index / 2) + 1) * signRow;
    let width = 0;
    paper.leaf("P", paper.tag("P"), () => {
      width = paper.text(topic, x, y - 0.95, STYLES.certification);
    });
    paper.artifact(() =>
      paper.line(x + width + 1.3, y - 0.15, x + CERTIFICATION.column, y - 0.15, 0.5, SOFT, [0.5, 1]),
    );
  });
}
