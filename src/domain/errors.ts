/**
 * What a user is told when something cannot go on: what happened, where, and what to do.
 * A bug is not an AppError: it is logged whole and the user reads one calm sentence (see contract/reply.ts).
 */

/** The family says which part of the work refused. */
export type ErrorFamily = "import" | "fit" | "store" | "request" | "sheet";

/** An error as plain data, alike in all three shells. */
export interface PlainError {
  readonly family: ErrorFamily | "bug";
  readonly code: string;
  readonly what: string;
  readonly where: string | null;
  readonly whatToDo: string | null;
}

export interface AppErrorParts {
  family: ErrorFamily;
  /** Short kebab-case reason, stable for tests and machines. */
  code: string;
  /** What happened, a full sentence. */
  what: string;
  /** File, row, column, screen or attribute. */
  where?: string | null;
  /** The next step for the person, a full sentence. */
  whatToDo?: string | null;
  cause?: unknown;
}

/** A refusal that a person can act on. */
export class AppError extends Error {
  readonly family: ErrorFamily;
  readonly code: string;
  readonly what: string;
  readonly where: string | null;
  readonly whatToDo: string | null;

  constructor(parts: AppErrorParts) {
    super(parts.what, parts.cause === undefined ? undefined : { cause: parts.cause });
    this.name = "AppError";
    this.family = parts.family;
    this.code = parts.code;
    this.what = parts.what;
    this.where = parts.where ?? null;
    this.whatToDo = parts.whatToDo ?? null;
  }

  toPlain(): PlainError {
    return { family: this.family, code: this.code, what: this.what, where: this.where, whatToDo: this.whatToDo };
  }
}

/** One readable sentence group: "what (where). whatToDo" */
export function sentenceOf(error: PlainError): string {
  const where = error.where === null ? "" : ` (${error.where})`;
  const base = error.what.endsWith(".") ? `${error.what.slice(0, -1)}${where}.` : `${error.what}${where}.`;
  return error.whatToDo === null ? base : `${base} ${error.whatToDo}`;
}
