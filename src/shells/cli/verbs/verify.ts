/** verify F.pdf: works the sheet out again from the PDF alone, and says figure by figure whether it is equal. */
import type { VerificationReport } from "../../../domain/sheetRecord.ts";
import { readBase64 } from "../files.ts";
import { table } from "../table.ts";
import { optional, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { withStore } from "../withStore.ts";

const IN_MEMORY = ":memory:";
/** Where everything is equal, a sample of the figures is enough to read; --json has them all. */
const SHOWN_FIGURES = 12;

function figureText(figure: VerificationReport["figures"][number]): string[] {
  const word = (value: number | string | null): string => (value === null ? "none" : String(value));
  return [figure.name, word(figure.printed), word(figure.recomputed), figure.equal ? "equal" : "NOT EQUAL"];
}

function textOf(report: VerificationReport): string {
  const different = report.figures.filter(({ equal }) => !equal);
  const shown = different.length > 0 ? different : report.figures.slice(0, SHOWN_FIGURES);
  const figures =
    shown.length === 0 ? "" : table(["figure", "in the sheet", "worked out again", ""], shown.map(figureText));
  const more = report.figures.length - shown.length;
  const rest =
    more > 0 ? `  and ${more} more, ${different.length > 0 ? "all equal" : "equal too"} (--json lists all)` : "";
  return [report.sentence, ...report.problems, figures, rest].filter((part) => part !== "").join("\n");
}

async function run({ places, given }: VerbInput): Promise<VerbOutput> {
  const store = optional(given, "store");
  const bytesBase64 = readBase64(places[0] ?? "");
  const report = await withStore({ storePath: store ?? IN_MEMORY, create: store === null }, (ask) =>
    ask("verifySheet", { bytesBase64 }),
  );
  const refused = report.verdict !== "stands";
  return { text: textOf(report), json: { ok: !refused, ...report }, refused };
}

export const verifyVerb: Verb = {
  name: "verify",
  does: "works a sheet out again from its PDF alone, to the last digit",
  usage: ["verify F.pdf [--store S]"],
  meanings: [["--store S", "also asks this store's journal whether it knows the sheet"]],
  options: { store: { type: "string" } },
  places: 1,
  run,
};
