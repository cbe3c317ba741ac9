/** Threads in use change no bit of an appraisal, and start only when a sum has many rows. */
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { type ComputedAppraisal, computeAppraisal, prepareEvidence } from "../../src/app/computeAppraisal.ts";
import type { BlockPool, PartTask } from "../../src/numerics/kernels/blockPool.ts";
import { setPool, sharedPool } from "../../src/numerics/kernels/sharedPool.ts";
import { lendBlockPool } from "../../src/workers/lendBlockPool.ts";
import { startBlockPool, type ThreadPool } from "../../src/workers/startBlockPool.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const entry = new URL("../../src/workers/computeBlocks.ts", import.meta.url);
const COUNT = 120_000;
const wanted = model({ leftOut: ["pull"], halfLifeMonths: 18, range: "exact", errors: { kind: "HC3" } });

let threads: ThreadPool | undefined;
afterEach(async () => {
  setPool(null);
  await threads?.close();
});

/** A pool of one thread that has begun on every task before the caller may go on, and the tasks it was offered. */
function busyPool(): { pool: BlockPool; tasks: PartTask[] } {
  const tasks: PartTask[] = [];
  const own = startBlockPool(entry, 1);
  threads = own;
  const offer = (task: PartTask): void => {
    tasks.push(task);
    own.offer(task);
    for (const end = Date.now() + 20_000; Atomics.load(task.next, 0) === 0 && Date.now() < end; );
  };
  return { pool: { size: 1, offer }, tasks };
}

/** The first place at which the two differ in any bit of a number, or in anything else; null when there is none. */
function difference(a: unknown, b: unknown, path = ""): string | null {
  if (typeof a !== "object" || a === null || typeof b !== "object" || b === null)
    return Object.is(a, b) ? null : `${path}: ${String(a)} and ${String(b)}`;
  const keys = Object.keys(a);
  if (keys.length !== Object.keys(b).length) return `${path}: other keys`;
  for (const key of keys) {
    const found = difference(a[key as never], b[key as never], `${path}.${key}`);
    if (found !== null) return found;
  }
  return null;
}

describe("threads in use", () => {
  let alone: ComputedAppraisal;
  const columns = sales({ seed: 12, count: COUNT, together: 0.5 });
  const appraised = (count = COUNT): ComputedAppraisal => {
    const some = count === COUNT ? columns : sales({ seed: 12, count, together: 0.5 });
    const input = { assetClass: CLASS, sales: some, model: wanted, subject: SUBJECT, levels: [0.5, 0.9] };
    return computeAppraisal(input, prepareEvidence(input));
  };
  beforeAll(() => {
    alone = appraised();
  });

  test("change no bit of an appraisal of 120,000 sales", () => {
    const { pool, tasks } = busyPool();
    setPool(() => pool);
    const helped = appraised();
    expect(difference(helped.appraisal, alone.appraisal)).toBeNull();
    expect(difference(helped.fit.solution.inverse, alone.fit.solution.inverse)).toBeNull();
    expect(tasks.length).toBeGreaterThan(1);
    expect(difference({ a: [1, { b: 0 }] }, { a: [1, { b: -0 }] })).toBe(".a.1.b: 0 and 0");
  });

  test("start at the first sum of many rows, once, and not before", () => {
    let made = 0;
    setPool(() => {
      made += 1;
      return { size: 0, offer: () => undefined };
    });
    appraised(500);
    expect(made).toBe(0);
    expect(difference(appraised().appraisal, alone.appraisal)).toBeNull();
    expect(made).toBe(1);
  });

  test("are none where the caller may not wait for them", () => {
    const wait = vi.spyOn(Atomics, "wait").mockImplementation(() => {
      throw new TypeError("Atomics.wait cannot be called in this context");
    });
    lendBlockPool(entry, 1);
    wait.mockRestore();
    expect(sharedPool()).toBeUndefined();
  });

  test("are none for a size below 1, and after being given up", async () => {
    lendBlockPool(entry, 0);
    expect(sharedPool()).toBeUndefined();
    lendBlockPool(entry, 1);
    const pool = sharedPool() as ThreadPool;
    expect(pool.size).toBe(1);
    expect(sharedPool()).toBe(pool);
    await pool.close();
    setPool(null);
    expect(sharedPool()).toBeUndefined();
  });
});
