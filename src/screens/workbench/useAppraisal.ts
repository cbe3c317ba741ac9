/**
 * The price of what is on the table: asked anew at each change of model or subject, the latest answer wins. A wait is shown
 * only after a blink, and the move of the price for a moment. A glanced price counts as waiting: the refined one replaces it.
 */
import { useCallback, useEffect, useRef, useState } from "react";
import { type Client, RequestRefused } from "../../contract/client.ts";
import type { RequestInput } from "../../contract/requests.ts";
import type { Appraisal, GlancedPrice } from "../../domain/appraisal.ts";
import type { PlainError } from "../../domain/errors.ts";
import { askPrice } from "./askPrice.ts";
import { isBlank } from "./blank.ts";
import type { Work } from "./history.ts";
import type { PriceMove } from "./workbench.ts";

export const LEVELS: readonly number[] = [0.5, 0.8, 0.9, 0.95];
const BLINK_MS = 150;
const MOMENT_MS = 8000;

export interface Answer {
  readonly appraisal: Appraisal | null;
  readonly milliseconds: number | null;
  /** A price from moments alone while the refined answer is awaited; null once that is there. */
  readonly glanced: GlancedPrice | null;
  readonly error: PlainError | null;
  readonly isWaiting: boolean;
  readonly move: PriceMove | null;
}

const NOTHING: Answer = {
  appraisal: null,
  milliseconds: null,
  glanced: null,
  error: null,
  isWaiting: false,
  move: null,
};

export function plainErrorOf(cause: unknown): PlainError {
  if (cause instanceof RequestRefused) return cause.plain;
  return {
    family: "bug",
    code: "unexpected",
    what: "Something went wrong on this page.",
    where: null,
    whatToDo: "Try again.",
  };
}

/** Null when nothing was priced before or after, or the price stayed. */
export function moveBetween(before: Appraisal | null, after: Appraisal): PriceMove | null {
  return moveTo(before, after.priced?.price.amount);
}

function moveTo(before: Appraisal | null, to: number | undefined): PriceMove | null {
  const from = before?.priced?.price;
  if (from === undefined || to === undefined || from.amount === to) return null;
  const fromTypicalError = before?.report.looTypicalError ?? null;
  return { from: from.amount, to, fromRanges: from.rangeForOneSale, fromTypicalError };
}

/** The answer with a glanced price in front: everything else is still that of the last appraisal, and so is where it moves from. */
export function whileRefined(now: Answer, glanced: GlancedPrice): Answer {
  return { ...now, glanced, isWaiting: true, error: null, move: moveTo(now.appraisal, glanced.price.amount) };
}

/** The answer once the appraisal is there. */
export function refined(appraisal: Appraisal, milliseconds: number, move: PriceMove | null): Answer {
  return { appraisal, milliseconds, glanced: null, error: null, isWaiting: false, move };
}

/** The last appraisal, and what it was of. */
interface Shown {
  readonly classId: number;
  readonly title: string;
  readonly appraisal: Appraisal;
  readonly milliseconds: number;
}

/** `stamp` changes when the data did, so that the same model and subject are asked again. */
export function useAppraisal(client: Client, classId: number | null, work: Work | null, stamp: number): Answer {
  const [answer, setAnswer] = useState<Answer>(NOTHING);
  const latest = useRef(0);
  const shown = useRef<Shown | null>(null);

  const ask = useCallback(
    async (id: number, { model, subject }: Work) => {
      const turn = ++latest.current;
      const slow = setTimeout(() => setAnswer((now) => ({ ...now, isWaiting: true })), BLINK_MS);
      const before = shown.current;
      const isSameItem = before?.classId === id && before.title === subject.title;
      if (!isSameItem) setAnswer((now) => ({ ...now, glanced: null }));
      const show = (glanced: GlancedPrice): void => {
        if (turn === latest.current && isSameItem) setAnswer((now) => whileRefined(now, glanced));
      };
      try {
        const input = { classId: id, model, subject: isBlank(subject) ? null : subject, levels: [...LEVELS] };
        const slowness = isSameItem ? before.milliseconds : null;
        const { appraisal, milliseconds } = await askPrice(client, input as RequestInput<"appraise">, slowness, show);
        if (turn !== latest.current) return;
        shown.current = { classId: id, title: subject.title, appraisal, milliseconds };
        setAnswer(refined(appraisal, milliseconds, isSameItem ? moveBetween(before.appraisal, appraisal) : null));
      } catch (cause) {
        if (turn === latest.current) setAnswer({ ...NOTHING, error: plainErrorOf(cause) });
      } finally {
        clearTimeout(slow);
      }
    },
    [client],
  );

  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same question changed
  useEffect(() => {
    if (classId === null || work === null) setAnswer(NOTHING);
    else void ask(classId, work);
  }, [ask, classId, work, stamp]);

  const { move } = answer;
  useEffect(() => {
    if (move === null) return;
    const end = setTimeout(() => setAnswer((now) => (now.move === move ? { ...now, move: null } : now)), MOMENT_MS);
    return () => clearTimeout(end);
  }, [move]);

  return answer;
}
