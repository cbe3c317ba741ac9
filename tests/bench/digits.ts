// Correct digits of every way to fit on constructed collinear designs, n = 3000, 10 columns and the intercept.
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { openLiveFit } from "../../src/numerics/liveFit.ts";
import { type LeastSquaresSolution, solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { type Program, type Reference, startReference } from "./askReference.ts";
import { collinearDesign, correctDigits, type ExactDesign } from "./exactFit.ts";
import { plainFigure } from "./measure.ts";
import { DIGITS_1E5, DIGITS_1E8, LM_FIT, LSTSQ, NORMAL, reachOf } from "./rows.ts";
import { isThere, type Session, whyNot, withFileFor } from "./session.ts";

const ROWS = 3000;
const WIDTH = 10;
const LADDER = [2, 3, 4, 5, 6, 7, 8];

/** One line of the ladder: digits by way of fitting. */
export interface Rung {
  readonly asked: number;
  /** As our own solver estimates it. */
  readonly condition: number;
  readonly digits: Readonly<Record<string, number>>;
}

const FAST = "fast (moments, unrefined)";
const GUARDED = "guarded";
const CAREFUL = "careful";

function withIntercept({ intercept, slopes }: LeastSquaresSolution): number[] {
  return [intercept ?? 0, ...slopes];
}

function fastCoefficients({ columns, response }: ExactDesign): number[] {
  try {
    const { intercept, slopes } = openLiveFit(accumulateMoments([...columns, response]), [...columns.keys()]).answer();
    return [intercept, ...slopes];
  } catch {
    // The live fit refuses columns that it cannot tell apart: no digits.
    return [];
  }
}

type References = Partial<Record<Program, Reference>>;

async function rung(session: Session, asked: number, references: References): Promise<Rung> {
  const design = collinearDesign(asked, ROWS, WIDTH, 7 + Math.round(Math.log10(asked)));
  const { columns, response, coefficients } = design;
  const guarded = solveLeastSquares(columns, response, { intercept: true });
  const careful = solveLeastSquares(columns, response, { intercept: true, path: "careful" });
  const digits: Record<string, number> = {
    [FAST]: correctDigits(fastCoefficients(design), coefficients),
    [GUARDED]: correctDigits(withIntercept(guarded), coefficients),
    [CAREFUL]: correctDigits(withIntercept(careful), coefficients),
  };
  const shape = { rows: ROWS, numeric: WIDTH, levels: [] };
  await withFileFor(session, { ...shape, numbers: columns, codes: [], response, columns }, async (file) => {
    for (const [program, what, line] of [
      ["numpy", LSTSQ, "lstsq"],
      ["numpy", NORMAL, "normal"],
      ["r", LM_FIT, "lmfit"],
    ] as const) {
      const reference = references[program];
      if (reference === undefined) continue;
      await reference.load(file, shape);
      digits[what] = correctDigits((await reference.ask(line)).coefficients ?? [], coefficients);
    }
  });
  return { asked, condition: careful.condition, digits };
}

/** The ladder; the rows guarded and careful get their worst digits up to the condition they promise. */
export async function benchDigits(session: Session): Promise<Rung[]> {
  if (!session.wants("guarded") && !session.wants("careful")) return [];
  session.say("correct digits …");
  const references: References = {};
  for (const program of ["numpy", "r"] as const) {
    if (isThere(program)) references[program] = startReference(program, session.folder, session.scripts);
    else session.miss("guarded", `correct digits of ${program}`, whyNot(program));
  }
  const rungs: Rung[] = [];
  try {
    for (const power of LADDER) rungs.push(await rung(session, 10 ** power, references));
  } finally {
    for (const reference of Object.values(references)) await reference.close();
  }
  const upTo = (most: number, way: string): number[] =>
    rungs.filter(({ asked }) => asked <= most).map(({ digits }) => digits[way]!);
  for (const [row, what, way, most] of [
    ["guarded", DIGITS_1E5, GUARDED, 1e5],
    ["careful", DIGITS_1E8, CAREFUL, 1e8],
  ] as const) {
    const worst = Math.min(...upTo(most, way));
    if (session.wants(row)) session.add(plainFigure({ row, what }, "digits", [worst], reachOf(row, what), "more"));
  }
  return rungs;
}

/** The ladder as text: one line a rung, one column a way. */
export function ladderOf(rungs: readonly Rung[]): string {
  const ways = Object.keys(rungs[0]?.digits ?? {});
  const lines = rungs.map(({ asked, condition, digits }) => [
    asked.toExponential(0),
    condition.toExponential(1),
    ...ways.map((way) => digits[way]!.toFixed(1)),
  ]);
  const table = [["condition asked", "as estimated", ...ways], ...lines];
  const widths = table[0]!.map((_, at) => Math.max(...table.map((cells) => cells[at]!.length)));
  return table.map((cells) => cells.map((cell, at) => cell.padStart(widths[at]!)).join("  ")).join("\n");
}
