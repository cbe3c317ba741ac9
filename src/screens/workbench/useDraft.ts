/** Keeps the item and the engagement as a draft in the store, a moment after the last keystroke. */
import { useEffect, useRef } from "react";
import type { Client } from "../../contract/client.ts";
import type { RequestInput } from "../../contract/requests.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";

const PAUSE_MS = 600;

/** Nothing is written until something differs from what was loaded. */
export function useDraft(
  client: Client,
  classId: number | null,
  subject: Subject | null,
  engagement: Engagement | null,
): void {
  const loaded = useRef<{ classId: number; subject: Subject; engagement: Engagement | null } | null>(null);
  useEffect(() => {
    if (classId === null || subject === null) return;
    if (loaded.current?.classId !== classId) {
      loaded.current = { classId, subject, engagement };
      return;
    }
    if (loaded.current.subject === subject && loaded.current.engagement === engagement) return;
    const pause = setTimeout(() => {
      loaded.current = { classId, subject, engagement };
      const input = { classId, subject, engagement } as RequestInput<"saveDraft">;
      // A draft that could not be kept is no reason to stop the work: the next change tries again.
      client.ask("saveDraft", input).catch(() => undefined);
    }, PAUSE_MS);
    return () => clearTimeout(pause);
  }, [client, classId, subject, engagement]);
}
