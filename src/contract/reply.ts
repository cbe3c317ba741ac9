/** What comes back across a shell: plain data, alike in all three. */
import { AppError, type PlainError } from "../domain/errors.ts";

export type Reply<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly error: PlainError };

const CALM: PlainError = {
  family: "bug",
  code: "unexpected",
  what: "Something went wrong inside the program; nothing was changed.",
  where: null,
  whatToDo: "Try again; if it happens again, the log holds the cause.",
};

/** An AppError becomes its plain form; anything else becomes one calm sentence and goes whole to the log. */
export function failure(cause: unknown, log: (cause: unknown) => void): { ok: false; error: PlainError } {
  if (cause instanceof AppError) return { ok: false, error: cause.toPlain() };
  log(cause);
  return { ok: false, error: CALM };
}
