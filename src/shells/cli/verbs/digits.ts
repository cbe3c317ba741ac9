/** digits SETS.json: the digits this program reaches on certified least-squares problems. */
import { readFileSync } from "node:fs";
import { type CertifiedSet, reachedDigits } from "../../../app/reachedDigits.ts";
import { table } from "../table.ts";
import { refuse, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";

function read(path: string): Record<string, CertifiedSet> {
  try {
    return JSON.parse(readFileSync(path, "utf8")) as Record<string, CertifiedSet>;
  } catch {
    throw refuse(
      "unreadable",
      "The certified sets could not be read as JSON.",
      path,
      "Give the file tests/reference/nist/strd-linear.json.",
    );
  }
}

async function run({ places }: VerbInput): Promise<VerbOutput> {
  const found = Object.entries(read(places[0] ?? "")).map(([name, set]) => reachedDigits(name, set));
  const rows = found.map((one) => [
    one.name,
    String(one.n),
    String(one.p),
    one.coefficients.toFixed(1),
    one.standardErrors.toFixed(1),
    one.residualDeviation.toFixed(1),
    String(one.digitsToTrust),
    one.path,
  ]);
  const head = ["set", "rows", "columns", "coefficients", "their errors", "scatter", "said to be", "path"];
  return {
    text: `Correct digits against the certified values; 15 is all that a double holds.\n${table(head, rows)}`,
    json: { sets: found },
  };
}

export const digitsVerb: Verb = {
  name: "digits",
  does: "shows the digits reached on certified least-squares problems",
  usage: ["digits SETS.json"],
  meanings: [["SETS.json", "certified sets, such as tests/reference/nist/strd-linear.json"]],
  options: {},
  places: 1,
  run,
};
