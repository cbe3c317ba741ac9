/**
 * The pool that sums take when none is handed in. A shell says once how it is made; it is made at the first sum of many rows,
 * so that small stores never start a thread. Without one, or where its threads are gone, the caller does all the work.
 */
import type { BlockPool } from "./blockPool.ts";

let make: (() => BlockPool) | null = null;
let pool: BlockPool | undefined;

/** From now on sums of many rows take the pool that `makePool` gives; null: none. */
export function setPool(makePool: (() => BlockPool) | null): void {
  make = makePool;
  pool = undefined;
}

/** The pool in use, made when there is none yet; undefined where no shell gave one. */
export function sharedPool(): BlockPool | undefined {
  if (pool === undefined && make !== null) pool = make();
  return pool;
}
