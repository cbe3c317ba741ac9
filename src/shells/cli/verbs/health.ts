/** health --store S --class C: the checks of a class's price model, the power its prices speak for, and the market's path. */

import { CHANNEL_KEY } from "../../../domain/attribute.ts";
import { formatMoney, formatNumber, formatPercent } from "../../../domain/format.ts";
import type { ErrorsInMoney, ModelHealth } from "../../../domain/modelHealth.ts";
import { leftOutKeys, plainModel } from "../chosenModel.ts";
import type { NamedAttribute } from "../subjectFile.ts";
import { table } from "../table.ts";
import { listOf, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

async function run({ given }: VerbInput): Promise<VerbOutput> {
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { model } = await ask("currentModel", { classId });
    const { assetClass } = await ask("describeClass", { classId });
    const named: NamedAttribute[] = [...assetClass.attributes, { key: CHANNEL_KEY, label: "Channel", kind: "choice" }];
    const without = listOf(given, "leave-out");
    const leftOut = without.length === 0 ? model.leftOut : leftOutKeys(without, model, named);
    const health = await ask("health", { classId, model: plainModel({ ...model, leftOut }), subject: null });
    return { text: healthText(health), json: { ok: true, ...health } };
  });
}

const VERDICTS = { fine: "fine", look: "look", trouble: "trouble" } as const;

export function healthText(health: ModelHealth): string {
  const parts = [health.headline, checksText(health), responsesText(health), indexText(health)];
  return parts.filter((part) => part !== "").join("\n\n");
}

function checksText({ checks, leftOut }: ModelHealth): string {
  const lines = checks.map(({ label, verdict, sentence, whatToDo, p }) => {
    const chance = p === null ? "" : ` (p ${p < 0.0001 ? "below 0.0001" : formatNumber(p, 4)})`;
    const advice = verdict === "fine" ? "" : ` ${whatToDo}`;
    return `  ${VERDICTS[verdict].padEnd(8)}${label}${chance}: ${sentence}${advice}`;
  });
  const missing = leftOut.map(({ label, reason }) => `  ${"not run".padEnd(8)}${label}: ${reason}`);
  return ["Checks", ...lines, ...missing].join("\n");
}

function responsesText({ power, responses, currencyCode }: ModelHealth): string {
  if (power === null || responses === null) return "";
  const row = (name: string, one: ErrorsInMoney): string[] => [
    name,
    formatMoney(one.rootMeanSquare, currencyCode),
    formatPercent(one.rootMeanSquareFraction, 1),
    formatMoney(one.medianAbsolute, currencyCode),
    formatPercent(one.medianAbsoluteFraction, 1),
  ];
  const rows = [row("plain price", responses.price), row("ln price", responses.lnPrice)];
  const heading = ["response", "root mean square", "", "median", ""];
  return `${power.sentence}\n${responses.sentence}\n${table(heading, rows)}`;
}

function indexText({ index }: ModelHealth): string {
  if (index.length === 0) return "";
  const rows = index.map(({ period, sales, level, low95, high95 }) => [
    period,
    formatNumber(sales),
    formatNumber(level, 1),
    formatNumber(low95, 1),
    formatNumber(high95, 1),
  ]);
  return `Price level, items alike, first quarter = 100 (19 in 20)\n${table(["quarter", "sales", "level", "from", "to"], rows)}`;
}

export const healthVerb: Verb = {
  name: "health",
  does: "checks a class's price model: spread, shape, curvature, influence, the power of the price, the market's path",
  usage: ["health --store S --class C [--leave-out a,…]"],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
    ["--leave-out a,…", "attributes of the reference set that stay out of the model"],
  ],
  options: { store: { type: "string" }, class: { type: "string" }, "leave-out": { type: "string" } },
  places: 0,
  run,
};
