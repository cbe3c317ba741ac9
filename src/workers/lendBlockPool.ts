/** Says once that sums over many rows are shared with threads; they start at the first such sum and end with the program. */
import { setPool } from "../numerics/kernels/sharedPool.ts";
import { startBlockPool } from "./startBlockPool.ts";

/** `entry` as for startBlockPool; a size below 1: no threads. */
export function lendBlockPool(entry: URL, size: number): void {
  setPool(size < 1 ? null : () => startBlockPool(entry, size));
}
