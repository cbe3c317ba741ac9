// Peak memory of whole processes that load the same file and fit it once (VmHWM, which only Linux tells).
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { startReference } from "./askReference.ts";
import { drawData, P60 } from "./drawData.ts";
import { plainFigure } from "./measure.ts";
import { C_ORDER, LSTSQ, reachOf } from "./rows.ts";
import { isThere, type Session, sized, whyNot, withFileFor } from "./session.ts";

const ROUNDS = 5;

/** Megabytes of our own process at its height. */
function ourPeak(session: Session, file: string, rows: number): number {
  const { numeric, levels } = P60;
  const script = fileURLToPath(new URL("peak.js", session.built));
  const asked = [script, file, String(rows), String(numeric), levels.join(",")];
  const { status, stdout, stderr } = spawnSync(process.execPath, asked, { cwd: session.folder, encoding: "utf8" });
  if (status !== 0) throw new Error(`the memory child ended with ${status}: ${stderr}`);
  return (JSON.parse(stdout) as { megabytes: number }).megabytes;
}

async function theirPeak(session: Session, file: string, rows: number, order?: "C"): Promise<number> {
  const reference = startReference("numpy", session.folder, session.scripts);
  try {
    await reference.load(file, { rows, ...P60 }, order);
    await reference.ask("lstsq");
    return (await reference.ask("peak")).megabytes ?? Number.NaN;
  } finally {
    await reference.close();
  }
}

export async function benchMemory(session: Session): Promise<void> {
  if (!session.wants("memory")) return;
  if (!existsSync("/proc/self/status")) {
    session.miss("memory", LSTSQ, "the peak of a process is read from /proc, which is not here");
    return;
  }
  session.say("peak memory, 10⁶ × 60 …");
  const rows = sized(session, 1_000_000);
  await withFileFor(session, drawData({ rows, ...P60 }), async (file) => {
    const ours = Array.from({ length: ROUNDS }, () => ourPeak(session, file, rows));
    session.add(plainFigure({ row: "memory", what: "ours" }, "MB", ours));
    if (!isThere("numpy")) {
      session.miss("memory", LSTSQ, whyNot("numpy"));
      return;
    }
    // The height of a process hardly differs from run to run; each one costs some seconds.
    for (const [what, order] of [
      [LSTSQ, undefined],
      [C_ORDER, "C"],
    ] as const) {
      const theirs = [await theirPeak(session, file, rows, order), await theirPeak(session, file, rows, order)];
      session.add(plainFigure({ row: "memory", what: `${what}, whole process` }, "MB", theirs));
      const ratios = theirs.flatMap((megabytes) => ours.map((mine) => megabytes / mine));
      session.add(plainFigure({ row: "memory", what }, "×", ratios, reachOf("memory", what), "more"));
    }
  });
}
