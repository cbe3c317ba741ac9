/** Requests that read or write plain records: drafts, editions, sheets that were issued, the journal, settings. */
import type { Draft, RequestInput, RequestOutput, Settings } from "../contract/requests.ts";
import type { Edition } from "../domain/priceModel.ts";
import type { SheetRecord } from "../domain/sheetRecord.ts";
import { toBase64 } from "./base64.ts";
import type { Ports } from "./ports.ts";
import { recordAct } from "./recordAct.ts";

export function saveDraft(ports: Ports, input: RequestInput<"saveDraft">): { savedAtUtc: string } {
  const { classId, subject, engagement } = input;
  const savedAtUtc = ports.nowUtc();
  // What is typed and not yet issued is no act: a draft leaves no journal entry.
  ports.store.transaction(() => {
    ports.store.assetClasses.dataVersion(classId);
    ports.store.drafts.write(classId, { subject, engagement, savedAtUtc });
  });
  return { savedAtUtc };
}

export function loadDraft(ports: Ports, { classId }: RequestInput<"loadDraft">): Draft | null {
  const draft = ports.store.drafts.read(classId);
  if (draft === null) return null;
  const { engagement } = draft;
  return {
    ...draft,
    engagement: engagement === null ? null : { ...engagement, ownCaveats: [...engagement.ownCaveats] },
  };
}

export function listEditions(ports: Ports, { classId }: RequestInput<"listEditions">): readonly Edition[] {
  return ports.store.editions.list(classId);
}

export function listSheets(ports: Ports, { classId }: RequestInput<"listSheets">): readonly SheetRecord[] {
  return ports.store.sheets.list(classId);
}

export function readSheet(ports: Ports, { sheetId }: RequestInput<"readSheet">): RequestOutput<"readSheet"> {
  const { sheets } = ports.store;
  return { sheet: sheets.get(sheetId), bytesBase64: toBase64(sheets.bytes(sheetId)) };
}

export function withdrawSheet(ports: Ports, { sheetId, reason }: RequestInput<"withdrawSheet">): SheetRecord {
  return ports.store.transaction(() => {
    const sheet = ports.store.sheets.changeState(sheetId, "withdrawn", reason);
    recordAct(ports, {
      act: "sheet-withdrawn",
      assetClassId: sheet.assetClassId,
      sentence: `Sheet ${sheet.number} withdrawn: ${reason}`,
      facts: { number: sheet.number, digest: sheet.digest, reason },
    });
    return sheet;
  });
}

export function listJournal(ports: Ports, input: RequestInput<"listJournal">): RequestOutput<"listJournal"> {
  const { journal } = ports.store;
  const chain = journal.verifyChain();
  return {
    total: journal.count(),
    entries: journal.list(input.offset, input.limit),
    chainIntact: chain.intact,
    chainSentence: chain.sentence,
  };
}

export function readSettings(ports: Ports): Settings {
  return ports.store.settings.read();
}

/** The act is recorded under the name that holds afterwards; the facts keep both. */
export function changeSettings(ports: Ports, settings: RequestInput<"changeSettings">): Settings {
  return ports.store.transaction(() => {
    const before = ports.store.settings.read();
    ports.store.settings.write(settings);
    recordAct(ports, {
      act: "settings-changed",
      assetClassId: null,
      sentence: "Name and practice changed.",
      facts: { before, after: settings },
    });
    return ports.store.settings.read();
  });
}
