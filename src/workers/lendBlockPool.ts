/** Says once that sums over many rows are shared with threads; they start at the first such sum and end with the program. */
import { setPool } from "../numerics/kernels/sharedPool.ts";
import { startBlockPool } from "./startBlockPool.ts";

/** `entry` as for startBlockPool. No threads for a size below 1, nor where this thread may not wait for them. */
export function lendBlockPool(entry: URL, size: number): void {
  setPool(size < 1 || !mayWait() ? null : () => startBlockPool(entry, size));
}

/** Some programs forbid their main thread to block; every part that a thread has in hand would then be computed twice. */
function mayWait(): boolean {
  try {
    Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 0);
    return true;
  } catch {
    return false;
  }
}
