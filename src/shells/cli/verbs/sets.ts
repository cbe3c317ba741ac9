/** sets --store S --class C --subject S.json: what every attribute set would price the item at, and how far the choice matters. */
import type { RequestInput } from "../../../contract/requests.ts";
import { type EverySet, setName } from "../../../domain/attributeSets.ts";
import {
  formatMoney,
  formatNumber,
  formatPercent,
  formatSigned,
  roundOutward,
  roundTo,
} from "../../../domain/format.ts";
import type { PriceModel } from "../../../domain/priceModel.ts";
import { chosenAppraisal, leftOutKeys } from "../chosenModel.ts";
import { table } from "../table.ts";
import { type Given, listOf, optional, refuse, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

async function run({ given }: VerbInput): Promise<VerbOutput> {
  const rule = { kind: "error" as const, share: shareOf(given) };
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { input, named } = await chosenAppraisal(ask, classId, given);
    const { model, subject } = input;
    const held = (option: "always-in" | "always-out"): string[] =>
      leftOutKeys(listOf(given, option), input.model as PriceModel, named, `--${option}`);
    const pins = { alwaysIn: held("always-in"), alwaysOut: held("always-out") };
    const found = await ask("everySet", { classId, model, subject, rule, ...pins } as RequestInput<"everySet">);
    return { text: setsText(found), json: { ok: true, ...found } };
  });
}

const USUAL_PERCENT = "10";

/** "--within 10" → 0.1; refuses what is no percentage from 0 to 1000. */
function shareOf(given: Given): number {
  const percent = Number(optional(given, "within") ?? USUAL_PERCENT);
  if (percent >= 0 && percent <= 1000) return percent / 100;
  throw refuse(
    "bad-share",
    "How far the error may lie above the best could not be read.",
    "--within",
    "Give a percentage, such as 10.",
  );
}

function setsText(found: EverySet): string {
  const parts = [
    found.sentences.join(" "),
    found.cautions.join("\n"),
    listedText(found),
    averagesText(found),
    spansText(found),
    switchesText(found),
    sharesText(found),
  ];
  return parts.filter((part) => part !== "").join("\n\n");
}

const SHOWN = 12;

function listedText(found: EverySet): string {
  const { listed, current, currencyCode, averaged } = found;
  const rows = listed
    .filter(({ set }, at) => at < SHOWN || set === current)
    .map((one) => [
      `${setName(found, one.set)}${one.set === current ? ", in use" : ""}`,
      one.price === null ? "not priced" : formatMoney(one.price, currencyCode),
      one.low === null || one.high === null ? "" : `${formatNumber(one.low)} to ${formatNumber(one.high)}`,
      one.error === null ? "" : formatPercent(one.error, 2),
      one.weight === null ? "" : formatNumber(one.weight, 2),
      one.stackingWeight === null ? "" : formatNumber(one.stackingWeight, 2),
    ]);
  const title = averaged === null ? "Sets that err least" : "Sets that weigh most";
  return `${title}\n${table(["set", "price", "nine in ten", "error", "weight", "stacked"], rows)}`;
}

function averagesText({ averaged, stacked, currencyCode, step }: EverySet): string {
  if (averaged === null) return "";
  const row = (name: string, one: typeof averaged): string[] => {
    const { low, high } = roundOutward(one, step);
    return [
      name,
      formatMoney(one.price, currencyCode),
      `${formatNumber(low)} to ${formatNumber(high)}`,
      formatMoney(one.addedWidth, currencyCode),
    ];
  };
  const rows = [row("by AICc", averaged), ...(stacked === null ? [] : [row("stacked", stacked)])];
  return `Price averaged over sets\n${table(["", "price", "nine in ten", "of it doubt about the set"], rows)}`;
}

function spansText({ coefficients, currencyCode }: EverySet): string {
  const money = (amount: number | null | undefined): string =>
    amount === null || amount === undefined ? "" : formatSigned(roundTo(amount, 1));
  const rows = coefficients.map(
    ({ label, level, stepWords, money: { all, defensible, now }, signs, defensibleSigns }) => [
      level === null || level === "yes" ? label : `${label}: ${level}`,
      stepWords ?? "",
      money(all.low),
      money(defensible?.low),
      now === null ? "left out" : money(now),
      money(defensible?.high),
      money(all.high),
      isTurning(defensibleSigns) ? "turns" : isTurning(signs) ? "turns over all" : "",
    ],
  );
  const heading = ["attribute", "step", "lowest of all", "lowest", "now", "highest", "highest of all", "sign"];
  return `Span of each coefficient, ${currencyCode} per step at the average sale; lowest and highest over the defensible sets\n${table(heading, rows, 2)}`;
}

function isTurning({ above, below }: { above: number; below: number }): boolean {
  return above > 0 && below > 0;
}

function switchesText({ switches, currencyCode }: EverySet): string {
  const signed = (amount: number | null): string => (amount === null ? "" : formatSigned(amount));
  const rows = switches.map((one) => [
    one.label,
    signed(one.span?.low ?? null),
    signed(one.mean),
    signed(one.span?.high ?? null),
    one.inDefensible === "sometimes" ? signed(one.meanDefensible) : `${one.inDefensible} in`,
  ]);
  return `What putting it in does to the price, ${currencyCode}\n${table(["", "lowest", "mean", "highest", "among defensible"], rows)}`;
}

function sharesText({ shares, sharesRefused, response, currencyCode }: EverySet): string {
  if (shares === null) return sharesRefused ?? "";
  const of = (part: number): string => formatPercent(part / shares.r2, 1);
  const distance = (part: number | null): string => {
    if (part === null) return "";
    return response === "lnPrice" ? formatSigned(100 * Math.expm1(part), 1) : formatSigned(part);
  };
  const unit = response === "lnPrice" ? "% of price" : currencyCode;
  const rows = shares.shares.map((one) => [
    one.label,
    of(one.r2),
    one.r2Error === null ? "" : `± ${formatNumber((100 * one.r2Error) / shares.r2, 1)}`,
    of(one.r2Alone),
    of(one.r2Last),
    distance(one.distance),
    distance(one.additive),
  ]);
  const heading = ["", "share", "error", "alone", "last in", `this item, averaged, ${unit}`, `plain rule, ${unit}`];
  return `${shares.sentences.join(" ")}\n${table(heading, rows)}`;
}

export const setsVerb: Verb = {
  name: "sets",
  does: "prices one item with every attribute set, and says how far price and coefficients depend on the choice",
  usage: [
    "sets --store S --class C --subject S.json",
    "     [--effective-date D] [--leave-out a,…] [--within 10]",
    "     [--always-in a,…] [--always-out b,…]",
  ],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
    ["--subject S.json", 'the item: { "attribute": value, … }, null or absent where it is not known'],
    ["--effective-date D", "the day the price speaks of, YYYY-MM-DD; else the subject's own, else today"],
    ["--leave-out a,…", "attributes that are not in the set in use; sets with them are looked at too"],
    ["--always-in a,…", "attributes that are held in every set"],
    ["--always-out b,…", "attributes that are held out of every set"],
    ["--within 10", "sets count whose error is within so many percent of the best"],
  ],
  options: {
    store: { type: "string" },
    class: { type: "string" },
    subject: { type: "string" },
    "effective-date": { type: "string" },
    "leave-out": { type: "string" },
    "always-in": { type: "string" },
    "always-out": { type: "string" },
    within: { type: "string" },
  },
  places: 0,
  run,
};
