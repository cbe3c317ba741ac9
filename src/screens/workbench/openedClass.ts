/** Everything a class is opened with, read in one go. */
import type { Client } from "../../contract/client.ts";
import type { AssetClass, AssetClassSummary } from "../../domain/assetClass.ts";
import type { Edition, PriceModel } from "../../domain/priceModel.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";
import { blankEngagement, blankSubject, today } from "./blank.ts";

export interface ClassFacts {
  readonly assetClass: AssetClass;
  readonly summary: AssetClassSummary;
  /** The model the class is looked at with when nobody has changed it. */
  readonly baseModel: PriceModel;
  readonly edition: Edition | null;
}

export async function readClass(client: Client, classId: number): Promise<ClassFacts> {
  const [{ assetClass, summary }, { model, edition }] = await Promise.all([
    client.ask("describeClass", { classId }),
    client.ask("currentModel", { classId }),
  ]);
  return { assetClass, summary, baseModel: model, edition };
}

export async function readDraft(
  client: Client,
  classId: number,
): Promise<{ subject: Subject; engagement: Engagement }> {
  const [draft, settings] = await Promise.all([client.ask("loadDraft", { classId }), client.ask("readSettings", {})]);
  return {
    subject: draft?.subject ?? blankSubject(today()),
    engagement: draft?.engagement ?? blankEngagement(settings, today()),
  };
}

/** True when the edition speaks of the evidence as it is now: the same sales give the same coefficients. */
export async function isEditionCurrent(client: Client, classId: number, edition: Edition): Promise<boolean> {
  const input = { classId, model: edition.model, subject: null, levels: [0.9] };
  const { appraisal } = await client.ask("appraise", input as Parameters<typeof client.ask<"appraise">>[1]);
  const { n, coefficients } = appraisal.report;
  return (
    n === edition.summary.n &&
    coefficients.length === edition.summary.coefficients.length &&
    coefficients.every((one, at) => one.estimate === edition.summary.coefficients[at]!.estimate)
  );
}
