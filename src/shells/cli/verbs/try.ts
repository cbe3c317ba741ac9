/** try SALES.csv: fits and prices in memory, without a store; the quickest way from a file to a price. */
import { basename } from "node:path";
import { type TryOutcome, tryFile } from "../../../app/tryFile.ts";
import { localToday } from "../../openWorkshop.ts";
import { readBytes, readJsonObject } from "../files.ts";
import { resultJson } from "../resultJson.ts";
import { resultText } from "../resultText.ts";
import { subjectOf } from "../subjectFile.ts";
import { levelsOf, listOf, optional, refuse, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";

type Given = VerbInput["given"];

function responseOf(given: Given): "price" | "lnPrice" {
  const word = optional(given, "response") ?? "price";
  if (word === "price") return "price";
  if (word === "ln") return "lnPrice";
  throw refuse("bad-response", `"${word}" is no response.`, "--response", "Say price or ln.");
}

/** A file says no currency when it has no such column: then figures stand without a symbol. */
function withoutUnknownCurrency(text: string): string {
  return text.replaceAll("\u00a4", "").replaceAll("XXX\u00a0", "");
}

function outputOf({ appraisal, account, nameOf, detected }: TryOutcome): VerbOutput {
  const text = `${resultText(appraisal, account)}\n\nHow the file was read\n${detected.map((sentence) => `  ${sentence}`).join("\n")}`;
  return { text: withoutUnknownCurrency(text), json: { ...resultJson(appraisal, account, nameOf), detected } };
}

async function run({ places, given }: VerbInput): Promise<VerbOutput> {
  const [path = ""] = places;
  const subjectPath = optional(given, "subject");
  const subjectFile = subjectPath === null ? null : readJsonObject(subjectPath);
  const today = localToday();
  return outputOf(
    tryFile({
      fileName: basename(path),
      bytes: readBytes(path),
      price: required(given, "price"),
      response: responseOf(given),
      attributes: listOf({ attributes: required(given, "attributes") }, "attributes"),
      choices: listOf(given, "choices"),
      ln: listOf(given, "ln"),
      leaveOut: listOf(given, "leave-out"),
      levels: levelsOf(given),
      today,
      subject: (attributes) =>
        subjectFile === null ? null : subjectOf(subjectFile, subjectPath!, attributes, { given: null, today }),
    }),
  );
}

export const tryVerb: Verb = {
  name: "try",
  does: "fits a file of sales in memory, and prices an item if one is given; no store is touched",
  usage: [
    "try SALES.csv --price COL --attributes a,b,c",
    "    [--response price|ln] [--choices c,…] [--ln a,…] [--leave-out a,…]",
    "    [--subject S.json] [--levels 50,80,90,95]",
  ],
  meanings: [
    ["--price COL", "the column that holds the price"],
    ["--attributes a,…", "the reference set: columns that may explain the price"],
    ["--response R", "price (as it is) or ln (its logarithm)"],
    ["--choices c,…", "columns of numbers that are choices nevertheless"],
    ["--ln a,…", "attributes that enter by their logarithm"],
    ["--leave-out a,…", "attributes of the reference set that stay out of the model"],
    ["--subject S.json", 'the item: { "column": value, … }, null or absent where it is not known'],
    ["--levels 50,80,…", "how sure the ranges are to be, in percent"],
  ],
  options: {
    price: { type: "string" },
    response: { type: "string" },
    attributes: { type: "string" },
    choices: { type: "string" },
    ln: { type: "string" },
    "leave-out": { type: "string" },
    subject: { type: "string" },
    levels: { type: "string" },
  },
  places: 1,
  run,
};
