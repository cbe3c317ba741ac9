/**
 * Sums over a pool of threads that share memory. The caller's thread works too: a shared counter hands out parts, each result
 * goes to its own place, and the parts are merged in order, so neither the number of threads nor their luck changes a bit.
 * The pool itself is made by whoever starts threads and handed in; nothing here knows what a thread is.
 */
import { type Column, isIndicator } from "../column.ts";
import type { Moments } from "../mergeMoments.ts";
import { countOf } from "./loadBlock.ts";
import { packedSize, readMoments, writeMoments } from "./packMoments.ts";
import { partCount, type RowSums } from "./sumParts.ts";

/** What a thread needs to help; all arrays lie on shared memory. */
export interface PartTask extends RowSums {
  /** Number of the next part that nobody has taken. */
  readonly next: Int32Array;
  /** Per part: WAITING, DONE or FAILED. */
  readonly states: Int32Array;
  /** Per part `packedSize` doubles. */
  readonly results: Float64Array;
}

export interface BlockPool {
  /** Threads beside the caller's that are alive. */
  readonly size: number;
  /** Offers a task to every thread; returns at once. */
  offer(task: PartTask): void;
}

const WAITING = 0;
const DONE = 1;
const FAILED = 2;

/** From this many rows on, handing over costs less than it saves. */
export const SHARED_ROWS = 100_000;
/** How long the caller waits for a part that a thread has taken before it computes the part itself. */
const PATIENCE_MS = 500;

type Compute = (part: number) => Moments | null;

/** The moments of all parts (null for one with values that are not finite); null when the pool cannot help. */
export function sumOnPool(pool: BlockPool, sums: RowSums, compute: Compute): (Moments | null)[] | null {
  if (pool.size === 0 || countOf(sums.rows) < SHARED_ROWS || !isShared(sums)) return null;
  const parts = partCount(sums.rows);
  const task: PartTask = {
    ...sums,
    next: new Int32Array(new SharedArrayBuffer(4)),
    states: new Int32Array(new SharedArrayBuffer(4 * parts)),
    results: new Float64Array(new SharedArrayBuffer(8 * parts * packedSize(sums.columns.length))),
  };
  pool.offer(task);
  computeParts(task, compute);
  return Array.from({ length: parts }, (_, part) => resultOf(task, part, compute));
}

/** Takes parts until none is left; what every thread does. */
export function computeParts({ columns, next, states, results }: PartTask, compute: Compute): void {
  const size = packedSize(columns.length);
  for (let part = Atomics.add(next, 0, 1); part < states.length; part = Atomics.add(next, 0, 1)) {
    const moments = compute(part);
    if (moments !== null) writeMoments(moments, results.subarray(part * size, (part + 1) * size));
    Atomics.store(states, part, moments === null ? FAILED : DONE);
    Atomics.notify(states, part);
  }
}

/** Waits for the part; one that does not come in time is computed here, to the same bits. */
function resultOf({ columns, states, results }: PartTask, part: number, compute: Compute): Moments | null {
  wait(states, part);
  const state = Atomics.load(states, part);
  if (state === WAITING) return compute(part);
  const size = packedSize(columns.length);
  return state === DONE ? readMoments(results.subarray(part * size, (part + 1) * size), columns.length) : null;
}

function wait(states: Int32Array, part: number): void {
  if (Atomics.load(states, part) !== WAITING) return;
  try {
    Atomics.wait(states, part, WAITING, PATIENCE_MS);
  } catch {
    // A thread that may not block computes the part instead.
  }
}

function isShared({ columns, weights, rows }: RowSums): boolean {
  const arrays = [...columns.map(memoryOf), ...(weights === undefined ? [] : [weights])];
  if (rows instanceof Uint32Array) arrays.push(rows);
  return arrays.every(({ buffer }) => buffer instanceof SharedArrayBuffer);
}

function memoryOf(column: Column): Float64Array | Uint16Array | Uint32Array {
  return isIndicator(column) ? column.codes : column;
}
