// What answers while someone clicks: changes of a live fit, every set of attributes at once, and sums on two threads.
import { accumulateMoments, partsBy } from "../../src/numerics/accumulateMoments.ts";
import { allSubsets } from "../../src/numerics/allSubsets.ts";
import { averagedShares } from "../../src/numerics/averagedShares.ts";
import { valueAt } from "../../src/numerics/column.ts";
import { openLiveFit } from "../../src/numerics/liveFit.ts";
import { foldErrors, generalisedErrors, leaveOneOutErrors } from "../../src/numerics/subsetErrors.ts";
import { startBlockPool } from "../../src/workers/startBlockPool.ts";
import { drawData, P30 } from "./drawData.ts";
import { median, plainFigure, ratioFigure, type Timed, takeTurns, timeOnce } from "./measure.ts";
import { reachOf } from "./rows.ts";
import { type Session, sized } from "./session.ts";

const CHANGES = 2000;

/** Milliseconds of one change with its answer: the middle of many, as a clock tick is a good part of one. */
function perChange(change: (i: number) => unknown): Timed {
  return () => median(Array.from({ length: CHANGES }, (_, i) => timeOnce(() => change(i))));
}

async function live(session: Session): Promise<void> {
  if (!session.wants("live")) return;
  session.say("live changes …");
  const { columns, response, rows } = drawData({ rows: sized(session, 100_000), ...P30 });
  const all = [...columns, response];
  const fit = openLiveFit(accumulateMoments(all), [...columns.keys()]);
  const sales = Array.from({ length: 512 }, (_, i) => all.map((column) => valueAt(column, (i * 37) % rows)));
  const choice = Array.from({ length: P30.levels[0]! - 1 }, (_, at) => P30.numeric + at);
  const answered = (): number => fit.answer().standardErrors[0]!;
  const runs: Record<string, Timed> = {
    // Out at even changes and in again at odd ones, so that p stays 30 or one less.
    "switch one attribute": perChange((i) => {
      fit.switchColumns([Math.floor(i / 2) % P30.numeric]);
      return answered();
    }),
    "switch one attribute, a choice of 6 levels": perChange(() => {
      fit.switchColumns(choice);
      return answered();
    }),
    "add one sale": perChange((i) => {
      fit.addSale(sales[i % 512]!);
      return answered();
    }),
    "remove one sale": perChange((i) => {
      fit.removeSale(sales[i % 512]!);
      return answered();
    }),
  };
  const times = await takeTurns(Object.values(runs));
  Object.keys(runs).forEach((what, at) => {
    const reach = reachOf("live", what);
    const micro = times[at]!.map((ms) => ms * 1000);
    session.add(plainFigure({ row: "live", what }, "µs", micro, reach === null ? null : reach * 1000));
  });
}

/** 15 attributes: 10 numbers, and 5 numbers more, on a thousand sales. */
async function sets(session: Session): Promise<void> {
  if (!session.wants("sets")) return;
  session.say("every attribute set …");
  const { columns, response, rows } = drawData({ rows: 1000, numeric: 15, levels: [] });
  const all = [...columns, response];
  const groups = columns.map((_, j) => [j]);
  const moments = accumulateMoments(all);
  const folds = partsBy(
    all,
    Uint16Array.from({ length: rows }, (_, i) => i % 10),
    10,
  );
  const table = allSubsets(moments, groups);
  const runs: Record<string, () => unknown> = {
    "R² of every set": () => allSubsets(moments, groups),
    "exact order-averaged shares": () => averagedShares(table.r2, groups.length),
    "generalised error (an estimate, from R²'s own sums)": () => generalisedErrors(table, rows),
    "error over 10 folds (exact, from moments)": () => foldErrors(folds, groups),
    "leave-one-out error (exact, walks the rows)": () => leaveOneOutErrors(moments, columns, response, groups),
    "R² + leave-one-out error (rows) + shares": () => {
      const whole = allSubsets(moments, groups);
      const errors = leaveOneOutErrors(moments, columns, response, groups);
      return [errors, averagedShares(whole.r2, groups.length)];
    },
    "R² + generalised error + shares": () => {
      const whole = allSubsets(moments, groups);
      return [generalisedErrors(whole, rows), averagedShares(whole.r2, groups.length)];
    },
  };
  const times = await takeTurns(
    Object.values(runs).map(
      (work): Timed =>
        () =>
          timeOnce(work),
    ),
  );
  Object.keys(runs).forEach((what, at) => {
    session.add(plainFigure({ row: "sets", what }, "ms", times[at]!, reachOf("sets", what)));
  });
}

/** One helper beside the caller makes two threads. */
async function threads(session: Session): Promise<void> {
  if (!session.wants("threads")) return;
  session.say("two threads …");
  const data = drawData({ rows: sized(session, 1_000_000) * (session.isQuick ? 10 : 1), ...P30 });
  const all = [...data.columns, data.response];
  const pool = startBlockPool(new URL("computeBlocks.js", session.built), 1);
  const rounds = 15;
  const alone: Timed = () => timeOnce(() => accumulateMoments(all));
  const together: Timed = () => timeOnce(() => accumulateMoments(all, { pool }));
  // The thread loads its program while the first sums are made by the caller.
  for (let i = 0; i < 3; i++) {
    await together();
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  const [two, one] = await takeTurns([together, alone], rounds);
  await pool.close();
  const named = { row: "threads", what: "one thread" };
  session.add(ratioFigure(named, two!, one!, reachOf("threads", "one thread")));
  const best = Math.min(...one!) / Math.min(...two!);
  session.add(plainFigure({ row: "threads", what: "best of one over best of two" }, "×", [best], null, "more"));
}

export async function benchExploring(session: Session): Promise<void> {
  await threads(session);
  await live(session);
  await sets(session);
}
