/** Serves the screens on the loopback address until Ctrl-C or the end of the process that started it. */
import { parseArgs } from "node:util";
import { AppError, sentenceOf } from "../../domain/errors.ts";
import { usualStorePath } from "../dataFolder.ts";
import { openWorkshop, type Workshop } from "../openWorkshop.ts";
import { rendererFolder } from "../programFiles.ts";
import { type LoopbackServer, startLoopbackServer } from "./server.ts";

/** A port number 0 … 65535; refuses anything else with a sentence. */
export function portOf(text: string): number {
  const port = Number(text);
  if (/^\d+$/.test(text) && port <= 65_535) return port;
  throw new AppError({
    family: "request",
    code: "bad-port",
    what: `"${text}" is not a port number.`,
    where: "--port",
    whatToDo: "Give a whole number from 0 to 65535; 0 takes any free one.",
  });
}

function untilInterrupted(): Promise<void> {
  return new Promise((resolve) => {
    for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => resolve());
  });
}

/** Starts the server over a workshop; a port that is taken is refused with a sentence. */
export async function startServing(workshop: Workshop, port: number): Promise<LoopbackServer> {
  try {
    return await startLoopbackServer({ ask: workshop.ask, rendererFolder: rendererFolder(), port });
  } catch (cause) {
    throw new AppError({
      family: "request",
      code: "port-taken",
      what: `Port ${port} on this machine can't be used.`,
      where: "--port",
      whatToDo: "Leave --port out to take any free one.",
      cause,
    });
  }
}

/** Prints the address, serves until interrupted, then closes everything. */
export async function serveUntilInterrupted(workshop: Workshop, port: number, wantsJson = false): Promise<void> {
  const server = await startServing(workshop, port);
  const words = `Lotwright is open at ${server.address}\nPress Ctrl-C to close it.`;
  process.stdout.write(`${wantsJson ? JSON.stringify({ ok: true, address: server.address }) : words}\n`);
  await untilInterrupted();
  await server.close();
}

export async function serveFromArguments(args: string[]): Promise<number> {
  try {
    const { values } = parseArgs({
      args,
      options: { store: { type: "string" }, port: { type: "string", default: "0" } },
    });
    const workshop = openWorkshop({ storePath: values.store ?? usualStorePath() });
    await serveUntilInterrupted(workshop, portOf(values.port));
    workshop.close();
    return 0;
  } catch (cause) {
    const sentence = cause instanceof AppError ? sentenceOf(cause.toPlain()) : String(cause);
    process.stderr.write(`${sentence}\n`);
    return cause instanceof AppError ? 1 : 2;
  }
}
