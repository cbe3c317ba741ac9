// What every part of the benchmark is handed: sizes, a folder of its own, the references, and where its figures go.
import { rmSync } from "node:fs";
import { join } from "node:path";
import type { Program, Reference } from "./askReference.ts";
import { howToInstall, isInstalled, startReference } from "./askReference.ts";
import { type BenchData, drawData, type Shape, writeData } from "./drawData.ts";
import type { Figure, Missing } from "./measure.ts";

export interface Session {
  readonly isQuick: boolean;
  /** Temporary; goes when the benchmark ends. */
  readonly folder: string;
  /** Of this folder in the sources, where the reference programs lie. */
  readonly scripts: URL;
  /** Of the built benchmark, where the worker and the memory child lie. */
  readonly built: URL;
  wants(row: string): boolean;
  add(...figures: readonly Figure[]): void;
  miss(row: string, what: string, why: string): void;
  say(text: string): void;
  readonly figures: readonly Figure[];
  readonly missing: readonly Missing[];
}

/** The data as a file of doubles in the session's folder while `work` runs. */
export async function withFileFor(
  session: Session,
  data: BenchData,
  work: (file: string) => Promise<void>,
): Promise<void> {
  const file = `sales-${data.rows}-${data.levels.join("-")}.bin`;
  writeData(join(session.folder, file), data);
  try {
    await work(file);
  } finally {
    rmSync(join(session.folder, file), { force: true });
  }
}

/** Data of this shape, and the references that are installed, which have loaded it. */
export async function withReferences(
  session: Session,
  shape: Shape,
  programs: readonly Program[],
  work: (data: BenchData, references: Partial<Record<Program, Reference>>) => Promise<void>,
): Promise<void> {
  const data = drawData(shape);
  await withFileFor(session, data, async (file) => {
    const references: Partial<Record<Program, Reference>> = {};
    try {
      for (const program of programs.filter(isThere)) {
        const reference = startReference(program, session.folder, session.scripts);
        references[program] = reference;
        await reference.load(file, shape);
      }
      await work(data, references);
    } finally {
      for (const reference of Object.values(references)) await reference.close();
    }
  });
}

const found = new Map<Program, boolean>();

export function isThere(program: Program): boolean {
  const known = found.get(program) ?? isInstalled(program);
  found.set(program, known);
  return known;
}

export function whyNot(program: Program): string {
  return howToInstall(program);
}

/** 10⁶ becomes 2·10⁴ where only the working of the benchmark is to be seen. */
export function sized(session: Session, rows: number): number {
  return session.isQuick ? Math.min(rows, 20_000) : rows;
}
