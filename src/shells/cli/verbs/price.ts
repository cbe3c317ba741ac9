/** price --store S --class C --subject S.json: the price of one item, with its ranges and how it comes about. */
import { chosenAppraisal } from "../chosenModel.ts";
import { resultJson } from "../resultJson.ts";
import { resultText } from "../resultText.ts";
import { required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";

async function run({ given }: VerbInput): Promise<VerbOutput> {
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { input, edition } = await chosenAppraisal(ask, classId, given);
    const { appraisal } = await ask("appraise", input);
    const basis =
      edition === null
        ? "No edition has been saved yet; the usual model over all attributes was fitted."
        : `Model of edition ${edition.number}, fitted on the sales as they stand.`;
    return {
      text: `${resultText(appraisal)}\n\n${basis}`,
      json: { ...resultJson(appraisal), edition: edition?.number ?? null },
    };
  });
}

export const priceVerb: Verb = {
  name: "price",
  does: "prices one item from a store, with its ranges, what drove it and how far it can be trusted",
  usage: [
    "price --store S --class C --subject S.json",
    "      [--effective-date D] [--leave-out a,…] [--levels 50,80,90,95]",
  ],
  meanings: [
    ["--store S", "the store's file"],
    ["--class C", "asset class by name or number"],
    ["--subject S.json", 'the item: { "attribute": value, … }, null or absent where it is not known'],
    ["--effective-date D", "the day the price speaks of, YYYY-MM-DD; else the subject's own, else today"],
    ["--leave-out a,…", "attributes of the reference set that stay out of the model"],
    ["--levels 50,80,…", "how sure the ranges are to be, in percent"],
  ],
  options: {
    store: { type: "string" },
    class: { type: "string" },
    subject: { type: "string" },
    "effective-date": { type: "string" },
    "leave-out": { type: "string" },
    levels: { type: "string" },
  },
  places: 0,
  run,
};
