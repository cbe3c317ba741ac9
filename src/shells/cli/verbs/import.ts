/** import FILE --store S --class C: sales from a file into the store; every row accepted, held back or a duplicate, and said. */
import { basename } from "node:path";
import type { ImportPreview } from "../../../contract/requests.ts";
import type { ColumnMatch, ReadingOptions } from "../../../domain/importRecord.ts";
import type { Ask } from "../../asking.ts";
import { readBase64, readJsonObject } from "../files.ts";
import { applyMatchFile } from "../matchFile.ts";
import { fileSentence, heldBackText } from "../resultText.ts";
import { table } from "../table.ts";
import { optional, required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { findClass, withStore } from "../withStore.ts";

interface Asked {
  readonly fileName: string;
  readonly bytesBase64: string;
  readonly matchPath: string | null;
}

async function previewed(
  ask: Ask,
  classId: number | null,
  { fileName, bytesBase64, matchPath }: Asked,
): Promise<ImportPreview> {
  const first = await ask("previewImport", { fileName, bytesBase64, classId, options: null, match: null });
  if (matchPath === null) return first;
  const chosen = applyMatchFile(readJsonObject(matchPath), matchPath, first);
  return ask("previewImport", { fileName, bytesBase64, classId, ...mutable(chosen) });
}

/** The contract's inputs are plain mutable JSON; domain values are read-only. */
function mutable<T extends { options: ReadingOptions; match: ColumnMatch }>({ options, match }: T) {
  return {
    options: { ...options },
    match: { columns: match.columns.map((column) => ({ ...column })), fixed: match.fixed },
  };
}

function matchText(preview: ImportPreview): string {
  const rows = preview.match.columns.map(({ heading, target }) => {
    if (target.to === "attribute") return [heading, `attribute ${target.key}`];
    return [heading, target.to === "newAttribute" ? `new attribute ${target.label} (${target.kind})` : target.to];
  });
  return `Columns\n${table(["heading", "read as"], rows, 2)}`;
}

function outputOf(preview: ImportPreview, sentence: string, facts: Record<string, unknown>): VerbOutput {
  const parts = [sentence, ...preview.detected, matchText(preview), heldBackText(preview.heldBack)];
  const { options, match, read, accepted, heldBack, duplicates, blankRows, detected } = preview;
  const json = { ok: true, ...facts, read, accepted, heldBack, duplicates, blankRows, options, match, detected };
  return { text: parts.filter((part) => part !== "").join("\n"), json };
}

async function bringIn(ask: Ask, classId: number | null, className: string, preview: ImportPreview, asked: Asked) {
  const { fileName, bytesBase64 } = asked;
  const file = { fileName, bytesBase64, ...mutable(preview) };
  if (classId === null) return ask("startClassFromFile", { ...file, name: className, itemWord: "item" });
  return { ...(await ask("importSales", { ...file, classId })), classId };
}

async function run({ places, given }: VerbInput): Promise<VerbOutput> {
  const [path = ""] = places;
  const className = required(given, "class");
  const isDryRun = given["dry-run"] === true;
  const asked = { fileName: basename(path), bytesBase64: readBase64(path), matchPath: optional(given, "match") };
  return withStore({ storePath: required(given, "store"), create: !isDryRun }, async (ask) => {
    const classId = await findClass(ask, className);
    const preview = await previewed(ask, classId, asked);
    const counts = fileSentence(preview);
    if (isDryRun) return outputOf(preview, `${counts} Nothing was written (dry run).`, { dryRun: true, classId });
    const outcome = await bringIn(ask, classId, className, preview, asked);
    const made = classId === null ? ` A new asset class "${className}" was made.` : "";
    return outputOf(preview, `${counts}${made}`, { dryRun: false, classId: outcome.classId, batch: outcome.batch });
  });
}

export const importVerb: Verb = {
  name: "import",
  does: "brings sales from a file into a store, and lists the rows that are held back",
  usage: ["import FILE --store S --class C [--match M.json] [--dry-run]"],
  meanings: [
    ["--store S", "the store's file; made when it is not there"],
    ["--class C", "asset class by name or number; made from the file when there is none of that name"],
    [
      "--match M.json",
      'how to read the file: { "columns": { "heading": "price" | "soldOn" | … }, "fixed": {…}, "options": {…} }',
    ],
    ["--dry-run", "reads, matches and counts, but writes nothing"],
  ],
  options: {
    store: { type: "string" },
    class: { type: "string" },
    match: { type: "string" },
    "dry-run": { type: "boolean" },
  },
  places: 1,
  run,
};
