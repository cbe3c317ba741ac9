/** refit --store S --class C: fits the class's price model on its sales as they stand and saves it as a new edition. */
import { formatNumber } from "../../../domain/format.ts";
import { plainModel } from "../chosenModel.ts";
import { resultJson } from "../resultJson.ts";
import { resultText } from "../resultText.ts";
import { required, USUAL_LEVELS, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

async function run({ given }: VerbInput): Promise<VerbOutput> {
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const model = plainModel((await ask("currentModel", { classId })).model);
    const edition = await ask("saveEdition", { classId, model });
    const { appraisal } = await ask("appraise", { classId, model, subject: null, levels: [...USUAL_LEVELS] });
    const first = `Edition ${edition.number} was saved: ${formatNumber(edition.saleCount)} sales.`;
    return { text: `${first}\n${resultText(appraisal)}`, json: { ...resultJson(appraisal), edition } };
  });
}

export const refitVerb: Verb = {
  name: "refit",
  does: "fits the price model of a class on its sales as they stand, and saves it as a new edition",
  usage: ["refit --store S --class C"],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
  ],
  options: { store: { type: "string" }, class: { type: "string" } },
  places: 0,
  run,
};
