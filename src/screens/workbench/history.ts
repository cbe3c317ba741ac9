/** Undo and redo over what a person works on: model and subject together, so that one key takes back the last change of either. */
import type { PriceModel } from "../../domain/priceModel.ts";
import type { Subject } from "../../domain/subject.ts";

export interface Work {
  readonly model: PriceModel;
  readonly subject: Subject;
}

export interface History {
  readonly now: Work;
  readonly past: readonly Work[];
  readonly future: readonly Work[];
  /** What the last change was made on: keystrokes in one field are one step back. */
  readonly lastField: string | null;
}

const LONGEST = 200;

export function startHistory(now: Work): History {
  return { now, past: [], future: [], lastField: null };
}

/** `field` null: always a step of its own. */
export function record(history: History, now: Work, field: string | null): History {
  const joins = field !== null && field === history.lastField;
  const past = joins ? history.past : [...history.past, history.now].slice(-LONGEST);
  return { now, past, future: [], lastField: field };
}

export function undo(history: History): History {
  const now = history.past[history.past.length - 1];
  if (now === undefined) return history;
  return { now, past: history.past.slice(0, -1), future: [history.now, ...history.future], lastField: null };
}

export function redo(history: History): History {
  const [now, ...future] = history.future;
  if (now === undefined) return history;
  return { now, past: [...history.past, history.now], future, lastField: null };
}
