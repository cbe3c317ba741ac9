/** Asking the core from a place: one act at a time with what it was refused with, and an answer that is read when its key changes. */
import { useCallback, useEffect, useRef, useState } from "react";
import type { PlainError } from "../../domain/errors.ts";
import { plainErrorOf } from "./useAppraisal.ts";

export interface Task {
  readonly isRunning: boolean;
  readonly error: PlainError | null;
  /** Resolves to null when it was refused; the refusal is then in `error`. */
  run<Value>(work: () => Promise<Value>): Promise<Value | null>;
  clear(): void;
}

export function useTask(): Task {
  const [state, setState] = useState<{ isRunning: boolean; error: PlainError | null }>({
    isRunning: false,
    error: null,
  });
  const run = useCallback(async <Value>(work: () => Promise<Value>): Promise<Value | null> => {
    setState({ isRunning: true, error: null });
    try {
      const value = await work();
      setState({ isRunning: false, error: null });
      return value;
    } catch (cause) {
      setState({ isRunning: false, error: plainErrorOf(cause) });
      return null;
    }
  }, []);
  const clear = useCallback(() => setState({ isRunning: false, error: null }), []);
  return { ...state, run, clear };
}

export interface Read<Value> {
  /** The latest answer; the one before stays while a new one is awaited. */
  readonly value: Value | null;
  readonly error: PlainError | null;
  readonly isAwaited: boolean;
}

/** Asks when `ask` changes (keep it stable with useCallback); null asks nothing and holds nothing. */
export function useRead<Value>(ask: (() => Promise<Value>) | null): Read<Value> {
  const [read, setRead] = useState<Read<Value>>({ value: null, error: null, isAwaited: ask !== null });
  const turn = useRef(0);
  useEffect(() => {
    const own = ++turn.current;
    if (ask === null) {
      setRead({ value: null, error: null, isAwaited: false });
      return;
    }
    setRead((now) => ({ ...now, isAwaited: true }));
    ask().then(
      (value) => {
        if (own === turn.current) setRead({ value, error: null, isAwaited: false });
      },
      (cause: unknown) => {
        if (own === turn.current) setRead({ value: null, error: plainErrorOf(cause), isAwaited: false });
      },
    );
  }, [ask]);
  return read;
}
