/** Every change leaves one journal entry, in the same transaction: who, what, in a sentence and as facts. */
import type { JournalEntry } from "../domain/importRecord.ts";
import type { Ports } from "./ports.ts";

export interface Act {
  /** "sales-imported", "sales-set-aside", "edition-saved", "sheet-issued" … */
  readonly act: string;
  readonly assetClassId: number | null;
  readonly sentence: string;
  readonly facts: Readonly<Record<string, unknown>>;
}

/** Name from the settings, or that nobody has given one. */
export function personOf(ports: Ports): string {
  const { person } = ports.store.settings.read();
  return person.trim() === "" ? "not stated" : person.trim();
}

/** Appends the entry; call it inside the transaction of the change that it tells of. */
export function recordAct(ports: Ports, act: Act): JournalEntry {
  return ports.store.journal.append({ ...act, atUtc: ports.nowUtc(), by: personOf(ports) });
}

/** 1 sale, 2 sales, 12,345 sales */
export function counted(count: number, word: string, plural = `${word}s`): string {
  return `${count.toLocaleString("en-GB")} ${count === 1 ? word : plural}`;
}
