/** demo: makes the demo store, runs the main job on it, issues its sheet, and verifies that from the PDF alone. */
import { existsSync, mkdirSync } from "node:fs";
import { join } from "node:path";
import { toBase64 } from "../../../app/base64.ts";
import { demoFiles } from "../../../app/demo/demoFiles.ts";
import { demoParagraph } from "../../demoParagraph.ts";
import { runDemo } from "../../demoRun.ts";
import { writeBytes } from "../files.ts";
import { resultJson } from "../resultJson.ts";
import { optional, refuse, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { withStore } from "../withStore.ts";
import { sheetRequestOf } from "./sheet.ts";

const STORE_NAME = "demo.sqlite";

/** The demo is made afresh, so that it is the same every time; a store that is there is never written over. */
function freshStorePath(folder: string): string {
  mkdirSync(folder, { recursive: true });
  const path = join(folder, STORE_NAME);
  if (!existsSync(path)) return path;
  throw refuse(
    "demo-there",
    "There is a demo store in this folder already.",
    path,
    "Choose another folder, or remove it.",
  );
}

async function run({ given }: VerbInput): Promise<VerbOutput> {
  const folder = optional(given, "out");
  return withStore({ storePath: folder === null ? ":memory:" : freshStorePath(folder) }, async (ask) => {
    const demo = await runDemo(ask);
    const file = demo.draft?.engagement ? { engagement: demo.draft.engagement } : {};
    const request = await sheetRequestOf(ask, demo.input, file);
    const { sheet, bytesBase64 } = await ask("issueSheet", { classId: demo.classId, request });
    const verified = await ask("verifySheet", { bytesBase64 });
    const out = folder === null ? null : join(folder, `${sheet.number}.pdf`);
    if (out !== null) writeBytes(out, bytesBase64);
    if (folder !== null) {
      for (const { fileName, bytes } of demoFiles()) writeBytes(join(folder, fileName), toBase64(bytes));
    }
    const where = out === null ? "" : ` It was written to ${out}, the store and the demo's files beside it.`;
    const text = `${demoParagraph(demo)}\nSheet ${sheet.number} was issued.${where} ${verified.sentence}`;
    const json = { ...resultJson(demo.appraisal), edition: demo.edition.number, sheet, out, verification: verified };
    return { text, json, refused: verified.verdict !== "stands" };
  });
}

export const demoVerb: Verb = {
  name: "demo",
  does: "makes the invented demo, runs the main job on it, issues its sheet and verifies it",
  usage: ["demo [--out DIR]"],
  meanings: [["--out DIR", "keeps store, sheet and the demo's files in this folder; else all stays in memory"]],
  options: { out: { type: "string" } },
  places: 0,
  run,
};
