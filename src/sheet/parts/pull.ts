/** "The sales that move this price most": exact weights, the price without each, and the rest as one row; total 100 %. */
import type { Attribute } from "../../domain/attribute.ts";
import { formatDay, formatNumber, formatSigned, roundTo, roundToAddUp } from "../../domain/format.ts";
import { countWord, plural } from "../figures.ts";
import type { PullLine, Section } from "../sheetContent.ts";
import type { SheetContext } from "./context.ts";
import { headOf, isNumeric, numberText, numericValue, valueOfRow } from "./values.ts";

const SHOWN = 6;
const ATTRIBUTES_SHOWN = 4;
/** Weights are printed in tenths of a percent. */
const TENTH = 0.1;

function attributesShown({ sheet, appraisal }: SheetContext): Attribute[] {
  const inModel = new Set(appraisal.report.attributes);
  return sheet.assetClass.attributes.filter((one) => isNumeric(one) && inModel.has(one.key)).slice(0, ATTRIBUTES_SHOWN);
}

/** The sales that move the price furthest first; a sale without which nothing could be fitted comes before all. */
function shownPulls({ priced }: SheetContext): SheetContext["priced"]["pull"]["top"] {
  const moves = (without: number | null): number =>
    without === null ? Number.POSITIVE_INFINITY : Math.abs(priced.price.amount - without);
  return priced.pull.top
    .map((one, index) => ({ one, index }))
    .sort((a, b) => {
      const [left, right] = [moves(a.one.priceWithout), moves(b.one.priceWithout)];
      return left === right ? a.index - b.index : right - left;
    })
    .slice(0, SHOWN)
    .map(({ one }) => one);
}

export function pullSection(context: SheetContext): Section {
  const { appraisal, priced, sign, sheet, step, itemWord } = context;
  const attributes = attributesShown(context);
  const top = shownPulls(context);
  const rows = new Map(sheet.evidence.rows.map((row) => [row.id, row]));
  const restWeight = 1 - top.reduce((sum, { weight }) => sum + weight, 0);
  const percents = roundToAddUp([...top.map(({ weight }) => weight * 100), restWeight * 100], 100, TENTH);
  const amount = roundTo(priced.price.amount, step);
  const lines = top.map((one, index): PullLine => {
    const row = rows.get(one.sale);
    const without = one.priceWithout === null ? null : roundTo(one.priceWithout, step);
    const moves = without === null ? null : amount - without;
    return {
      sale: one.reference ?? `no. ${one.sale}`,
      soldOn: formatDay(one.soldOn),
      title: one.title,
      values: attributes.map((attribute) =>
        row === undefined
          ? ""
          : numberText(attribute, numericValue(attribute, valueOfRow(sheet.evidence, row, attribute.key), row.soldOn)),
      ),
      channel: one.channel,
      price: formatNumber(one.price),
      pull: formatNumber(percents[index]!, 1),
      priceWithout: without === null ? "no fit" : formatNumber(without),
      moves: moves === null ? "" : formatSigned(moves),
      movesMoney: moves,
      verified: one.verified ? "yes" : "no",
    };
  });
  const n = appraisal.report.n;
  const restCount = n - top.length;
  const centre = priced.price.centre;
  return {
    heading: top.length === 0 ? "The sales behind this price" : heading(top.length),
    lead: priced.pull.sentence,
    parts: [
      {
        kind: "pull",
        table: {
          currencySign: sign,
          attributeHeads: attributes.map(headOf),
          lines,
          rest:
            restCount > 0
              ? {
                  words: `The other ${formatNumber(restCount)} ${plural(restCount, "sale")} together`,
                  pull: formatNumber(percents[percents.length - 1]!, 1),
                }
              : null,
          total: {
            words: `All ${formatNumber(n)} ${plural(n, "sale")}: the ${centre} from the model`,
            pull: formatNumber(100, 1),
            price: formatNumber(amount),
          },
          alt: `How far each sale moves the price, in ${context.currencyCode}: ${lines.map(({ sale, moves }) => `${sale} ${moves}`).join(", ")}.`,
        },
      },
      {
        kind: "note",
        text: `Pull is the exact weight of a sale in the price${appraisal.report.response === "lnPrice" ? ", on the ln scale" : ""}; all pulls add to 100\u00a0%, and one over the sum of their squares is ${formatNumber(priced.price.effectiveSales, priced.price.effectiveSales < 10 ? 1 : 0)}. A negative pull belongs to a sale far from this ${itemWord} that steadies a slope. Solid: draws the price up; hatched: down.`,
      },
    ],
  };
}

function heading(count: number): string {
  return count === 1 ? "The sale behind this price" : `The ${countWord(count)} sales that move this price most`;
}
