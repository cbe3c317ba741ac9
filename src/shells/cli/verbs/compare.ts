/** compare --store S --class C --first X --second Y: two attribute sets or two editions side by side, and what made the difference. */
import type { RequestInput } from "../../../contract/requests.ts";
import { CHANNEL_KEY } from "../../../domain/attribute.ts";
import type { Comparison } from "../../../domain/comparison.ts";
import { formatDay, formatMoney, formatNumber, formatPercent, formatSigned } from "../../../domain/format.ts";
import type { Ask } from "../../asking.ts";
import { localToday } from "../../openWorkshop.ts";
import { leftOutKeys, plainModel } from "../chosenModel.ts";
import { readJsonObject } from "../files.ts";
import { type NamedAttribute, subjectOf } from "../subjectFile.ts";
import { table } from "../table.ts";
import { type Given, listOf, optional, refuse, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

type Side = RequestInput<"compare">["first"];

async function run({ given }: VerbInput): Promise<VerbOutput> {
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { assetClass } = await ask("describeClass", { classId });
    const named: NamedAttribute[] = [...assetClass.attributes, { key: CHANNEL_KEY, label: "Channel", kind: "choice" }];
    const path = optional(given, "subject");
    const days = { given: optional(given, "effective-date"), today: localToday() };
    const subject = path === null ? null : structuredClone(subjectOf(readJsonObject(path), path, named, days));
    const [first, second] = [
      await sideOf(ask, classId, given, "first", named),
      await sideOf(ask, classId, given, "second", named),
    ];
    const input = { classId, first, second, subject, level: 0.9 } as RequestInput<"compare">;
    const comparison = await ask("compare", input);
    return { text: comparisonText(comparison), json: { ok: true, ...comparison } };
  });
}

/** "now", or the number of an edition; with --first-without, its model as it is with these attributes left out. */
async function sideOf(
  ask: Ask,
  classId: number,
  given: Given,
  which: "first" | "second",
  named: readonly NamedAttribute[],
): Promise<Side> {
  const asked = required(given, which);
  const without = listOf(given, `${which}-without`);
  const { model: now } = await ask("currentModel", { classId });
  const editions = await ask("listEditions", { classId });
  const edition = editions.find(({ number }) => String(number) === asked) ?? null;
  if (edition === null && asked !== "now") {
    const known = editions.map(({ number }) => number).join(", ");
    const hint = known === "" ? "No edition is saved yet; use now." : `Use now, or one of: ${known}.`;
    throw refuse("no-such-edition", `There is no edition "${asked}".`, `--${which}`, hint);
  }
  if (without.length === 0 && edition !== null) return { editionId: edition.id };
  const model = edition?.model ?? now;
  const leftOut = without.length === 0 ? model.leftOut : leftOutKeys(without, model, named);
  return { model: plainModel({ ...model, leftOut }) };
}

export function comparisonText(comparison: Comparison): string {
  const { sides, cautions, headline } = comparison;
  const parts = [
    headline,
    sidesText(comparison),
    coefficientsText(comparison),
    causesText(comparison),
    salesText(comparison),
    cautions.join("\n"),
  ];
  const names = `First: ${sides[0].name}. Second: ${sides[1].name}.`;
  return [names, ...parts.filter((part) => part !== "")].join("\n\n");
}

function sidesText({ sides, currencyCode }: Comparison): string {
  const money = (amount: number): string => formatMoney(amount, currencyCode);
  const rows = [
    ["sales", ...sides.map(({ saleCount }) => formatNumber(saleCount))],
    ["coefficients", ...sides.map(({ p }) => formatNumber(p))],
    ["left out", ...sides.map(({ leftOut }) => leftOut.map(({ label }) => label).join(", ") || "none")],
    [
      "typical error",
      ...sides.map((one) => (one.looTypicalError === null ? "" : formatPercent(one.looTypicalError, 1))),
    ],
    ["price", ...sides.map(({ price }) => (price === null ? "" : money(price.amount)))],
    ["nine in ten", ...sides.map(({ price }) => (price === null ? "" : `${money(price.low)} to ${money(price.high)}`))],
  ];
  return table(["", "first", "second"], rows);
}

function coefficientsText({ coefficients, currencyCode }: Comparison): string {
  const money = (amount: number | null): string => (amount === null ? "not in" : formatMoney(amount, currencyCode));
  const rows = coefficients.map((one) => [
    one.level === null ? one.label : `${one.label}: ${one.level}`,
    one.stepWords,
    money(one.first),
    money(one.second),
    one.difference === null ? "" : formatSigned(one.difference),
    one.parts.map((part) => `${formatSigned(part.amount)} for ${part.label}`).join(", "),
  ]);
  return `What goes with one step of each\n${table(["attribute", "step", "first", "second", "differs by", "carried"], rows, 2)}`;
}

function causesText({ causes }: Comparison): string {
  if (causes.length === 0) return "";
  return `What made the price differ, averaged over the order of the changes\n${table(
    ["", "moves it by"],
    causes.map(({ label, amount }) => [label, formatSigned(amount)]),
  )}`;
}

function salesText({ sales, currencyCode }: Comparison): string {
  if (sales.onlyFirst + sales.onlySecond === 0) return "";
  const rows = sales.listed.map((one) => [
    one.side === 1 ? "first" : "second",
    one.reference ?? one.title,
    one.soldOn === "" ? "" : formatDay(one.soldOn),
    formatMoney(one.price, currencyCode),
    one.moves === null ? "" : formatSigned(one.moves),
  ]);
  const counts = `${formatNumber(sales.both)} sales in both, ${formatNumber(sales.onlyFirst)} only in the first, ${formatNumber(sales.onlySecond)} only in the second.`;
  return `${counts}\n${table(["only in", "sale", "sold on", "price", "moves the price by"], rows, 3)}`;
}

export const compareVerb: Verb = {
  name: "compare",
  does: "puts two attribute sets or two editions side by side, with what made price and coefficients differ",
  usage: [
    "compare --store S --class C --first X --second Y [--subject S.json]",
    "        [--first-without a,…] [--second-without b,…] [--effective-date D]",
  ],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
    ["--first X", "now, or the number of an edition"],
    ["--second Y", "the same for the other side"],
    ["--first-without a,…", "attributes that stay out of the first side's model"],
    ["--second-without b,…", "attributes that stay out of the second side's model"],
    ["--subject S.json", "the item that both price; without it only the models are compared"],
    ["--effective-date D", "the day the price speaks of, YYYY-MM-DD"],
  ],
  options: {
    store: { type: "string" },
    class: { type: "string" },
    first: { type: "string" },
    second: { type: "string" },
    "first-without": { type: "string" },
    "second-without": { type: "string" },
    subject: { type: "string" },
    "effective-date": { type: "string" },
  },
  places: 0,
  run,
};
