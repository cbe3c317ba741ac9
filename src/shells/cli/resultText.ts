/** The result for people: sentences first, then a few plain tables. Digits are dropped by domain/format.ts only. */
import type { Appraisal, Coefficient, ModelReport, PricePart } from "../../domain/appraisal.ts";
import { formatDay, formatMoney, formatNumber, formatPercent, formatSigned, levelWords } from "../../domain/format.ts";
import { amountWords, partRanges } from "../../domain/ledgerRanges.ts";
import { priceSentence } from "../priceSentence.ts";
import type { FileAccount } from "./resultJson.ts";
import { table } from "./table.ts";

const plural = (count: number, one: string, many = `${one}s`): string =>
  `${formatNumber(count)} ${count === 1 ? one : many}`;

function moneyWriter(appraisal: Appraisal): (value: number) => string {
  return (value) => formatMoney(value, appraisal.assetClass.currencyCode);
}

export function fileSentence(file: FileAccount): string {
  const accepted = file.read - file.heldBack.length - file.duplicates.length;
  return `${plural(file.read, "row")} read: ${formatNumber(accepted)} accepted, ${formatNumber(file.heldBack.length)} held back, ${plural(file.duplicates.length, "duplicate")}.`;
}

/** At most this many held-back rows are printed; the rest are counted, and --json has them all. */
const SHOWN_ROWS = 20;

export function heldBackText(heldBack: FileAccount["heldBack"]): string {
  if (heldBack.length === 0) return "";
  const rows = heldBack.slice(0, SHOWN_ROWS).map((row) => {
    const first = row.reasons[0];
    return [
      String(row.row),
      first?.column ?? "",
      first?.value ?? "",
      row.reasons.map(({ reason }) => reason).join(" "),
    ];
  });
  const more =
    heldBack.length > SHOWN_ROWS ? `\n  and ${formatNumber(heldBack.length - SHOWN_ROWS)} more (--json lists all)` : "";
  return `Held back\n${table(["row", "column", "value", "why"], rows, 4)}${more}`;
}

function evidenceSentences({ evidence }: Appraisal): string {
  const span =
    evidence.firstSoldOn === null || evidence.firstSoldOn === evidence.lastSoldOn
      ? ""
      : `, sold from ${formatDay(evidence.firstSoldOn)} to ${formatDay(evidence.lastSoldOn!)}`;
  const used = `The evidence is ${plural(evidence.used, "sale")}${span}.`;
  return [used, ...evidence.out.map(({ sentence }) => sentence)].join(" ");
}

function modelSentences(report: ModelReport): string {
  const response = report.response === "lnPrice" ? "ln price" : "price";
  const explained =
    report.r2 === null ? "" : ` It explains ${formatPercent(report.r2, 1)} of how the ${response} varies.`;
  const unseen =
    report.looTypicalError === null
      ? ""
      : ` On a sale it has not seen it is typically ${formatPercent(report.looTypicalError, 1)} off.`;
  const first = `The model puts ${response} on ${plural(report.attributes.length, "attribute")}.${explained}${unseen}`;
  const dependencies = report.dependencies.map(({ equation, sentence }) => `${equation}. ${sentence}`);
  return [
    first,
    ...report.leftOut.filter(({ why }) => why !== "exact").map(({ sentence }) => sentence),
    ...dependencies,
  ].join("\n");
}

function coefficientRow(one: Coefficient, money: (value: number) => string): string[] {
  const what = one.level === null ? one.label : `${one.label}: ${one.level}`;
  if (one.moneyPerStep === null) return [what, one.stepWords, "", "", ""];
  const ends =
    one.moneyLow95 === null || one.moneyHigh95 === null ? ["", ""] : [money(one.moneyLow95), money(one.moneyHigh95)];
  return [what, one.stepWords, money(one.moneyPerStep), ...ends];
}

function coefficientsText(appraisal: Appraisal): string {
  const money = moneyWriter(appraisal);
  const rows = appraisal.report.coefficients
    .filter(({ moneyPerStep }) => moneyPerStep !== null)
    .map((one) => coefficientRow(one, money));
  if (rows.length === 0) return "";
  return `What goes with one step of each, the others in the set alike (19 in 20)\n${table(["attribute", "step", "price", "from", "to"], rows, 2)}`;
}

function ledgerText(appraisal: Appraisal): string {
  const { ledger } = appraisal;
  if (ledger.leftOut.length === 0) return "";
  const currency = appraisal.assetClass.currencyCode;
  const rows = ledger.rows.map((row) => {
    const parts = partRanges(row);
    const part = (key: string | null): string => {
      const one = parts.find(({ from }) => from === key);
      return one === undefined ? "" : amountWords(one.amount, one.halfRange);
    };
    const name = row.level === null ? row.label : `${row.label}: ${row.level}`;
    const keys = [null, ...ledger.leftOut.map(({ key }) => key)];
    return [name, row.stepWords, formatMoney(row.money.coefficient, currency), ...keys.map(part)];
  });
  const heading = [
    "attribute",
    "step",
    "reads",
    "own part",
    ...ledger.leftOut.map(({ label }) => `carried for ${label}`),
  ];
  return `Carry-over, parts in ${currency} with their ranges (19 in 20)\n${ledger.headline}\n${table(heading, rows, 2)}`;
}

function rangesText(priced: PricePart, currencyCode: string): string {
  const money = (value: number): string => formatMoney(value, currencyCode);
  const rows = priced.price.rangeForOneSale.map((range, index) => {
    const average = priced.price.rangeForAverage[index];
    const ends = average === undefined ? ["", ""] : [money(average.low), money(average.high)];
    return [levelWords(range.level), money(range.low), money(range.high), ...ends];
  });
  return rows.length === 0 ? "" : `Ranges\n${table(["how sure", "one sale from", "to", "average from", "to"], rows)}`;
}

function builtUpText(priced: PricePart, currencyCode: string): string {
  const money = (value: number): string => formatMoney(value, currencyCode);
  const rows = priced.builtUp.steps.map((step) => [
    step.label,
    step.averageWords,
    step.subjectWords,
    formatSigned(step.step),
    money(step.standsAt),
  ]);
  const all = [["average sale", "", "", "", money(priced.builtUp.start)], ...rows];
  return `Built up from the average sale\n${table(["", "average", "subject", "adds", "stands at"], all, 3)}`;
}

function pullText(priced: PricePart, currencyCode: string): string {
  const { pull } = priced;
  const rows = pull.top
    .slice(0, 8)
    .map((one) => [
      one.reference ?? `no. ${one.sale}`,
      one.title,
      formatMoney(one.price, currencyCode),
      formatPercent(one.weight, 2),
      one.priceWithout === null ? "" : formatMoney(one.priceWithout, currencyCode),
    ]);
  const listed = `Pull\n${pull.sentence}\n${table(["sale", "item", "sold at", "weight", "price without it"], rows, 2)}`;
  const { bySource = [] } = pull;
  if (bySource.length === 0) return listed;
  const sources = bySource.map(({ source, count, weight, priceWithout }) => [
    source,
    formatNumber(count),
    formatPercent(weight, 1),
    priceWithout == null ? (priceWithout === null ? "no fit" : "") : formatMoney(priceWithout, currencyCode),
  ]);
  return `${listed}\n\nPull of each source\n${table(["source", "sales", "weight", "price without it"], sources)}`;
}

function pricedParts(priced: PricePart, currencyCode: string): string[] {
  const notKnown = priced.notKnown.map(({ sentence }) => sentence).join("\n");
  return [
    rangesText(priced, currencyCode),
    `${priced.reach.sentence}${notKnown === "" ? "" : `\n${notKnown}`}`,
    builtUpText(priced, currencyCode),
    pullText(priced, currencyCode),
  ];
}

export function resultText(appraisal: Appraisal, file: FileAccount | null = null): string {
  const { priced, assetClass } = appraisal;
  const opening = [
    ...(assetClass.invented ? ["Everything in this class is invented."] : []),
    ...(priced === null ? [] : [priceSentence(priced, assetClass.currencyCode)]),
    ...(file === null ? [] : [fileSentence(file)]),
    evidenceSentences(appraisal),
    modelSentences(appraisal.report),
  ].join("\n");
  const parts = [
    opening,
    coefficientsText(appraisal),
    ...(priced === null ? [] : pricedParts(priced, assetClass.currencyCode)),
    ledgerText(appraisal),
    file === null ? "" : heldBackText(file.heldBack),
    appraisal.caveats.map(({ headline, text }) => `${headline} ${text}`).join("\n"),
  ];
  return parts.filter((part) => part !== "").join("\n\n");
}
