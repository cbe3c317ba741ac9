/** The last sections: further caveats, assumptions and limits, the standing cautions, and how to work the price out again. */
import { formatDay, formatMoney, formatNumber, formatPercent, listWords, lowerStart } from "../../domain/format.ts";
import { standingCautions } from "../cautions.ts";
import { countWord, plural } from "../figures.ts";
import type { Piece, ReworkRow, Section, Words } from "../sheetContent.ts";
import { editionWords, type SheetContext, stated } from "./context.ts";
import { CAVEATS_ON_FIRST_PAGE, caveatRows } from "./firstPage.ts";

/** Characters not drawn that are named one by one. */
const CODES = 24;
export const EVIDENCE_FILE = "lotwright-evidence.json";
export const TABLE_FILE = "evidence.csv";

export function furtherCaveatsSection(context: SheetContext): Section | null {
  const rows = caveatRows(context).slice(CAVEATS_ON_FIRST_PAGE);
  if (rows.length === 0) return null;
  return { heading: "Further caveats", lead: null, parts: [{ kind: "caveats", rows }] };
}

const paragraph = (head: string, text: string): Piece[] => [{ text: `${head} `, bold: true }, { text }];

export function assumptionsSection(context: SheetContext): Section {
  const { sheet, priced, appraisal, itemWord, currencyCode } = context;
  const { engagement, adjustments, overrideReason } = sheet.request;
  const items: Words[] = [];
  if (overrideReason !== null && overrideReason.trim() !== "") {
    const beyond = priced.reach.verdict === "beyond";
    const head = beyond ? "Extraordinary: priced beyond the evidence." : "The valuer on the reach of the evidence:";
    items.push(paragraph(head, beyond ? `The valuer’s reason: ${overrideReason.trim()}` : overrideReason.trim()));
  }
  for (const { label, amount, reason } of adjustments) {
    const sum = formatMoney(Math.abs(amount), currencyCode);
    items.push(
      paragraph(
        `Valuer’s own adjustment: ${lowerStart(label)}.`,
        `${sum} ${amount < 0 ? "less" : "more"}. ${stated(reason)}`,
      ),
    );
  }
  if (priced.notKnown.length > 0) {
    const names = listWords(priced.notKnown.map(({ label }) => lowerStart(label)));
    items.push(
      paragraph(
        "Assumption: what is not known.",
        `For ${names} nothing was assumed; the price is that of not knowing, from sales of every value.`,
      ),
    );
  }
  items.push(
    paragraph(
      "Assumption: the record.",
      `Values of this ${itemWord} and of the sales are as entered; nobody’s entries were tested by the program.`,
    ),
    [{ text: "Relying on these assumptions may have affected the result." }],
    paragraph(
      "Speaks for",
      `this ${itemWord} on the basis, date, market level and terms of page 1, for the client’s use named there. Nobody else should rely on it.`,
    ),
    paragraph("Inspected:", `${stated(engagement.inspected)}. What is not named there was not inspected or tested.`),
    paragraph(
      "Approaches left out:",
      "cost and income; the price comes from comparable sales alone. A reason to use either is for the signing person to state.",
    ),
  );
  const later = appraisal.evidence.out
    .filter(({ reason }) => reason === "after-effective-date")
    .reduce((sum, { saleIds }) => sum + saleIds.length, 0);
  if (later > 0) {
    items.push(
      paragraph(
        "Later sales:",
        `${countWord(later)} ${plural(later, "sale")} after the effective date ${plural(later, "was", "were")} seen and not used.`,
      ),
    );
  }
  return {
    heading: "Assumptions and limiting conditions",
    lead: null,
    parts: [{ kind: "paragraphs", items, size: "usual" }],
  };
}

export function cautionsSection({ itemWord }: SheetContext): Section {
  return {
    heading: "Nine cautions",
    lead: null,
    parts: [{ kind: "numbered", items: standingCautions(itemWord) }],
  };
}

/** Groups of eight, four to a line, so that a person can compare them. */
function fingerprintLines(fingerprint: string): string[] {
  const groups = fingerprint.match(/.{1,8}/g) ?? [];
  const lines: string[] = [];
  for (let k = 0; k < groups.length; k += 4) lines.push(groups.slice(k, k + 4).join(" "));
  return lines;
}

/** The double in full, as every program reads it back. */
function fullFigure(value: number): string {
  return String(value).replace("-", "\u2212");
}

function reworkRows({ sheet, appraisal, priced, currencyCode }: SheetContext): ReworkRow[] {
  const { report } = appraisal;
  const digits = Math.max(0, Math.floor(report.digitsToTrust));
  const row = (label: string, lines: string | string[], note: string | null = null): ReworkRow => ({
    label,
    lines: typeof lines === "string" ? [lines] : lines,
    note,
  });
  const rows = [
    row("Price model, edition", `${sheet.assetClass.name}, ${editionWords(sheet.editionNumber)}`),
    row(
      "Evidence",
      `${formatNumber(report.n)} ${plural(report.n, "sale")}, ${report.p} ${plural(report.p, "coefficient")}, ${formatNumber(report.residualDf)} ${plural(report.residualDf, "degree")} of freedom`,
    ),
    row(
      "Evidence fingerprint",
      fingerprintLines(sheet.evidenceFingerprint),
      `SHA-256 of the sales in ${EVIDENCE_FILE}`,
    ),
    row(
      `${priced.price.centre === "median" ? "Median" : "Mean"}, not rounded`,
      `${fullFigure(priced.price.amount)} ${currencyCode}`,
      `${digits} ${plural(digits, "digit")} can be trusted; kept in full in the first attachment`,
    ),
  ];
  if (report.s !== null) {
    const isLn = report.response === "lnPrice";
    rows.push(
      row(
        "Typical error of one sale",
        isLn
          ? `${formatPercent(report.s, 1)} (s on the ln scale, ${formatNumber(report.s, 4)})`
          : `${formatMoney(report.s, currencyCode)} (s)`,
      ),
    );
  }
  rows.push(
    row("Program", `${sheet.program} ${sheet.programVersion}`),
    row("Attached to this file", `${EVIDENCE_FILE}, ${TABLE_FILE}`),
  );
  return rows;
}

export function reworkSection(context: SheetContext, missing: readonly string[]): Section {
  const { appraisal, priced } = context;
  const rows = reworkRows(context);
  if (missing.length > 0) {
    const codes = missing
      .slice(0, CODES)
      .map((one) => `U+${one.codePointAt(0)!.toString(16).toUpperCase().padStart(4, "0")}`);
    rows.push({
      label: "Characters not drawn",
      lines: [
        `${codes.join(", ")}${missing.length > CODES ? ` and ${formatNumber(missing.length - CODES)} others` : ""}`,
      ],
      note: `The sheet’s fonts lack them; they stand as \ufffd, and in full in the first attachment`,
    });
  }
  const { digitsToTrust } = appraisal.report;
  return {
    heading: "To work this price out again",
    lead: null,
    parts: [
      {
        kind: "rework",
        rows,
        aside: [
          [
            { text: "From the file itself. ", bold: true },
            { text: "Open this PDF under " },
            { text: "Sheets, Verify", italic: true },
            {
              text: `, or type lotwright verify and the file’s name. The program takes the sales out of the PDF, checks their fingerprint, fits the price model again and compares every number, and the stored result to the last digit.`,
            },
          ],
          [
            { text: "Without the program. ", bold: true },
            {
              text: `Take ${TABLE_FILE} and the price model in ${EVIDENCE_FILE}; any sound least-squares routine gives the ${priced.price.centre} above to those ${Math.max(0, Math.floor(digitsToTrust))} digits.`,
            },
          ],
        ],
      },
    ],
  };
}

/** "Issued 14 October 2025" or that it is a draft. */
export function stateLine({ sheet }: SheetContext): string {
  return sheet.sheetNumber === ""
    ? "Draft for signature, not yet issued"
    : `Issued ${formatDay(sheet.issuedOn)}, edition ${sheet.editionNumber}`;
}
