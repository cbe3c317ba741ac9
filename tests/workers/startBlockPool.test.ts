/** Sums over threads: the same bits whatever the number of threads, and an answer whatever becomes of them. */
import { afterEach, describe, expect, test, vi } from "vitest";
import { accumulateMoments } from "../../src/numerics/accumulateMoments.ts";
import { type Column, indicator, isIndicator } from "../../src/numerics/column.ts";
import type { BlockPool, PartTask } from "../../src/numerics/kernels/blockPool.ts";
import { startBlockPool, type ThreadPool } from "../../src/workers/startBlockPool.ts";
import { drawColumns, drawWeights } from "../numerics/kernels/columns.ts";

const entry = new URL("../../src/workers/computeBlocks.ts", import.meta.url);
const ROWS = 150_001;

/** The same columns on shared memory. */
function shared(columns: readonly Column[]): Column[] {
  const known = new Map<Uint16Array, Uint16Array>();
  return columns.map((column) => {
    if (!isIndicator(column)) return sharedNumbers(column);
    const codes = known.get(column.codes) ?? new Uint16Array(new SharedArrayBuffer(2 * column.length));
    if (!known.has(column.codes)) codes.set(column.codes);
    known.set(column.codes, codes);
    return indicator(codes, column.level);
  });
}

function sharedNumbers(values: Float64Array): Float64Array {
  const copy = new Float64Array(new SharedArrayBuffer(8 * values.length));
  copy.set(values);
  return copy;
}

/** The same pool, and the tasks that it was offered. */
function watched(pool: BlockPool): { pool: BlockPool; tasks: PartTask[] } {
  const tasks: PartTask[] = [];
  return {
    tasks,
    pool: {
      get size() {
        return pool.size;
      },
      offer(task) {
        tasks.push(task);
        pool.offer(task);
      },
    },
  };
}

let pool: ThreadPool | undefined;
afterEach(() => pool?.close());

const columns = drawColumns(31, ROWS, 5, [4, 3]);
const onShared = shared(columns);
const weights = drawWeights(31, ROWS);

describe("a pool of threads", () => {
  test.each([1, 2, 3])("of %i gives the bits of one thread, with and without weights", (size) => {
    pool = startBlockPool(entry, size);
    const { pool: seen, tasks } = watched(pool);
    expect(accumulateMoments(onShared, { pool: seen })).toStrictEqual(accumulateMoments(columns));
    expect(accumulateMoments(onShared, { weights: sharedNumbers(weights), pool: seen })).toStrictEqual(
      accumulateMoments(columns, { weights }),
    );
    expect(tasks).toHaveLength(2);
  });

  test("really computes parts", () => {
    pool = startBlockPool(entry, 1);
    const patient: BlockPool = {
      size: 1,
      offer(task) {
        pool!.offer(task);
        for (const end = Date.now() + 20_000; Atomics.load(task.next, 0) === 0 && Date.now() < end; );
      },
    };
    const { pool: seen, tasks } = watched(patient);
    expect(accumulateMoments(onShared, { pool: seen })).toStrictEqual(accumulateMoments(columns));
    // The caller leaves the state of a part alone that it computes in place of a thread.
    expect(Atomics.load(tasks[0]!.states, 0)).toBe(1);
  });

  test("whose thread dies with a part in hand does not hold up the caller", () => {
    const lost: BlockPool = { size: 1, offer: (task) => void Atomics.add(task.next, 0, 1) };
    expect(accumulateMoments(onShared, { pool: lost })).toStrictEqual(accumulateMoments(columns));
  });

  test("helps a caller that may not block, too", () => {
    const lost: BlockPool = { size: 1, offer: (task) => void Atomics.add(task.next, 0, 1) };
    const wait = vi.spyOn(Atomics, "wait").mockImplementation(() => {
      throw new TypeError("Atomics.wait cannot be called in this context");
    });
    expect(accumulateMoments(onShared, { pool: lost })).toStrictEqual(accumulateMoments(columns));
    expect(wait).toHaveBeenCalledTimes(1);
    wait.mockRestore();
  });

  test("that is closed leaves all work to the caller", async () => {
    pool = startBlockPool(entry, 2);
    await pool.close();
    expect(pool.size).toBe(0);
    expect(accumulateMoments(onShared, { pool })).toStrictEqual(accumulateMoments(columns));
  });

  test("that cannot start is empty after its first words", async () => {
    pool = startBlockPool(new URL("./not-there.ts", import.meta.url), 1);
    expect(accumulateMoments(onShared, { pool })).toStrictEqual(accumulateMoments(columns));
    for (const end = Date.now() + 20_000; pool.size > 0 && Date.now() < end; ) await new Promise(setImmediate);
    expect(pool.size).toBe(0);
  });

  test("is not asked for few rows, nor for columns on memory of one thread", () => {
    const { pool: seen, tasks } = watched({ size: 1, offer: () => {} });
    const few = onShared.map((column) => (isIndicator(column) ? column : column.subarray(0, 99_999)));
    accumulateMoments(few.slice(0, 5), { pool: seen });
    accumulateMoments(columns, { pool: seen });
    expect(tasks).toHaveLength(0);
  });

  test("tells of values that are not finite numbers like one thread does", () => {
    pool = startBlockPool(entry, 1);
    const bad = sharedNumbers(onShared[1] as Float64Array);
    bad[ROWS - 1] = Number.NaN;
    expect(() => accumulateMoments([onShared[0]!, bad], { pool: pool! })).toThrow(
      expect.objectContaining({ code: "notFinite", columns: [1] }),
    );
  });
});
