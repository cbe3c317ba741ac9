/** The model that a command prices with: that of the class as it is looked at, with the command's own wishes in it. */
import type { RequestInput } from "../../contract/requests.ts";
import { CHANNEL_KEY, keyOf } from "../../domain/attribute.ts";
import type { Edition, PriceModel } from "../../domain/priceModel.ts";
import type { Ask } from "../asking.ts";
import { localToday } from "../openWorkshop.ts";
import { readJsonObject } from "./files.ts";
import { type NamedAttribute, subjectOf } from "./subjectFile.ts";
import { type Given, levelsOf, listOf, optional, refuse, required } from "./verb.ts";

export type AppraiseInput = RequestInput<"appraise">;

/** The contract's input is mutable JSON. */
export function plainModel(model: PriceModel): AppraiseInput["model"] {
  return structuredClone(model) as AppraiseInput["model"];
}

export function leftOutKeys(
  names: readonly string[],
  model: PriceModel,
  attributes: readonly NamedAttribute[],
  option = "--leave-out",
): string[] {
  return names.map((name) => {
    const found = attributes.find(
      ({ key, label }) => key === name || label.toLowerCase() === name.toLowerCase() || key === keyOf(name),
    );
    if (found !== undefined && model.attributes.some(({ key }) => key === found.key)) return found.key;
    const known = model.attributes.map(({ key }) => key).join(", ");
    throw refuse("unknown-attribute", `The model has no attribute "${name}".`, option, `Use some of: ${known}.`);
  });
}

export interface Chosen {
  readonly input: AppraiseInput;
  readonly edition: Edition | null;
  readonly named: readonly NamedAttribute[];
  readonly file: Record<string, unknown>;
}

/** Model, subject and levels of `price` and `sheet`, from their options. */
export async function chosenAppraisal(ask: Ask, classId: number, given: Given): Promise<Chosen> {
  const { assetClass } = await ask("describeClass", { classId });
  const { model, edition } = await ask("currentModel", { classId });
  const named: NamedAttribute[] = [...assetClass.attributes, { key: CHANNEL_KEY, label: "Channel", kind: "choice" }];
  const path = required(given, "subject");
  const file = readJsonObject(path);
  const days = { given: optional(given, "effective-date"), today: localToday() };
  const subject = structuredClone(subjectOf(file, path, named, days)) as NonNullable<AppraiseInput["subject"]>;
  const names = listOf(given, "leave-out");
  const leftOut = names.length === 0 ? model.leftOut : leftOutKeys(names, model, named);
  return {
    input: { classId, model: plainModel({ ...model, leftOut }), subject, levels: levelsOf(given) },
    edition,
    named,
    file,
  };
}
