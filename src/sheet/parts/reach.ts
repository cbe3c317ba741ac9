/** "Reach": whether the item lies inside the evidence, value by value and all together, with a picture of two attributes. */

import type { ReachVerdict } from "../../domain/appraisal.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { CHANNEL_KEY, MARKET_KEY } from "../../domain/attribute.ts";
import { formatNumber } from "../../domain/format.ts";
import { withArticle } from "../figures.ts";
import type { ReachLine, Scatter, Section } from "../sheetContent.ts";
import type { SheetContext } from "./context.ts";
import { decimalsOf, headOf, isNumeric, numericValue, valueOfRow } from "./values.ts";

/** More marks than this are thinned to every k-th, evenly over the evidence. */
const MARKS = 1500;
const VERDICT_WORDS: Readonly<Record<ReachVerdict, string>> = {
  inside: "inside",
  edge: "at the edge",
  beyond: "beyond",
};

/** Leverage to three decimals, or to two significant digits where that would print as nothing. */
function leverageText(leverage: number): string {
  return formatNumber(leverage, leverage > 0 && leverage < 0.01 ? 4 : 3);
}

function lines({ sheet, priced }: SheetContext): ReachLine[] {
  const byKey = new Map(sheet.assetClass.attributes.map((one) => [one.key, one]));
  const single = priced.reach.attributes
    .filter(({ key }) => key !== MARKET_KEY)
    .map((one): ReachLine => {
      const attribute = byKey.get(one.key);
      const decimals = attribute === undefined ? 0 : decimalsOf(attribute);
      const range = one.low === null || one.high === null;
      return {
        label: attribute === undefined ? one.label : headOf(attribute),
        subject:
          one.value === null
            ? "not known"
            : typeof one.value === "number"
              ? formatNumber(one.value, decimals)
              : one.value,
        evidence: range ? "" : `${formatNumber(one.low!, decimals)}–${formatNumber(one.high!, decimals)}`,
        verdict: VERDICT_WORDS[one.verdict],
        beyond: one.verdict === "beyond",
      };
    });
  const { joint } = priced.reach;
  return [
    ...single,
    {
      label: "All together, leverage",
      subject: leverageText(joint.leverage),
      evidence: `largest ${leverageText(joint.highestInEvidence)}`,
      verdict: VERDICT_WORDS[joint.verdict],
      beyond: joint.verdict === "beyond",
    },
  ];
}

/** The two included numbers that move together most, else the first two; null where the subject has not both. */
function pair({ sheet, appraisal, priced }: SheetContext): [Attribute, Attribute] | null {
  const inModel = new Set(appraisal.report.attributes);
  const usable = sheet.assetClass.attributes.filter(
    (one) =>
      isNumeric(one) &&
      inModel.has(one.key) &&
      numericValue(one, priced.subject.values[one.key], priced.subject.effectiveOn) !== null,
  );
  const byKey = new Map(usable.map((one) => [one.key, one]));
  for (const { a, b } of appraisal.report.movingTogether) {
    const [first, second] = [byKey.get(a), byKey.get(b)];
    if (first !== undefined && second !== undefined && a !== b) return [first, second];
  }
  return usable.length >= 2 ? [usable[0]!, usable[1]!] : null;
}

function scatter(context: SheetContext): Scatter | null {
  const chosen = pair(context);
  if (chosen === null) return null;
  const { sheet, priced, itemWord } = context;
  const [x, y] = chosen;
  const of = (attribute: Attribute): number =>
    numericValue(attribute, priced.subject.values[attribute.key], priced.subject.effectiveOn)!;
  const points: [number, number][] = [];
  const every = Math.max(1, Math.ceil(sheet.evidence.rows.length / MARKS));
  for (let k = 0; k < sheet.evidence.rows.length; k += every) {
    const row = sheet.evidence.rows[k]!;
    const values = chosen.map((one) => numericValue(one, valueOfRow(sheet.evidence, row, one.key), row.soldOn));
    if (values[0] != null && values[1] != null) points.push([values[0], values[1]]);
  }
  return {
    xDecimals: decimalsOf(x),
    yDecimals: decimalsOf(y),
    xLabel: headOf(x),
    yLabel: headOf(y),
    points,
    subject: [of(x), of(y)],
    subjectWords: `this ${itemWord}`,
    alt: `${headOf(x)} and ${headOf(y)} of ${points.length} sales, this ${itemWord} marked at ${formatNumber(of(x), decimalsOf(x))} and ${formatNumber(of(y), decimalsOf(y))}.`,
  };
}

export function reachSection(context: SheetContext): Section {
  const { priced, itemWord, sheet } = context;
  const near = [
    `Leverage: how far out ${withArticle(itemWord)} lies, all attributes taken together; the largest of the evidence marks its end.`,
  ];
  const channel = sheet.appraisal.report.attributes.includes(CHANNEL_KEY);
  if (channel) near.push("A channel or a choice is inside when the evidence has sales of it.");
  return {
    heading: `Reach: is this ${itemWord} inside the evidence?`,
    lead: priced.reach.sentence,
    parts: [
      {
        kind: "reach",
        table: {
          subjectHead: `This ${itemWord}`,
          lines: lines(context),
          note: near.join(" "),
          scatter: scatter(context),
        },
      },
    ],
  };
}
