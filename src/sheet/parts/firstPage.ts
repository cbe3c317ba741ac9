/** Page 1 in words: item, price, what it rests on, facts, three caveats, signature. It stands alone when copied alone. */
import type { Range } from "../../domain/appraisal.ts";
import { type Attribute, CHANNEL_KEY, MARKET_KEY } from "../../domain/attribute.ts";
import { formatDay, formatMoney, formatNumber, formatPercent, levelWords, lowerStart } from "../../domain/format.ts";
import { amountInWords } from "../amountInWords.ts";
import { ruleRange } from "../concludePrice.ts";
import { plural, upperStart, withArticle } from "../figures.ts";
import type { CaveatRow, Fact, FirstPage, Gauge, GaugeRange } from "../sheetContent.ts";
import { editionWords, type SheetContext, stated } from "./context.ts";

const NBSP = "\u00a0";
/** Letters of a phrase in the opening sentence. */
const PHRASE = 80;
export const CAVEATS_ON_FIRST_PAGE = 3;
/** Levels above this are in the result, not in the gauge. */
const GAUGE_TOP_LEVEL = 0.9;

export function firstPage(context: SheetContext): FirstPage {
  const { sheet, priced, currencyCode } = context;
  const { conclusion, request } = sheet;
  const { engagement } = request;
  return {
    title: stated(priced.subject.title),
    identification: identification(context),
    basisLine: [
      upperStart(
        [engagement.basisOfValue, lowerStart(engagement.premise)].filter((text) => text.trim() !== "").join(", "),
      ),
      `on ${formatDay(priced.subject.effectiveOn)}`,
    ]
      .filter((text) => text !== "")
      .join(" · "),
    price: formatMoney(conclusion.amount, currencyCode),
    priceInWords: amountInWords(conclusion.amount, currencyCode),
    terms: terms(context),
    restsOn: restsOn(context),
    gauge: gauge(context),
    facts: facts(context),
    caveatHeading: caveatHeading(sheet.appraisal.caveats.length),
    caveats: caveatRows(context).slice(0, CAVEATS_ON_FIRST_PAGE),
    signatureLines: ["Signature of the valuer", "Name, qualification, registration number", "Place and date"],
    certificationNote: "Certification topics, for the signing person to answer. The program fills in nothing here.",
    certificationTopics: [
      "Facts stated are true",
      "Fee not tied to the result",
      "Analyses own, impartial",
      "Standard followed",
      "Interest in the item",
      "Item inspected in person",
      "Services on it, last 3 years",
      "Help by others",
      "Bias for or against a party",
      "Remarks",
    ],
  };
}

function caveatHeading(count: number): string {
  if (count === 0) return "Caveats";
  if (count === 1) return "The caveat that matters";
  return count === 2 ? "Two caveats that matter" : "Three caveats that matter most";
}

/** The program's caveats, then the valuer's own, numbered through. */
export function caveatRows({ sheet }: SheetContext): CaveatRow[] {
  const found = sheet.appraisal.caveats.map(({ headline, text, wouldRead }) => ({ headline, text, wouldRead }));
  const own = sheet.request.engagement.ownCaveats
    .filter((text) => text.trim() !== "")
    .map((text) => ({ headline: "The valuer’s own:", text: text.trim(), wouldRead: [] }));
  return [...found, ...own].map((row, index) => ({ number: index + 1, ...row }));
}

function valueWords(attribute: Attribute, value: number | string | boolean): string {
  if (typeof value === "number") {
    const unit =
      attribute.unit === null || attribute.label.includes(`(${attribute.unit})`) ? "" : `${NBSP}${attribute.unit}`;
    return `${formatNumber(value, attribute.decimals)}${unit}`;
  }
  return String(value);
}

/** "Built 12 Mar 2018, hours 4,200 h, lift height 7.0 m, serial TSY740-18-03341" */
function identification({ sheet, priced }: SheetContext): string {
  const parts: string[] = [];
  for (const attribute of sheet.assetClass.attributes) {
    const value = priced.subject.values[attribute.key];
    if (value == null || parts.length >= 3) continue;
    if (attribute.kind === "built") parts.unshift(`built ${formatDay(String(value))}`);
    else if (attribute.kind === "number") parts.push(`${lowerStart(attribute.label)} ${valueWords(attribute, value)}`);
  }
  if (priced.subject.serial !== null && priced.subject.serial.trim() !== "")
    parts.push(`serial ${priced.subject.serial}`);
  return upperStart(parts.join(", "));
}

const IN_WORDS: Readonly<Record<string, string>> = {
  "9 in 10": "Nine in ten",
  "8 in 10": "Eight in ten",
  "1 in 2": "One in two",
  "95 in 100": "Ninety-five in a hundred",
};

/** The opening sentence must keep its range: a long phrase is cut here, and stands whole among the facts. */
function shortened(text: string): string {
  if (text.length <= PHRASE) return text;
  return `${text.slice(0, PHRASE).replace(/\s+\S*$/, "")} …`;
}

function terms({ sheet, priced, itemWord, currencyCode }: SheetContext): string {
  const { engagement, adjustments } = sheet.request;
  const phrases = [engagement.marketLevel, engagement.priceBasisWords]
    .filter((text) => text.trim() !== "")
    .map((text) => shortened(lowerStart(text.trim())));
  const adjusted = adjustments.length > 0 ? ", after the valuer’s own adjustments" : "";
  const first = `The ${priced.price.centre} of what such ${withArticle(itemWord)} would be sold for${phrases.map((text) => `, ${text}`).join("")}${adjusted}.`;
  const range = ruleRange(sheet.conclusion.rangeForOneSale);
  if (range === null) return `${first} No range could be worked out: see the caveats.`;
  const words = levelWords(range.level);
  const [low, high] = [range.low, range.high].map((end) => formatMoney(end, currencyCode));
  return `${first} ${IN_WORDS[words] ?? words} such sales would fall between ${low} and ${high}.`;
}

function restsOn({ sheet, appraisal, priced }: SheetContext): Fact[] {
  const { evidence, report } = appraisal;
  const rows: [string, string][] = [["Evidence", `${formatNumber(evidence.used)} ${plural(evidence.used, "sale")}`]];
  if (evidence.firstSoldOn !== null && evidence.lastSoldOn !== null) {
    rows.push(["Sold", `${formatDay(evidence.firstSoldOn)} to ${formatDay(evidence.lastSoldOn)}`]);
  }
  const out = report.leftOut.length;
  // As the price strip counts: market movement and channel are of the sale, not of the item.
  const own = report.attributes.filter((key) => key !== MARKET_KEY && key !== CHANNEL_KEY).length;
  rows.push(["Attributes", `${own} in, ${out === 0 ? "none" : out} left out`]);
  const where = { inside: "inside the evidence", edge: "at the edge of the evidence", beyond: "beyond the evidence" };
  rows.push(["Reach", where[priced.reach.verdict]]);
  if (report.looTypicalError !== null) {
    rows.push(["Typical error", `${formatPercent(report.looTypicalError, 1)} on sales not seen`]);
  }
  rows.push([
    "Price model",
    `${report.response === "lnPrice" ? "ln price" : "price"}, ${editionWords(sheet.editionNumber)}`,
  ]);
  return rows.map(([label, words]) => ({ label, words, short: words }));
}

/** Levels up to 90 % (all, where there are none such), widest first. */
export function gaugeLevels<Row extends Range>(ranges: readonly Row[]): Row[] {
  const some = ranges.filter(({ level }) => level <= GAUGE_TOP_LEVEL + 1e-9);
  return [...(some.length > 0 ? some : ranges)].sort((a, b) => b.level - a.level).slice(0, 4);
}

function gaugeRange({ level, low, high }: Range): GaugeRange {
  return {
    label: formatPercent(level, Number.isInteger(Math.round(level * 1000) / 10) ? 0 : 1),
    words: `${levelWords(level)} such sales`,
    low,
    high,
    lowText: formatNumber(low),
    highText: formatNumber(high),
  };
}

function gauge({ sheet, currencyCode }: SheetContext): Gauge {
  const { conclusion } = sheet;
  const oneSale = gaugeLevels(conclusion.rangeForOneSale).map(gaugeRange);
  const average = gaugeLevels(conclusion.rangeForAverage).map(gaugeRange).reverse();
  const say = (rows: readonly GaugeRange[]): string =>
    rows.map(({ label, lowText, highText }) => `${label} ${lowText} to ${highText}`).join(", ");
  const price = formatNumber(conclusion.amount);
  return {
    currencyCode,
    price: conclusion.amount,
    priceText: price,
    oneSale,
    average,
    oneSaleHeading: "Range for one sale",
    averageHeading: "Range for the average",
    averageWords: "where the middle of such sales lies",
    alt: `Range gauge in ${currencyCode}. Price ${price}. Range for one sale: ${say(oneSale)}. Range for the average: ${say(average)}.`,
  };
}

function fact(label: string, words: string | null, short: string | null = null): Fact {
  const said = (text: string | null): string =>
    stated(text) === "not stated" ? "not stated" : upperStart(stated(text));
  return { label, words: said(words), short: said(short ?? words) };
}

function facts({ sheet, priced, itemWord }: SheetContext): Fact[][] {
  const { engagement } = sheet.request;
  const client = [engagement.client, engagement.intendedUsers].filter((text) => text.trim() !== "").join("; ");
  const definition = engagement.basisDefinition.trim();
  const basis = stated(engagement.basisOfValue);
  return [
    [
      fact("Client and intended users", client),
      fact("Intended use", engagement.intendedUse),
      fact("Interest valued", engagement.interest),
      fact("Identified by", priced.subject.identifiedBy),
    ],
    [
      fact("Basis of value", definition === "" ? basis : `${basis}: ${definition}`, basis),
      fact("Premise of value", engagement.premise),
      fact("Market level", engagement.marketLevel),
      fact("Price basis", engagement.priceBasisWords),
    ],
    [
      fact("Effective date", formatDay(priced.subject.effectiveOn)),
      fact("Inspected", engagement.inspected),
      fact("Report date", formatDay(engagement.reportOn)),
      fact("Exposure time", engagement.exposureTime),
      fact(`Earlier sales of this ${itemWord}`, engagement.earlierSales),
      fact("Equipment", engagement.equipment),
    ],
  ];
}
