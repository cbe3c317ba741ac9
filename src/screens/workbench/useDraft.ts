/** Keeps the item and the engagement as a draft in the store: a moment after the last keystroke, and at once on leaving. */
import { useEffect, useRef } from "react";
import type { Client } from "../../contract/client.ts";
import type { RequestInput } from "../../contract/requests.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";

const PAUSE_MS = 600;

interface Draft {
  readonly classId: number;
  readonly subject: Subject;
  readonly engagement: Engagement | null;
}

/** Nothing is written until something differs from what was loaded. */
export function useDraft(
  client: Client,
  classId: number | null,
  subject: Subject | null,
  engagement: Engagement | null,
): void {
  const kept = useRef<Draft | null>(null);
  const waiting = useRef<Draft | null>(null);
  useEffect(() => {
    const save = (): void => {
      const draft = waiting.current;
      waiting.current = null;
      // A draft that could not be kept is no reason to stop the work: the next change tries again.
      if (draft !== null) client.ask("saveDraft", draft as RequestInput<"saveDraft">).catch(() => undefined);
    };
    if (waiting.current !== null && waiting.current.classId !== classId) save();
    if (classId === null || subject === null) return;
    const now = { classId, subject, engagement };
    const before = kept.current;
    kept.current = now;
    const isNew = before === null || before.classId !== classId;
    if (isNew || (before.subject === subject && before.engagement === engagement)) return;
    waiting.current = now;
    const pause = setTimeout(save, PAUSE_MS);
    window.addEventListener("pagehide", save);
    return () => {
      clearTimeout(pause);
      window.removeEventListener("pagehide", save);
    };
  }, [client, classId, subject, engagement]);
}
