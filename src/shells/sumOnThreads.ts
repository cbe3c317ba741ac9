/** Threads for sums over many sales: one per processor beside the caller's own. */
import { existsSync } from "node:fs";
import { availableParallelism } from "node:os";
import { lendBlockPool } from "../workers/lendBlockPool.ts";
import { blockThreadFile } from "./programFiles.ts";

/** More threads than this wait for memory, not for each other. */
const MOST = 7;

/** None on one processor, or where the program is not built. They do not keep the program alive. */
export function sumOnThreads(): void {
  const entry = blockThreadFile();
  lendBlockPool(entry, existsSync(entry) ? Math.min(MOST, availableParallelism() - 1) : 0);
}
