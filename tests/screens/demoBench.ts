/** A workbench over the demo class with a real appraisal, for drawing screens to text. */
import { createHandlers } from "../../src/app/handlers.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import { LEVELS } from "../../src/screens/workbench/useAppraisal.ts";
import type { Workbench } from "../../src/screens/workbench/workbench.ts";
import { testPorts } from "../app/ports.ts";

const nothing = () => undefined;
const refuse = () => Promise.reject(new Error("not asked in this test"));

export async function demoBench(
  change: (model: PriceModel) => PriceModel = (model) => model,
  over: Partial<Workbench> = {},
): Promise<Workbench> {
  const handlers = createHandlers(testPorts());
  const { classId } = await handlers.openDemo({});
  const { assetClass, summary } = await handlers.describeClass({ classId });
  const { model: base, edition } = await handlers.currentModel({ classId });
  const draft = await handlers.loadDraft({ classId });
  const model = change(base);
  const { appraisal, milliseconds } = await handlers.appraise({
    classId,
    model,
    subject: draft!.subject,
    levels: [...LEVELS],
  } as never);
  return {
    client: { ask: refuse },
    classes: [summary],
    classId,
    assetClass,
    summary,
    model,
    edition,
    subject: draft!.subject,
    engagement: draft!.engagement,
    levels: LEVELS,
    level: 0.9,
    appraisal,
    milliseconds,
    glanced: null,
    move: null,
    status: "changed",
    error: null,
    canUndo: false,
    canRedo: false,
    leftOutJustNow: null,
    changeModel: nothing,
    changeSubject: nothing,
    changeEngagement: nothing,
    setLevel: nothing,
    undo: nothing,
    redo: nothing,
    saveEdition: refuse,
    reload: refuse,
    openClass: refuse,
    ...over,
  };
}
