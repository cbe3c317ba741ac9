/** lot --store S --class C --subjects items.json: several items, each on its own and together. */
import type { RequestInput } from "../../../contract/requests.ts";
import { CHANNEL_KEY } from "../../../domain/attribute.ts";
import { formatMoney, formatNumber, levelWords } from "../../../domain/format.ts";
import type { PricedLot } from "../../../domain/lot.ts";
import { localToday } from "../../openWorkshop.ts";
import { leftOutKeys, plainModel } from "../chosenModel.ts";
import { readJsonObject } from "../files.ts";
import { subjectOf } from "../subjectFile.ts";
import { table } from "../table.ts";
import { levelsOf, listOf, optional, refuse, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

async function run({ given }: VerbInput): Promise<VerbOutput> {
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { assetClass } = await ask("describeClass", { classId });
    const { model } = await ask("currentModel", { classId });
    const named = [...assetClass.attributes, { key: CHANNEL_KEY, label: "Channel", kind: "choice" as const }];
    const path = required(given, "subjects");
    const days = { given: optional(given, "effective-date"), today: localToday() };
    const subjects = itemsIn(readJsonObject(path), path).map((item, at) => {
      const subject = subjectOf(item, path, named, days);
      return "title" in item ? subject : { ...subject, title: `Item ${at + 1}` };
    });
    const names = listOf(given, "leave-out");
    const leftOut = names.length === 0 ? model.leftOut : leftOutKeys(names, model, named);
    const asked = { classId, model: plainModel({ ...model, leftOut }), subjects, levels: levelsOf(given) };
    const found = await ask("priceLot", structuredClone(asked) as RequestInput<"priceLot">);
    return { text: lotText(found), json: { ok: true, ...found } };
  });
}

/** The objects under "items"; refuses a file that has none. */
function itemsIn(file: Record<string, unknown>, path: string): Record<string, unknown>[] {
  const { items } = file;
  const isObject = (one: unknown): boolean => typeof one === "object" && one !== null && !Array.isArray(one);
  if (Array.isArray(items) && items.length > 0 && items.every(isObject)) return items as Record<string, unknown>[];
  throw refuse(
    "bad-subjects",
    "The file has no list of items.",
    path,
    'Write { "items": [ { "attribute": value, … }, … ] }.',
  );
}

function lotText({ items, joint, jointRefused, notKnownSentence, currencyCode }: PricedLot): string {
  const money = (amount: number): string => formatMoney(amount, currencyCode);
  const each = items.map(({ subject, amount, rangeForOneSale }) => [
    subject.title,
    money(amount),
    ...rangeForOneSale.map(({ low, high }) => `${money(low)} to ${money(high)}`),
  ]);
  const levels = items[0]!.rangeForOneSale.map(({ level }) => levelWords(level));
  const parts = [notKnownSentence ?? "", table(["item", "price", ...levels], each)];
  if (joint === null) return [...parts, jointRefused ?? ""].filter((part) => part !== "").join("\n\n");
  const row = (name: string, amount: number, ranges: typeof joint.rangesOfSum): string[] => [
    name,
    money(amount),
    ...ranges.map(({ low, high }) => `${money(low)} to ${money(high)}`),
  ];
  const together = table(
    [`${formatNumber(items.length)} together`, "price", ...levels],
    [row("average", joint.average, joint.rangesOfAverage), row("sum", joint.sum, joint.rangesOfSum)],
  );
  return [...parts, `${joint.sentence}\n${together}`].filter((part) => part !== "").join("\n\n");
}

export const lotVerb: Verb = {
  name: "lot",
  does: "prices several items, each on its own and together, with the errors they share",
  usage: [
    "lot --store S --class C --subjects items.json",
    "    [--effective-date D] [--leave-out a,…] [--levels 50,80,90,95]",
  ],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
    ["--subjects items.json", 'the items: { "items": [ { "attribute": value, … }, … ] }'],
    ["--effective-date D", "the day the prices speak of, YYYY-MM-DD; else the items' own, else today"],
    ["--leave-out a,…", "attributes of the reference set that stay out of the model"],
    ["--levels 50,80,…", "how sure the ranges are to be, in percent"],
  ],
  options: {
    store: { type: "string" },
    class: { type: "string" },
    subjects: { type: "string" },
    "effective-date": { type: "string" },
    "leave-out": { type: "string" },
    levels: { type: "string" },
  },
  places: 0,
  run,
};
