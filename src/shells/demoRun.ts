/**
 * The main job on the demo class, through the same requests as every screen and command: sales in, an edition saved, an item
 * priced. `npm start` says it in a paragraph; the demo verb goes on to the sheet.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { Appraisal, AttributeEvidence } from "../domain/appraisal.ts";
import type { AttributeValue } from "../domain/attribute.ts";
import type { Edition } from "../domain/priceModel.ts";
import type { Subject } from "../domain/subject.ts";
import type { Ask } from "./asking.ts";

export interface DemoRun {
  readonly classId: number;
  readonly edition: Edition;
  readonly appraisal: Appraisal;
  readonly input: RequestInput<"appraise">;
  readonly draft: RequestOutput<"loadDraft">;
}

const LEVELS = [0.5, 0.8, 0.9, 0.95];

/** Middle of the numbers, the most frequent of the choices. */
function typicalValue(evidence: AttributeEvidence): AttributeValue {
  if (evidence.spread !== null) return evidence.spread.median;
  const frequent = [...evidence.levels].sort((a, b) => b.count - a.count)[0]?.level ?? null;
  return evidence.kind === "yesNo" && frequent !== null ? frequent === "yes" : frequent;
}

/** A typical item of the evidence, for a class that has no draft of its own. Built days stay not known. */
function typicalSubject(appraisal: Appraisal): Subject {
  const known = appraisal.report.attributeEvidence.filter(({ kind }) => kind !== "built" && kind !== "market");
  return {
    title: `A typical ${appraisal.assetClass.itemWord}`,
    serial: null,
    identifiedBy: null,
    values: Object.fromEntries(known.map((one) => [one.key, typicalValue(one)])),
    effectiveOn: appraisal.evidence.lastSoldOn ?? "1970-01-01",
  };
}

/** Opens the demo, saves an edition when the class has none, and prices its subject. */
export async function runDemo(ask: Ask): Promise<DemoRun> {
  const { classId } = await ask("openDemo", {});
  const current = await ask("currentModel", { classId });
  const model = structuredClone(current.model) as RequestInput<"appraise">["model"];
  const edition = current.edition ?? (await ask("saveEdition", { classId, model }));
  const draft = await ask("loadDraft", { classId });
  const levels = [...LEVELS];
  const subject =
    draft?.subject ?? typicalSubject((await ask("appraise", { classId, model, subject: null, levels })).appraisal);
  const input = {
    classId,
    model,
    subject: structuredClone(subject) as NonNullable<RequestInput<"appraise">["subject"]>,
    levels,
  };
  const { appraisal } = await ask("appraise", input);
  return { classId, edition, appraisal, input, draft };
}
