/**
 * What every attribute set says, in words made from the same numbers that the pictures show. Prices are rounded to one
 * step, spans outward.
 */
import type { AttributeSets, CoefficientSpan } from "../domain/attributeSets.ts";
import {
  formatMoney,
  formatNumber,
  formatPercent,
  listWords,
  lowerStart,
  roundOutward,
  roundTo,
} from "../domain/format.ts";

type Found = Omit<AttributeSets, "sentences" | "headline" | "turns" | "doubt">;
type Words = Pick<AttributeSets, "sentences" | "headline" | "turns" | "doubt">;

/** At most so many coefficients are named in a sentence. */
const NAMED = 4;
/** Below this share of the range, doubt about the set is not what makes a price uncertain. */
const LITTLE_DOUBT = 0.1;

/** `offered`: sets that there are; `untested`: those without an error out of sample. */
export function setSentences(found: Found, offered: number, untested: number, currencyCode: string): Words {
  const { alwaysIn, pinned, heldIn = [], price, defensible } = found;
  const counted = countedWords(found, offered);
  const headline = price === null ? counted : headlineOf(found, currencyCode);
  const turns = turnsOf(found, offered);
  const doubt = doubtOf(found);
  const named = new Set([...pinned, ...heldIn].map(({ key }) => key));
  const others = alwaysIn.filter(({ key }) => !named.has(key)).map(({ label }) => label);
  const held = heldWords(found);
  const cannot = `${formatNumber(untested)} of them cannot be tested so: without some sale or tenth a coefficient is not determined.`;
  const sentences = [
    counted,
    ...(untested === 0 ? [] : [cannot]),
    ...(price === null ? [] : [headline]),
    ...(defensible.length > 1 ? [turns] : []),
    ...(doubt === null ? [] : [doubt]),
    ...(held === null ? [] : [held]),
    ...(pinned.length === 0 ? [] : [pinnedWords(found)]),
    ...(others.length === 0 ? [] : [`In every set: ${listWords(others)}.`]),
  ];
  return { headline, turns, doubt, sentences };
}

/** "Held in every set by wish: hours; out of every set: age." */
function heldWords({ heldIn = [], heldOut = [] }: Found): string | null {
  const names = (some: Found["attributes"]): string => listWords(some.map(({ label }) => lowerStart(label)));
  const parts = [
    ...(heldIn.length === 0 ? [] : [`in every set by wish: ${names(heldIn)}`]),
    ...(heldOut.length === 0 ? [] : [`out of every set by wish: ${names(heldOut)}`]),
  ];
  return parts.length === 0 ? null : `Held ${parts.join("; ")}.`;
}

function pinnedWords({ pinned, attributes }: Found): string {
  const count = formatNumber(pinned.length + attributes.length);
  const names = listWords(pinned.map(({ label }) => lowerStart(label)));
  return `Of ${count} attributes ${formatNumber(attributes.length)} can be in or out in every combination; ${names}, which the fit can least do without, ${pinned.length === 1 ? "is" : "are"} in every set.`;
}

function countedWords({ defensible, rule, errorKind }: Found, offered: number): string {
  const which =
    rule.kind === "error"
      ? `error within ${Math.round(rule.share * 100)} % of the best`
      : `AICc within ${rule.distance} of the best`;
  const how =
    errorKind === "leave-one-out" ? "each sale priced without itself" : "each tenth of the sales priced by the rest";
  const verb = defensible.length === 1 ? "is" : "are";
  return `${formatNumber(defensible.length)} of ${formatNumber(offered)} attribute sets ${verb} defensible: ${which}, ${how}.`;
}

function headlineOf({ price, averaged, step, defensible }: Found, currencyCode: string): string {
  const money = (amount: number): string => formatMoney(amount, currencyCode);
  const ends = roundOutward(price!, step);
  const tail = averaged === null ? "" : `; averaged by weight it is ${money(roundTo(averaged.price, step))}`;
  if (defensible.length === 1) {
    const only = money(roundTo(price!.low, step));
    return `One set is defensible by this rule, and it prices the item at ${only}${tail}.`;
  }
  const count = formatNumber(defensible.length);
  return `Whichever of the ${count} defensible sets is used, the price lies between ${money(ends.low)} and ${money(ends.high)}${tail}.`;
}

function turnsOf({ coefficients, defensible }: Found, offered: number): string {
  const anywhere = coefficients.filter(({ signs }) => signs.above > 0 && signs.below > 0);
  const among = coefficients.filter(({ defensibleSigns: { above, below } }) => above > 0 && below > 0);
  const all = `the ${formatNumber(offered)} sets`;
  const some = `the ${formatNumber(defensible.length)} defensible ones`;
  if (anywhere.length === 0) return `No coefficient changes sign anywhere in ${all}.`;
  const first = `${countWords(anywhere.length)} sign somewhere in ${all} (${namesOf(anywhere)})`;
  if (defensible.length < 2) return `${first}.`;
  if (among.length === 0) return `${first}; among ${some} none does.`;
  if (among.length === anywhere.length) return `${first}, and among ${some} too.`;
  return `${first}; among ${some} ${namesOf(among)} ${among.length === 1 ? "does" : "do"}.`;
}

function countWords(count: number): string {
  if (count === 1) return "One coefficient changes";
  const words = ["Two", "Three", "Four", "Five", "Six", "Seven", "Eight", "Nine", "Ten"];
  return `${words[count - 2] ?? formatNumber(count)} coefficients change`;
}

function namesOf(spans: readonly CoefficientSpan[]): string {
  const names = spans.map(({ label, level }) => {
    const name = lowerStart(label);
    return level === null || level === "yes" ? name : `${name} ${level}`;
  });
  if (names.length <= NAMED) return listWords(names);
  return listWords([...names.slice(0, NAMED - 1), `${names.length - NAMED + 1} more`]);
}

function doubtOf({ averaged }: Found): string | null {
  if (averaged === null) return null;
  const share = averaged.addedWidth / (averaged.high - averaged.low);
  if (!(share >= 0)) return null;
  if (share < LITTLE_DOUBT)
    return "The choice of attributes is not what makes this price uncertain; single sales differ far more.";
  return `Of the averaged price's range ${formatPercent(share)} is doubt about which attributes belong in.`;
}
