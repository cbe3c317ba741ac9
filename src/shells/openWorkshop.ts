/**
 * The one place where a shell is put together: the store, the clock, digests, the log and the fonts go into the app's
 * handlers, and what comes out is a single function that takes a request's name and input and gives a reply.
 */
import { createHash } from "node:crypto";
import { appendFileSync } from "node:fs";
import { join } from "node:path";
import { createHandlers, dispatch } from "../app/handlers.ts";
import type { Ports } from "../app/ports.ts";
import type { Transport } from "../contract/client.ts";
import { openStore } from "../store/openStore.ts";
import { dataFolder } from "./dataFolder.ts";
import { programVersion } from "./programFiles.ts";
import { readFonts } from "./readFonts.ts";

export interface Workshop {
  /** Answers a request as plain data; never throws. */
  readonly ask: Transport;
  readonly storePath: string;
  close(): void;
}

export interface WorkshopOptions {
  readonly storePath: string;
  /** False: refuse when there is no store yet. */
  readonly create?: boolean;
  readonly log?: (cause: unknown) => void;
}

/** Bugs go whole to a file beside the store's usual place; a log that can't be written must not hide the bug. */
export function logToFile(cause: unknown): void {
  const text = cause instanceof Error ? (cause.stack ?? cause.message) : String(cause);
  try {
    appendFileSync(join(dataFolder(), "lotwright.log"), `${new Date().toISOString()} ${text}\n`);
  } catch {
    process.stderr.write(`${text}\n`);
  }
}

/** The calendar day where the person is, not the one in Greenwich. */
export function localToday(now: Date = new Date()): string {
  const two = (number: number): string => String(number).padStart(2, "0");
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

/** Everything the app needs from outside but the store. */
export function outsidePorts(log: (cause: unknown) => void): Omit<Ports, "store"> {
  return {
    nowUtc: () => `${new Date().toISOString().slice(0, 19)}Z`,
    today: () => localToday(),
    sha256: (data) => createHash("sha256").update(data).digest("hex"),
    log,
    programVersion: programVersion(),
    fonts: readFonts(),
  };
}

/** Opens the store (AppError when it can't be opened) and the handlers over it. */
export function openWorkshop(options: WorkshopOptions): Workshop {
  const log = options.log ?? logToFile;
  const store = openStore(options.storePath, { create: options.create ?? true });
  const handlers = createHandlers({ ...outsidePorts(log), store });
  return {
    ask: (name, input) => dispatch(handlers, log, name, input),
    storePath: options.storePath,
    close: () => store.close(),
  };
}
