/**
 * Caveats that the program writes from what it found, largest first. `size` is the effect in money times the doubt: what the
 * price could read instead, or the share of half the 90 % range that the finding puts in question. A finding about the model
 * alone has size 0 and comes last. The standing cautions are not caveats: they stand on every sheet (cautions.ts).
 */
import type { Appraisal, Caveat, PricePart } from "../domain/appraisal.ts";
import { CHANNEL_KEY, MARKET_KEY } from "../domain/attribute.ts";
import { DAYS_PER_MONTH, dayNumber } from "../domain/day.ts";
import { formatDay, formatNumber, formatPercent, roundTo } from "../domain/format.ts";
import { ruleRange, stepOf } from "./concludePrice.ts";
import { countWord, figureStep, moneyTo, plural, upperStart } from "./figures.ts";

/** The result object as it stands before its caveats are written. */
export type FoundSoFar = Omit<Appraisal, "caveats">;

/** Fewer sales than this behind each coefficient is few (common practice; no single source). */
const FEW_PER_COEFFICIENT = 10;
/** Fewer equal sales than this behind the price is few. */
const FEW_EFFECTIVE = 8;
/** The newest sale is old when it lies further before the effective date. */
const OLD_MONTHS = 6;
/** A result with fewer stable digits is said to have few. */
const FEW_DIGITS = 6;

interface Case extends FoundSoFar {
  readonly priced: PricePart;
  /** Half the 90 % range for one sale, in money; the whole price where there is none. */
  readonly half: number;
  readonly step: number;
}

/** Without a subject there is no price, and nothing to caution about: an empty list. */
export function writeCaveats(found: FoundSoFar): Caveat[] {
  if (found.priced === null) return [];
  const { rangeForOneSale, amount } = found.priced.price;
  const range = ruleRange(rangeForOneSale);
  const half = range === null ? Math.abs(amount) : (range.high - range.low) / 2;
  const one: Case = { ...found, priced: found.priced, half, step: figureStep(stepOf(rangeForOneSale)) };
  const caveats = RULES.flatMap((rule) => rule(one));
  return caveats
    .map((caveat, index) => ({ caveat, index }))
    .sort((a, b) => b.caveat.size - a.caveat.size || a.index - b.index)
    .map(({ caveat }) => caveat);
}

type Rule = (found: Case) => Caveat[];

const notKnown: Rule = ({ priced, assetClass, step }) =>
  priced.notKnown.map((effect) => {
    const money = (amount: number): string => moneyTo(step, amount, assetClass.currencyCode);
    const sorted = [...effect.wouldRead].sort((a, b) => a.amount - b.amount);
    const ends = sorted.length > 2 ? [sorted[0]!, sorted[sorted.length - 1]!] : sorted;
    const wider = roundTo(effect.widthNow - effect.widthIfKnown, step);
    const range =
      wider > 0
        ? `, and the 90\u00a0% range is ${money(wider)} wider for it`
        : ", and the range is hardly wider for it";
    return {
      code: `not-known:${effect.key}`,
      headline: `${effect.label} is not known.`,
      text: `The price is the price for not knowing it${range}.`,
      wouldRead: ends.map(({ value, amount }) => `${money(amount)} if ${value}`),
      size: Math.max(0, ...effect.wouldRead.map(({ amount }) => Math.abs(amount - priced.price.amount))),
    };
  });

const reach: Rule = ({ priced, half, assetClass }) => {
  const single = priced.reach.attributes
    .filter(({ verdict }) => verdict !== "inside")
    .map((one) => ({
      code: `${one.verdict}:${one.key}`,
      headline:
        one.verdict === "beyond"
          ? `${one.label} lies beyond the evidence.`
          : `${one.label} lies at the edge of the evidence.`,
      text: one.sentence,
      wouldRead: [],
      size: one.verdict === "beyond" ? half : half / 4,
    }));
  const { joint } = priced.reach;
  if (joint.verdict === "inside") return single;
  const where = joint.verdict === "beyond" ? "beyond" : "at the edge of";
  const together: Caveat = {
    code: `${joint.verdict}:together`,
    headline: `Taken together, the values lie ${where} the evidence.`,
    text: joint.sentence === "" ? `Few sales combine values as this ${assetClass.itemWord} does.` : joint.sentence,
    wouldRead: [],
    size: joint.verdict === "beyond" ? half * 0.9 : half / 5,
  };
  return [...single, together];
};

const asking: Rule = ({ evidence, report, half }) => {
  const asked = evidence.channels.find(({ channel }) => channel === "asking")?.count ?? 0;
  if (asked === 0) return [];
  const inModel = report.attributes.includes(CHANNEL_KEY);
  const share = asked / Math.max(1, evidence.used);
  return [
    {
      code: "asking-and-sold",
      headline: `${upperStart(countWord(asked))} of ${countWord(evidence.used)} prices were asked, not paid.`,
      text: inModel
        ? "Channel is in the model, so asking prices are read apart from sold ones; they still help to set every coefficient."
        : "Asking prices usually lie above what is paid, and nothing in the model tells the two apart.",
      wouldRead: [],
      size: half * share * (inModel ? 0.3 : 1),
    },
  ];
};

const unverified: Rule = ({ evidence, half }) => {
  const open = evidence.used - evidence.verifiedCount;
  if (open <= 0) return [];
  const share = open / evidence.used;
  const all = evidence.verifiedCount === 0;
  return [
    {
      code: "not-verified",
      headline: all
        ? `None of the ${countWord(evidence.used)} sales has been verified.`
        : `${upperStart(countWord(open))} of the ${countWord(evidence.used)} sales ${plural(open, "has", "have")} not been verified.`,
      text: `Errors in recorded prices or values would go into the price unseen; ${formatPercent(share)} of the evidence rests on the record alone.`,
      wouldRead: [],
      size: (half * share) / 2,
    },
  ];
};

const fewSales: Rule = ({ report, half }) => {
  const each = report.n / Math.max(1, report.p);
  if (each >= FEW_PER_COEFFICIENT) return [];
  return [
    {
      code: "few-sales",
      headline: `Only ${formatNumber(each, each < 5 ? 1 : 0)} sales stand behind each coefficient.`,
      text: `${report.n} sales carry ${report.p} coefficients; with so few, each coefficient follows single sales closely.`,
      wouldRead: [],
      size: half * Math.min(1, 5 / each),
    },
  ];
};

/** Money that the market moves in `months`, read at the average sale; null without market movement in the model. */
function marketMoney(report: Case["report"], months: number): number | null {
  const row = report.coefficients.find(({ attribute }) => attribute === MARKET_KEY);
  if (row?.moneyPerStep == null) return null;
  return Math.abs(row.moneyPerStep) * (months / 12);
}

const oldEvidence: Rule = ({ evidence, report, priced, half }) => {
  const last = evidence.lastSoldOn === null ? null : dayNumber(evidence.lastSoldOn);
  const effective = dayNumber(priced.subject.effectiveOn);
  if (last === null || effective === null) return [];
  const months = (effective - last) / DAYS_PER_MONTH;
  if (months <= OLD_MONTHS) return [];
  return [
    {
      code: "old-evidence",
      headline: `The newest sale is ${formatNumber(months)} months older than the effective date.`,
      text: `It was sold on ${formatDay(evidence.lastSoldOn!)}; what the market did since then is not seen.`,
      wouldRead: [],
      size: marketMoney(report, months) ?? half * Math.min(1, months / 24),
    },
  ];
};

const fewEffective: Rule = ({ priced, half }) => {
  const { effectiveSales } = priced.price;
  if (!(effectiveSales < FEW_EFFECTIVE)) return [];
  return [
    {
      code: "few-effective-sales",
      headline: `The price rests on the weight of about ${countWord(Math.round(effectiveSales))} like ${plural(Math.round(effectiveSales), "sale")}.`,
      text: "A single sale among them can move it; see the sales that move this price most.",
      wouldRead: [],
      size: half * Math.min(1, 2 / Math.max(1, effectiveSales)),
    },
  ];
};

const dependencies: Rule = ({ report }) =>
  report.dependencies.map((notice) => {
    const out = notice.resolvedBy;
    const by = out?.chosenBy === "program" ? "the program" : "the valuer";
    return {
      code: `exact:${notice.attributes.join("+")}`,
      headline: `An exact dependency: ${notice.equation}.`,
      text:
        out === null
          ? notice.sentence
          : `${out.label} was left out by ${by}: it says nothing that the others do not say, and the price is the same without it.`,
      wouldRead: [],
      size: 0,
    };
  });

/** Held for a few days only, the market moves the price by less than the figures show: the note under the steps says it. */
const marketHeld: Rule = ({ priced, report, assetClass, step }) => {
  const held = priced.price.marketHeldAt;
  if (held === null) return [];
  const days = (dayNumber(priced.subject.effectiveOn) ?? 0) - (dayNumber(held) ?? 0);
  const size = marketMoney(report, days / DAYS_PER_MONTH) ?? 0;
  if (size < step) return [];
  const money = moneyTo(step, size, assetClass.currencyCode);
  return [
    {
      code: "market-held",
      headline: `Market movement is held at ${formatDay(held)}, the last sale.`,
      text: `No sale shows how prices moved from then to the effective date; carried on, it would come to about ${money}.`,
      wouldRead: [],
      size,
    },
  ];
};

const noRange: Rule = ({ priced, report, half }) => {
  if (priced.price.rangeForOneSale.length > 0) return [];
  return [
    {
      code: "no-range",
      headline: "No range can be given.",
      text: `${report.n} sales for ${report.p} coefficients leave nothing over to measure the spread with.`,
      wouldRead: [],
      size: half,
    },
  ];
};

const belowZero: Rule = ({ priced, half }) => {
  const range = ruleRange(priced.price.rangeForOneSale);
  if (range === null || range.low > 0) return [];
  return [
    {
      code: "range-below-zero",
      headline: "The range reaches below zero.",
      text: "No item sells for less than nothing: a model in ln price would fit this evidence better.",
      wouldRead: [],
      size: half,
    },
  ];
};

const fewDigits: Rule = ({ report, priced }) => {
  if (report.digitsToTrust >= FEW_DIGITS) return [];
  return [
    {
      code: "few-digits",
      headline: `Only ${countWord(Math.max(0, Math.floor(report.digitsToTrust)))} digits of the price are stable.`,
      text: "Some attributes nearly say the same, so that the arithmetic loses digits; leave one of them out.",
      wouldRead: [],
      size: Math.abs(priced.price.amount) * 10 ** -Math.max(0, report.digitsToTrust),
    },
  ];
};

const RULES: readonly Rule[] = [
  noRange,
  notKnown,
  reach,
  belowZero,
  fewSales,
  fewEffective,
  oldEvidence,
  asking,
  unverified,
  marketHeld,
  fewDigits,
  dependencies,
];
