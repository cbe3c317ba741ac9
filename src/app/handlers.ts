/**
 * Every request with the function that answers it, and the one way in for all shells: check the input, run, reply as plain data.
 */
import { checkInput, isRequestName } from "../contract/checkInput.ts";
import type { Handlers } from "../contract/client.ts";
import { failure, type Reply } from "../contract/reply.ts";
import type { RequestName } from "../contract/requests.ts";
import { AppError } from "../domain/errors.ts";
import { appraise, currentModel } from "./appraiseSubject.ts";
import {
  addAttribute,
  archiveAttribute,
  changeAttribute,
  createClass,
  describeClass,
  listClasses,
} from "./assetClasses.ts";
import { checkHealth } from "./checkHealth.ts";
import { compareModels } from "./compareModels.ts";
import { openableDemos } from "./demo/demoClasses.ts";
import { everySet, rememberSets } from "./everySet.ts";
import { glance } from "./glanceAtPrice.ts";
import { importSales, startClassFromFile } from "./importSales.ts";
import { issueSheet, previewSheet, verifySheet } from "./issueSheet.ts";
import { leaveOutHeldBack, listHeldBack, mendHeldBack } from "./mendHeldBack.ts";
import { openDemo } from "./openDemo.ts";
import { ifPutIn, pairOf } from "./pairOf.ts";
import type { Ports } from "./ports.ts";
import { previewImport } from "./previewImport.ts";
import { previewWaysOn } from "./previewWaysOn.ts";
import { priceLot } from "./priceLot.ts";
import {
  changeSettings,
  listEditions,
  listJournal,
  listSheets,
  loadDraft,
  readSettings,
  readSheet,
  saveDraft,
  withdrawSheet,
} from "./records.ts";
import { rememberEvidence } from "./rememberEvidence.ts";
import { listSales, putBackSales, setAsideSales, verifySales } from "./saleRegister.ts";
import { saveEdition } from "./saveEdition.ts";
import { listBatches, undoBatch } from "./undoBatch.ts";

export function createHandlers(ports: Ports): Handlers {
  const memory = rememberEvidence();
  const sets = rememberSets();
  return {
    listClasses: () => listClasses(ports),
    createClass: (input) => createClass(ports, input),
    describeClass: (input) => describeClass(ports, input),
    addAttribute: (input) => addAttribute(ports, input),
    changeAttribute: (input) => changeAttribute(ports, input),
    archiveAttribute: (input) => archiveAttribute(ports, input),
    listSales: (input) => listSales(ports, input),
    setAsideSales: (input) => setAsideSales(ports, input),
    putBackSales: (input) => putBackSales(ports, input),
    verifySales: (input) => verifySales(ports, input),
    previewImport: (input) => previewImport(ports, input),
    importSales: (input) => importSales(ports, input),
    startClassFromFile: (input) => startClassFromFile(ports, input),
    listBatches: (input) => listBatches(ports, input),
    undoBatch: (input) => undoBatch(ports, input),
    listHeldBack: (input) => listHeldBack(ports, input),
    mendHeldBack: (input) => mendHeldBack(ports, input),
    leaveOutHeldBack: (input) => leaveOutHeldBack(ports, input),
    listEditions: (input) => listEditions(ports, input),
    saveDraft: (input) => saveDraft(ports, input),
    loadDraft: (input) => loadDraft(ports, input),
    listSheets: (input) => listSheets(ports, input),
    readSheet: (input) => readSheet(ports, input),
    withdrawSheet: (input) => withdrawSheet(ports, input),
    listJournal: (input) => listJournal(ports, input),
    readSettings: () => readSettings(ports),
    changeSettings: (input) => changeSettings(ports, input),
    openDemo: () => openDemo(ports, openableDemos()),
    currentModel: (input) => currentModel(ports, input),
    appraise: (input) => appraise(ports, memory, input),
    glance: (input) => glance(ports, memory, input),
    compare: (input) => compareModels(ports, input),
    health: (input) => checkHealth(ports, memory, input),
    everySet: (input) => everySet(ports, memory, sets, input),
    pairOf: (input) => pairOf(ports, memory, input),
    ifPutIn: (input) => ifPutIn(ports, memory, input),
    priceLot: (input) => priceLot(ports, memory, input),
    waysOn: (input) => previewWaysOn(ports, memory, input),
    saveEdition: (input) => saveEdition(ports, input),
    previewSheet: (input) => previewSheet(ports, input),
    issueSheet: (input) => issueSheet(ports, input),
    verifySheet: (input) => verifySheet(ports, input),
  };
}

function handlerOf(handlers: Partial<Handlers>, name: string): (input: unknown) => unknown {
  const handler = isRequestName(name) ? handlers[name] : undefined;
  if (handler !== undefined) return handler as (input: unknown) => unknown;
  throw new AppError({
    family: "request",
    code: "no-such-request",
    what: `There is no request "${name}".`,
    where: name,
    whatToDo: "Check that the window and the program are of the same version.",
  });
}

/** Checks the input, runs the handler, and turns whatever happens into a reply. Never throws. */
export async function dispatch(
  handlers: Partial<Handlers>,
  log: Ports["log"],
  name: string,
  input: unknown,
): Promise<Reply<unknown>> {
  try {
    const handler = handlerOf(handlers, name);
    return { ok: true, value: await handler(checkInput(name as RequestName, input)) };
  } catch (cause) {
    return failure(cause, log);
  }
}
