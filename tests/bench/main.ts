/**
 * `npm run bench`: measures ours and the references in turn on this machine, prints a table and writes .artefacts/bench.json.
 * Options: --quick (small n: shows that it works, not how fast it is), --only ROW (may be given several times).
 * Ends with 0 whatever is met, as it measures and does not judge; with 2 when it cannot run.
 */
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { availableParallelism, cpus, loadavg, tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { parseArgs } from "node:util";
import { benchDigits, ladderOf, type Rung } from "./digits.ts";
import { benchExploring } from "./explore.ts";
import { benchFits } from "./fits.ts";
import { type Figure, isMet, type Missing } from "./measure.ts";
import { benchMemory } from "./memory.ts";
import { tableOf } from "./printTable.ts";
import { ROWS } from "./rows.ts";
import type { Session } from "./session.ts";
import { isThere, whyNot } from "./session.ts";
import { benchStorage } from "./storage.ts";

const built = new URL(".", import.meta.url);
/** Built to .artefacts/bench, two folders below the top. */
const top = new URL("../../", built);

function readOptions(): { isQuick: boolean; only: readonly string[] } {
  const { values } = parseArgs({
    options: { quick: { type: "boolean", default: false }, only: { type: "string", multiple: true, default: [] } },
  });
  const known = ROWS.map(({ id }) => id);
  const unknown = values.only.filter((row) => !known.includes(row));
  if (unknown.length > 0) throw new Error(`there is no row ${unknown.join(", ")}; the rows are ${known.join(", ")}`);
  return { isQuick: values.quick, only: values.only };
}

function withoutReach(figure: Figure): Figure {
  return figure.unit === "digits" || figure.unit === "µs" ? figure : { ...figure, reach: null };
}

function openSession(): Session {
  const { isQuick, only } = readOptions();
  const figures: Figure[] = [];
  const missing: Missing[] = [];
  return {
    isQuick,
    folder: mkdtempSync(join(tmpdir(), "lotwright-bench-")),
    scripts: new URL("tests/bench/", top),
    built,
    wants: (row) => only.length === 0 || only.includes(row),
    // What is to be reached is to be reached at full size; digits and changes of a live fit do not depend on it.
    add: (...some) => figures.push(...some.map((figure) => (isQuick ? withoutReach(figure) : figure))),
    miss: (row, what, why) => missing.push({ row, what, why }),
    say: (text) => process.stderr.write(`${text}\n`),
    figures,
    missing,
  };
}

/** What the numbers were taken on, and how busy it was before they were. */
function machine() {
  return {
    processor: cpus()[0]?.model ?? "unknown",
    threads: availableParallelism(),
    node: process.version,
    loadBefore: loadavg().map((value) => Number(value.toFixed(2))),
  };
}

function print(session: Session, rungs: readonly Rung[], on: ReturnType<typeof machine>): void {
  const { figures, missing } = session;
  const busy = on.loadBefore[0]! > 0.5 ? " BUSY: other programs were running, so times are upper bounds." : "";
  const out = [
    "",
    `${on.processor}, ${on.threads} threads, Node ${on.node}; load before the start ${on.loadBefore.join(" ")}.${busy}`,
    ...(session.isQuick
      ? ["QUICK: at most 20 000 rows or so, whatever the row says. Nothing below says how fast Lotwright is."]
      : []),
    "",
    tableOf(figures, missing),
    ...(rungs.length > 0
      ? ["", "correct digits of the worst coefficient, collinear designs solved exactly, n = 3000", ladderOf(rungs)]
      : []),
    "",
    summary(figures, missing),
  ];
  process.stdout.write(`${out.join("\n")}\n`);
}

function summary(figures: readonly Figure[], missing: readonly Missing[]): string {
  const judged = figures.filter((figure) => isMet(figure) !== null);
  const met = judged.filter((figure) => isMet(figure) === true).length;
  return `${met} of ${judged.length} met, ${judged.length - met} not met, ${missing.length} skipped`;
}

async function run(session: Session): Promise<void> {
  const on = machine();
  for (const program of ["numpy", "r"] as const) {
    if (!isThere(program)) session.say(`SKIPPED: everything against ${program}. ${whyNot(program)}`);
  }
  await benchFits(session);
  const rungs = await benchDigits(session);
  await benchExploring(session);
  await benchMemory(session);
  await benchStorage(session);
  print(session, rungs, on);
  const { isQuick, figures, missing } = session;
  const judged = figures.map((figure) => ({ ...figure, met: isMet(figure) }));
  const path = fileURLToPath(new URL(".artefacts/bench.json", top));
  mkdirSync(new URL(".", pathToFileURL(path)), { recursive: true });
  writeFileSync(path, `${JSON.stringify({ on, isQuick, figures: judged, missing, ladder: rungs }, null, 2)}\n`);
}

try {
  const session = openSession();
  try {
    await run(session);
  } finally {
    rmSync(session.folder, { recursive: true, force: true });
  }
} catch (cause) {
  process.stderr.write(`The benchmark could not run: ${cause instanceof Error ? cause.message : String(cause)}\n`);
  process.exitCode = 2;
}
