/** serve: the screens on this machine's loopback address, until Ctrl-C. */

import { portOf, serveUntilInterrupted } from "../../browser/serve.ts";
import { usualStorePath } from "../../dataFolder.ts";
import { openWorkshop } from "../../openWorkshop.ts";
import { optional, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";

async function run({ given, wantsJson }: VerbInput): Promise<VerbOutput> {
  const port = portOf(optional(given, "port") ?? "0");
  const workshop = openWorkshop({ storePath: optional(given, "store") ?? usualStorePath() });
  try {
    await serveUntilInterrupted(workshop, port, wantsJson);
  } finally {
    workshop.close();
  }
  // Everything was said when it opened; one JSON document is enough for a machine.
  return { text: "", json: undefined };
}

export const serveVerb: Verb = {
  name: "serve",
  does: "opens the screens on this machine's loopback address, until Ctrl-C",
  usage: ["serve [--store S] [--port N]"],
  meanings: [
    ["--store S", "the store's file; else your own"],
    ["--port N", "the port; else any free one"],
  ],
  options: { store: { type: "string" }, port: { type: "string" } },
  places: 0,
  run,
};
