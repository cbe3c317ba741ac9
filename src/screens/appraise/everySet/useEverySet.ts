/** Asks for every attribute set of the item on the table; the share of the least error that counts is set here. */
import { useEffect, useMemo, useState } from "react";
import type { RequestInput } from "../../../contract/requests.ts";
import { type EverySet, leftOutFor, USUAL_RULE } from "../../../domain/attributeSets.ts";
import type { PlainError } from "../../../domain/errors.ts";
import { isBlank } from "../../workbench/blank.ts";
import { useRead } from "../../workbench/useTask.ts";
import type { Workbench } from "../../workbench/workbench.ts";

/** In every set, out of every set, or in and out in every combination. */
export type Hold = "in" | "free" | "out";

export interface EverySetState {
  readonly found: EverySet | null;
  readonly error: PlainError | null;
  readonly isAwaited: boolean;
  /** 0.1: an error within a tenth of the best counts. */
  readonly share: number;
  setShare(share: number): void;
  /** Attributes that are not free; kept for the class that is open. */
  readonly holds: ReadonlyMap<string, Hold>;
  hold(key: string, hold: Hold): void;
  /** Makes this set the model's attribute set. */
  choose(set: number): void;
}

const USUAL_SHARE = USUAL_RULE.kind === "error" ? USUAL_RULE.share : 0.1;
const SETTLE_MS = 90;

/** Null asks nothing: the place is not shown. */
export function useEverySet(bench: Workbench | null): EverySetState {
  const [share, setShare] = useState(USUAL_SHARE);
  const settled = useSettled(share);
  const client = bench?.client ?? null;
  const classId = bench?.classId ?? null;
  const model = bench?.model ?? null;
  const subject = bench?.subject ?? null;
  const { holds, hold } = useHolds(classId);
  const dataStamp = bench?.assetClass?.dataVersion ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same question changed
  const ask = useMemo(() => {
    if (client === null || classId === null || model === null) return null;
    const item = subject === null || isBlank(subject) ? null : subject;
    const input = { classId, model, subject: item, rule: { kind: "error", share: settled }, ...pinsOf(holds) };
    return () => client.ask("everySet", input as RequestInput<"everySet">);
  }, [client, classId, model, subject, settled, holds, dataStamp]);
  const { value, error, isAwaited } = useRead(ask);
  const choose = (set: number): void => {
    if (value === null || bench === null) return;
    bench.changeModel((now) => ({ ...now, leftOut: leftOutFor(value, set, now) }));
  };
  return { found: value, error, isAwaited, share, setShare, holds, hold, choose };
}

function useHolds(classId: number | null): Pick<EverySetState, "holds" | "hold"> {
  const [kept, keep] = useState<{ classId: number | null; holds: ReadonlyMap<string, Hold> }>({ classId, holds: FREE });
  const holds = kept.classId === classId ? kept.holds : FREE;
  const hold = (key: string, wish: Hold): void => {
    const next = new Map(holds);
    if (wish === "free") next.delete(key);
    else next.set(key, wish);
    keep({ classId, holds: next });
  };
  return { holds, hold };
}

const FREE: ReadonlyMap<string, Hold> = new Map();

function pinsOf(holds: ReadonlyMap<string, Hold>): { alwaysIn: string[]; alwaysOut: string[] } {
  const held = (wish: Hold): string[] => [...holds].flatMap(([key, hold]) => (hold === wish ? [key] : []));
  return { alwaysIn: held("in"), alwaysOut: held("out") };
}

/** The value once it has stood still for a moment. */
function useSettled(value: number): number {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const wait = setTimeout(() => setSettled(value), SETTLE_MS);
    return () => clearTimeout(wait);
  }, [value]);
  return settled;
}
