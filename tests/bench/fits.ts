// Fits against the references, all of them on the same numbers and in turn.
import { Matrix, QrDecomposition } from "ml-matrix";
import { numbersOf } from "../../src/numerics/column.ts";
import { rowDiagnostics } from "../../src/numerics/rowDiagnostics.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import type { Program, Reference } from "./askReference.ts";
import { type BenchData, drawData, P30, P60, type Shape } from "./drawData.ts";
import { fitFast } from "./fitFast.ts";
import { growthExponent, median, plainFigure, ratioFigure, type Timed, takeTurns, timeOnce } from "./measure.ts";
import { LM, LM_FIT, LSTSQ, ML_MATRIX, NORMAL, R_APART, R_SHARED, reachOf } from "./rows.ts";
import { type Session, sized, whyNot, withReferences } from "./session.ts";

interface Rival {
  readonly what: string;
  readonly program: Program;
  readonly line: string;
}

const RIVALS: readonly Rival[] = [
  { what: LSTSQ, program: "numpy", line: "lstsq" },
  { what: NORMAL, program: "numpy", line: "normal" },
  { what: LM_FIT, program: "r", line: "lmfit" },
  { what: LM, program: "r", line: "lm" },
];

type References = Partial<Record<Program, Reference>>;

/** Ours (one function a row) and the rivals in turn; a ratio for every pair that `wanted` names. */
async function compare(
  session: Session,
  ours: Readonly<Record<string, Timed>>,
  rivals: readonly Rival[],
  references: References,
): Promise<void> {
  const there = rivals.filter(({ program }) => references[program] !== undefined);
  const runs = [...Object.values(ours), ...there.map(({ program, line }) => references[program]!.timed(line))];
  const times = await takeTurns(runs);
  const names = Object.keys(ours);
  for (const [at, row] of names.entries()) {
    const isWanted = ({ what }: Rival): boolean => row === names[0] || reachOf(row, what) !== null;
    for (const [r, rival] of there.entries()) {
      const { what } = rival;
      if (isWanted(rival))
        session.add(ratioFigure({ row, what }, times[at]!, times[names.length + r]!, reachOf(row, what)));
    }
    for (const { what, program } of rivals.filter((rival) => !there.includes(rival) && isWanted(rival))) {
      session.miss(row, what, whyNot(program));
    }
    if (there.length === 0) session.add(plainFigure({ row, what: "ours alone" }, "ms", times[at]!));
  }
}

async function millionRows(session: Session): Promise<void> {
  const shape: Shape = { rows: sized(session, 1_000_000), ...P30 };
  const rows = ["fit", "guarded", "careful", "rows"].filter((row) => session.wants(row));
  if (rows.length === 0) return;
  session.say("drawing 10⁶ × 30 and handing it to the references …");
  await withReferences(session, shape, ["numpy", "r"], async (data, references) => {
    const { columns, response } = data;
    const ours: Record<string, Timed> = {
      fit: () => timeOnce(() => fitFast(data)),
      guarded: () => timeOnce(() => solveLeastSquares(columns, response, { intercept: true })),
      careful: () => timeOnce(() => solveLeastSquares(columns, response, { intercept: true, path: "careful" })),
    };
    const wanted = Object.fromEntries(Object.entries(ours).filter(([row]) => session.wants(row)));
    if (Object.keys(wanted).length > 0) {
      session.say("fits, 10⁶ × 30 …");
      const rivals = RIVALS.filter(({ what }) => session.wants("fit") || what === LSTSQ);
      await compare(session, wanted, rivals, references);
    }
    if (session.wants("rows")) await diagnostics(session, data, references);
  });
}

async function diagnostics(session: Session, data: BenchData, { r }: References): Promise<void> {
  session.say("row diagnostics, 10⁶ × 30 …");
  const solution = solveLeastSquares(data.columns, data.response, { intercept: true });
  const ours: Timed = () => timeOnce(() => rowDiagnostics(data.columns, data.response, solution));
  if (r === undefined) {
    session.miss("rows", R_APART, whyNot("r"));
    session.add(plainFigure({ row: "rows", what: "ours alone" }, "ms", (await takeTurns([ours]))[0]!));
    return;
  }
  await r.ask("keep");
  const [mine, apart, shared] = await takeTurns([ours, r.timed("apart"), r.timed("diagnose")]);
  session.add(
    ratioFigure({ row: "rows", what: R_APART }, mine!, apart!, reachOf("rows", R_APART)),
    ratioFigure({ row: "rows", what: R_SHARED }, mine!, shared!, reachOf("rows", R_SHARED)),
  );
}

async function oneFit(session: Session, row: string, shape: Shape, repeats: number): Promise<void> {
  if (!session.wants(row)) return;
  session.say(`fit, ${shape.rows} rows …`);
  await withReferences(session, shape, ["numpy", "r"], async (data, references) => {
    // Short work is repeated within one timing, by both sides: a round of one millisecond would be all noise.
    const ours: Timed = () => {
      const ms = Array.from({ length: repeats }, () => timeOnce(() => fitFast(data)));
      return median(ms);
    };
    const repeated: References = {};
    for (const [program, reference] of Object.entries(references) as [Program, Reference][]) {
      repeated[program] = { ...reference, timed: (line) => () => medianOf(reference.timed(line), repeats) };
    }
    await compare(session, { [row]: ours }, RIVALS, repeated);
  });
}

async function medianOf(run: Timed, repeats: number): Promise<number> {
  const ms: number[] = [];
  for (let i = 0; i < repeats; i++) ms.push(await run());
  return median(ms);
}

async function againstMatrixLibrary(session: Session): Promise<void> {
  if (!session.wants("mlmatrix")) return;
  session.say("ml-matrix QR, 10⁵ × 30 …");
  const data = drawData({ rows: sized(session, 100_000), ...P30 });
  const dense = data.columns.map(numbersOf);
  const design = Matrix.zeros(data.rows, dense.length + 1);
  for (let i = 0; i < data.rows; i++) {
    design.set(i, 0, 1);
    for (const [j, column] of dense.entries()) design.set(i, j + 1, column[i]!);
  }
  const response = Matrix.columnVector(data.response);
  const theirs: Timed = () => timeOnce(() => new QrDecomposition(design).solve(response));
  const [mine, others] = await takeTurns([() => timeOnce(() => fitFast(data)), theirs]);
  session.add(ratioFigure({ row: "mlmatrix", what: ML_MATRIX }, mine!, others!, reachOf("mlmatrix", ML_MATRIX)));
}

async function growth(session: Session): Promise<void> {
  if (!session.wants("growth")) return;
  session.say("growth with n …");
  const sizes = [1_000, 10_000, 100_000, 1_000_000].filter((rows) => !session.isQuick || rows <= 100_000);
  const all = sizes.map((rows) => drawData({ rows, ...P30 }));
  const runs = all.map(
    (data): Timed =>
      () => {
        const repeats = Math.max(1, Math.round(100_000 / data.rows));
        return median(Array.from({ length: repeats }, () => timeOnce(() => fitFast(data))));
      },
  );
  const times = await takeTurns(runs);
  const medians = times.map(median);
  for (const [at, rows] of sizes.entries()) {
    session.add(plainFigure({ row: "growth", what: `n = ${rows}` }, "ms", times[at]!));
  }
  const large = sizes.findIndex((rows) => rows >= 10_000);
  const exponent = (from: number): number => growthExponent(sizes.slice(from), medians.slice(from));
  session.add(plainFigure({ row: "growth", what: "exponent, all sizes (1 = linear)" }, "exponent", [exponent(0)]));
  session.add(plainFigure({ row: "growth", what: "exponent from 10⁴ rows on" }, "exponent", [exponent(large)]));
}

export async function benchFits(session: Session): Promise<void> {
  await millionRows(session);
  await oneFit(session, "levels", { rows: sized(session, 100_000), ...P60 }, 1);
  await oneFit(session, "small", { rows: 1_000, ...P30 }, 50);
  await againstMatrixLibrary(session);
  await growth(session);
}
