/** "Had other attributes been in": how far the price depends on which attributes are included. */
import type { SetSummary } from "../../domain/attributeSets.ts";
import { formatMoney, formatPercent, listWords, lowerStart, roundOutward, roundTo } from "../../domain/format.ts";
import type { Part, Section, Words } from "../sheetContent.ts";
import type { SheetContext } from "./context.ts";

/** Attributes whose switching moves the price most; a page has no room for forty. */
const NAMED = 8;

/** Null on a sheet made without it, and where no attribute can be in or out. */
export function setsSection({ priced, currencyCode }: SheetContext): Section | null {
  const { sets } = priced;
  if (sets == null) return null;
  const parts: Part[] = [
    {
      kind: "paragraphs",
      items: [
        ...sets.sentences,
        ...mixtureWords(sets, currencyCode),
        ...switchedWords(sets, priced.price.amount, currencyCode),
      ],
      size: "small",
    },
  ];
  return { heading: "Had other attributes been in", lead: sets.headline, parts };
}

function mixtureWords({ averaged, stacked, step }: SetSummary, currencyCode: string): Words[] {
  const read = ({ price, low, high }: { price: number; low: number; high: number }): string => {
    const range = roundOutward({ low, high }, step);
    const money = (amount: number): string => formatMoney(amount, currencyCode);
    return `${money(roundTo(price, step))}, nine in ten ${money(range.low)} to ${money(range.high)}`;
  };
  const words: Words[] = [];
  if (averaged !== null) {
    words.push([
      { text: "Averaged over all sets. ", bold: true },
      { text: `Weighted by AICc: ${read(averaged)}; the range has the doubt about the set in it.` },
    ]);
  }
  if (stacked !== null && stacked.over > 1) {
    words.push([
      { text: "Mixed to price unseen sales best. ", bold: true },
      {
        text: `${read(stacked)}; typical error ${formatPercent(stacked.error, 1)}, against ${formatPercent(stacked.errorOfBest, 1)} of the best single set.`,
      },
    ]);
  }
  return words;
}

function switchedWords({ switched, step }: SetSummary, amount: number, currencyCode: string): Words[] {
  const found = switched.flatMap(({ price, ...one }) => (price === null ? [] : [{ ...one, price }]));
  if (found.length === 0) return [];
  const named = found
    .map((one, index) => ({ ...one, index, moves: Math.abs(one.price - amount) }))
    .sort((a, b) => b.moves - a.moves || a.index - b.index)
    .slice(0, NAMED);
  const words = named.map(({ label, isIn, price }) => {
    const how = isIn ? "without" : "with";
    return `${formatMoney(roundTo(price, step), currencyCode)} ${how} ${lowerStart(label)}`;
  });
  const most = found.length > NAMED ? ` The other ${found.length - NAMED} move it less.` : "";
  return [
    [
      { text: "One attribute switched, the rest as used. ", bold: true },
      { text: `The price would read ${listWords(words)}.${most}` },
    ],
  ];
}
