/** sheet --store S --class C --subject S.json --out F.pdf: issues the appraisal sheet and writes its PDF. */
import type { RequestInput } from "../../../contract/requests.ts";
import { formatMoney } from "../../../domain/format.ts";
import type { Ask } from "../../asking.ts";
import { localToday } from "../../openWorkshop.ts";
import { chosenAppraisal } from "../chosenModel.ts";
import { engagementOf, leftUnstated } from "../engagementFile.ts";
import { writeBytes } from "../files.ts";
import { required, type Verb, type VerbInput, type VerbOutput } from "../verb.ts";
import { requireClass, withStore } from "../withStore.ts";
import { priceVerb } from "./price.ts";

type SheetRequest = RequestInput<"issueSheet">["request"];

/** The sheet of a file's subject: also the demo's way to its sheet. */
export async function sheetRequestOf(
  ask: Ask,
  input: RequestInput<"appraise">,
  file: Record<string, unknown>,
): Promise<SheetRequest> {
  const { assetClass } = await ask("describeClass", { classId: input.classId });
  const settings = await ask("readSettings", {});
  return {
    model: input.model,
    subject: input.subject!,
    engagement: engagementOf(file.engagement, { today: localToday(), settings, priceBasis: assetClass.priceBasis }),
    levels: input.levels,
    overrideReason: typeof file.overrideReason === "string" ? file.overrideReason : null,
    // What the adjustments hold is checked with the request's input.
    adjustments: (file.adjustments ?? []) as SheetRequest["adjustments"],
  };
}

async function run({ given }: VerbInput): Promise<VerbOutput> {
  const out = required(given, "out");
  return withStore({ storePath: required(given, "store"), create: false }, async (ask) => {
    const classId = await requireClass(ask, required(given, "class"));
    const { input, file } = await chosenAppraisal(ask, classId, given);
    const { sheet, bytesBase64 } = await ask("issueSheet", {
      classId,
      request: await sheetRequestOf(ask, input, file),
    });
    writeBytes(out, bytesBase64);
    const money = (value: number): string => formatMoney(value, sheet.currencyCode);
    const text = `Sheet ${sheet.number} was issued for ${sheet.title}: ${money(sheet.amount)}, from ${money(sheet.low)} to ${money(sheet.high)}. It was written to ${out}.`;
    const notStated = leftUnstated(file.engagement);
    const hint = `It says that ${notStated.join(", ")} was not stated; put "engagement" into the subject file to state it.`;
    return { text: notStated.length === 0 ? text : `${text}\n${hint}`, json: { ok: true, sheet, out, notStated } };
  });
}

export const sheetVerb: Verb = {
  name: "sheet",
  does: "issues the appraisal sheet of one item as a PDF that carries its own evidence",
  usage: [
    "sheet --store S --class C --subject S.json --out F.pdf",
    "      [--effective-date D] [--leave-out a,…] [--levels 50,80,90,95]",
  ],
  meanings: [
    ...priceVerb.meanings.filter(([option]) => !option.startsWith("--subject")),
    ["--subject S.json", 'the item, and beside it "engagement", "overrideReason" and "adjustments" of the sheet'],
    ["--out F.pdf", "where the sheet goes"],
  ],
  options: { ...priceVerb.options, out: { type: "string" } },
  places: 0,
  run,
};
