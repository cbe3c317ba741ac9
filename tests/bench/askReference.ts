/**
 * Long-lived reference programs, so that a round can go back and forth between ours and theirs. They load the file of doubles
 * first and time themselves inside; one line asks, one line of JSON answers. One thread each.
 */
import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { createInterface } from "node:readline";
import { fileURLToPath } from "node:url";
import type { Shape } from "./drawData.ts";
import type { Timed } from "./measure.ts";

export interface Answer {
  readonly ms?: number;
  readonly megabytes?: number;
  readonly coefficients?: readonly number[];
  readonly error?: string;
}

export interface Reference {
  ask(line: string): Promise<Answer>;
  /** `order` C: the design lies row by row (numpy only). */
  load(file: string, shape: Shape, order?: "C"): Promise<Answer>;
  /** The milliseconds that the answer to `line` names. */
  timed(line: string): Timed;
  /** Ends the program and waits for its end. */
  close(): Promise<void>;
}

const ONE_THREAD = {
  OPENBLAS_NUM_THREADS: "1",
  OMP_NUM_THREADS: "1",
  MKL_NUM_THREADS: "1",
  BLIS_NUM_THREADS: "1",
  VECLIB_MAXIMUM_THREADS: "1",
};

const PROGRAMS = {
  numpy: {
    command: "python3",
    script: "reference.py",
    probe: ["-c", "import numpy"],
    install: "python3 -m pip install numpy (or apt-get install python3-numpy)",
  },
  r: {
    command: "Rscript",
    script: "reference.R",
    probe: ["--version"],
    install: "apt-get install r-base-core (or https://cran.r-project.org)",
  },
} as const;
export type Program = keyof typeof PROGRAMS;

export function isInstalled(program: Program): boolean {
  const { command, probe } = PROGRAMS[program];
  return spawnSync(command, probe, { stdio: "ignore" }).status === 0;
}

export function howToInstall(program: Program): string {
  return `${PROGRAMS[program].command} with ${program === "r" ? "R" : program} was not found; install it: ${PROGRAMS[program].install}`;
}

/** Starts the program in `folder`, where the files of doubles are. `scripts` is the folder of this file in the sources. */
export function startReference(program: Program, folder: string, scripts: URL): Reference {
  const { command, script } = PROGRAMS[program];
  const child = spawn(command, [fileURLToPath(new URL(script, scripts))], {
    cwd: folder,
    env: { ...process.env, ...ONE_THREAD },
    stdio: ["pipe", "pipe", "inherit"],
  });
  const waiting = answersOf(child);
  const ended = new Promise<void>((resolve) => {
    child.once("close", () => resolve());
  });
  const ask = (line: string): Promise<Answer> =>
    new Promise((resolve, reject) => {
      waiting.push({ resolve, reject });
      child.stdin!.write(`${line}\n`);
    });
  return {
    ask,
    load: (file, { rows, numeric, levels }, order) =>
      ask(
        `load ${file} ${rows} ${numeric} ${levels.length === 0 ? "-" : levels.join(",")}${order === undefined ? "" : " C"}`,
      ),
    timed: (line) => async () => {
      const { ms, error } = await ask(line);
      if (ms === undefined) throw new Error(`${command} does not answer ${line}: ${error ?? "no time"}`);
      return ms;
    },
    close: async () => {
      child.stdin!.end();
      await ended;
    },
  };
}

interface Waiting {
  readonly resolve: (answer: Answer) => void;
  readonly reject: (cause: Error) => void;
}

function answersOf(child: ChildProcess): Waiting[] {
  const waiting: Waiting[] = [];
  createInterface({ input: child.stdout! }).on("line", (line) => {
    const next = waiting.shift();
    try {
      next?.resolve(JSON.parse(line) as Answer);
    } catch {
      next?.reject(new Error(`a reference program says: ${line}`));
    }
  });
  const fail = (): void => {
    for (const { reject } of waiting.splice(0)) reject(new Error("a reference program ended before it answered"));
  };
  child.on("error", fail);
  child.on("exit", fail);
  child.stdin!.on("error", fail);
  return waiting;
}
