/**
 * "How the price is built": from the average sale to the printed price, one row a step.
 * Steps are differences of rounded running totals, so that the column adds up to the price of page 1 exactly.
 */
import {
  formatDay,
  formatMoney,
  formatNumber,
  formatSigned,
  listWords,
  lowerStart,
  roundTo,
} from "../../domain/format.ts";
import { countWord, moneyTo, plural, upperStart } from "../figures.ts";
import type { Section, StepKind, StepRow } from "../sheetContent.ts";
import { editionWords, type SheetContext } from "./context.ts";

const factorText = (factor: number): string => `×\u00a0${formatNumber(factor, 3)}`;

interface Draft {
  readonly kind: StepKind;
  readonly label: string;
  readonly average: string;
  readonly subject: string;
  readonly factor: number | null;
  /** Unrounded money that the row ends at. */
  readonly standsAt: number;
}

function drafts({ sheet, appraisal, priced, currencyCode, step }: SheetContext): Draft[] {
  const { builtUp, price } = priced;
  const { conclusion, request } = sheet;
  const blank = { average: "", subject: "", factor: null };
  const n = appraisal.report.n;
  const isLn = appraisal.report.response === "lnPrice";
  const rows: Draft[] = [
    {
      ...blank,
      kind: "start",
      label: `Average of the ${formatNumber(n)} ${plural(n, "sale")}`,
      standsAt: builtUp.start,
    },
    ...builtUp.steps.map((one) => ({
      kind: "step" as const,
      label: one.label,
      average: one.averageWords,
      subject: one.subjectWords,
      factor: one.factor,
      standsAt: one.standsAt,
    })),
    {
      ...blank,
      kind: "median",
      label: `${upperStart(price.centre)} from the model`,
      factor: isLn && builtUp.start > 0 ? builtUp.end / builtUp.start : null,
      standsAt: builtUp.end,
    },
  ];
  let standsAt = price.amount;
  for (const one of request.adjustments) {
    standsAt += one.amount;
    rows.push({ ...blank, kind: "adjustment", label: `Valuer’s own: ${one.label}`, average: one.reason, standsAt });
  }
  if (request.adjustments.length === 0) {
    rows.push({ ...blank, kind: "adjustment", label: "Valuer’s own adjustment", average: "none made", standsAt });
  }
  const nearest = `to the nearest ${formatMoney(conclusion.roundingStep, currencyCode)}`;
  rows.push({
    ...blank,
    kind: "rounding",
    label: "Rounding",
    average: nearest,
    standsAt: roundTo(conclusion.amount, step),
  });
  rows.push({ ...blank, kind: "price", label: "Price", standsAt: conclusion.amount });
  return rows;
}

function stepRows(context: SheetContext): StepRow[] {
  const { step } = context;
  let before = 0;
  let start = 0;
  return drafts(context).map((row) => {
    const stands = row.kind === "price" ? row.standsAt : roundTo(row.standsAt, step);
    if (row.kind === "start") start = before = stands;
    const from = row.kind === "median" ? start : before;
    const text = row.kind === "start" || row.kind === "price" ? "" : formatSigned(stands - from);
    const barFrom = before;
    before = stands;
    return {
      kind: row.kind,
      label: row.label,
      average: row.average,
      subject: row.subject,
      factor: row.factor === null ? "" : factorText(row.factor),
      step: text,
      standsAt: formatNumber(stands),
      from: row.kind === "start" ? stands : barFrom,
      to: stands,
    };
  });
}

export function builtUpSection(context: SheetContext): Section {
  const { appraisal, itemWord, sign } = context;
  const rows = stepRows(context);
  const hasFactors = appraisal.report.response === "lnPrice";
  return {
    heading: "How the price is built",
    lead: lead(context),
    freshPage: true,
    parts: [
      {
        kind: "steps",
        table: {
          heads: [
            "Step, in this order",
            "Average sale",
            `This ${itemWord}`,
            "Factor",
            `Step, ${sign}`,
            `Stands at, ${sign}`,
          ],
          rows,
          hasFactors,
          alt: `Steps from the average sale to the price, in ${context.currencyCode}: ${rows
            .map(({ label, step, standsAt }) => `${label}${step === "" ? "" : ` ${step}`}, stands at ${standsAt}`)
            .join("; ")}.`,
        },
      },
      { kind: "note", text: note(context) },
    ],
  };
}

function lead({ sheet, appraisal, priced, currencyCode, step, itemWord }: SheetContext): string {
  const money = (amount: number): string => moneyTo(step, amount, currencyCode);
  const { builtUp } = priced;
  const n = appraisal.report.n;
  const count = builtUp.steps.length;
  const own = sheet.request.adjustments;
  const adjusted =
    own.length === 0
      ? "the valuer adjusted nothing"
      : `the valuer’s own ${plural(own.length, "adjustment")} ${plural(own.length, "makes", "make")} it ${money(sheet.conclusion.adjusted)}`;
  const path =
    count === 0
      ? `No attribute is in the model, so the price stays at ${money(builtUp.end)}`
      : `${upperStart(countWord(count))} ${plural(count, "step leads", "steps lead")} from that average sale to this ${itemWord} and ${plural(count, "takes", "take")} the price to ${money(builtUp.end)}`;
  return `The average of ${formatNumber(n)} ${plural(n, "sale")} stood at ${money(builtUp.start)}. ${path}; ${adjusted}, and rounding gives ${formatMoney(sheet.conclusion.amount, currencyCode)}.`;
}

const FORM_WORDS = {
  line: "as straight lines",
  ln: "as ln",
  spline: "as curves",
  choice: "as choices",
  yesNo: "as yes or no",
} as const;

function formsWords({ appraisal }: SheetContext): string {
  const inModel = new Set(appraisal.report.attributes);
  const names = new Map(appraisal.report.attributeEvidence.map(({ key, label }) => [key, label]));
  const groups = new Map<string, string[]>();
  for (const { key, form } of appraisal.report.model.attributes) {
    if (!inModel.has(key)) continue;
    const words = FORM_WORDS[form];
    groups.set(words, [...(groups.get(words) ?? []), lowerStart(names.get(key) ?? key)]);
  }
  const said = [...groups].map(
    ([words, labels]) =>
      `${listWords(labels)} ${
        labels.length === 1
          ? words
              .replace(/(line|choice|curve)s$/, "$1")
              .replace("as straight", "as a straight")
              .replace("as choice", "as a choice")
              .replace("as curve", "as a curve")
          : words
      }`,
  );
  return said.length === 0 ? "" : ` ${upperStart(said.join(", "))}.`;
}

const MARKET_WORDS = {
  line: "as a straight line in the sale date",
  quarters: "by calendar quarter",
  spline: "as a curve over the sale dates",
} as const;

/** How the fit was come by and what its errors suppose; merged levels, weights and the like. */
function fitWords({ appraisal }: SheetContext): string {
  const { fitted } = appraisal.report;
  if (fitted === undefined) return " Least squares.";
  const { sentence, errorsSentence, errorsCaution, notes } = fitted;
  return [sentence, errorsSentence, errorsCaution ?? "", ...notes]
    .filter((part) => part !== "")
    .map((part) => ` ${part}`)
    .join("");
}

function rangeWords({ priced }: SheetContext): string {
  const { range } = priced.price;
  if (range === undefined) return "";
  return [range.insteadOf, range.sentence, range.guarantee, range.disagreement]
    .filter((part) => part !== null)
    .map((part) => ` ${part}`)
    .join("");
}

function note(context: SheetContext): string {
  const { sheet, appraisal, priced, currencyCode, step } = context;
  const { report } = appraisal;
  const isLn = report.response === "lnPrice";
  const held = priced.price.marketHeldAt;
  const market =
    report.model.market === "none"
      ? " No market movement in the model."
      : held === null
        ? ` Market movement ${MARKET_WORDS[report.model.market]}.`
        : ` Market movement ${MARKET_WORDS[report.model.market]}, held after ${formatDay(held)}, the last sale.`;
  const order = isLn
    ? " In another order the steps would read differently in money; the factors and the end would not."
    : " The steps read the same in any order.";
  const centre = isLn
    ? ` ${moneyTo(step, priced.price.amount, currencyCode)} is the median; the mean is ${moneyTo(step, priced.price.meanAmount, currencyCode)}.`
    : "";
  const rounding = `Figures are rounded to ${formatMoney(step, currencyCode)} so that they add up; ${formatMoney(sheet.conclusion.roundingStep, currencyCode)} is about a tenth of half the 90\u00a0% range.`;
  return `Price model: ${isLn ? "ln price" : "price"}, ${editionWords(sheet.editionNumber)}.${fitWords(context)}${formsWords(context)}${market}${order}${centre}${rangeWords(context)} ${rounding}`;
}
