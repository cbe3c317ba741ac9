/**
 * A pool of threads that help to sum rows (`numerics/kernels/blockPool.ts` says how the work is shared). Shells start it once
 * and hand it in; the threads do not keep the program alive. A thread that dies is left out; what it had taken is computed by
 * the caller.
 */
import { Worker } from "node:worker_threads";
import type { BlockPool } from "../numerics/kernels/blockPool.ts";
import { kernelModule } from "../numerics/kernels/currentKernel.ts";

export interface ThreadPool extends BlockPool {
  /** Ends the threads; a pool without threads leaves all work to the caller. */
  close(): Promise<void>;
}

/** So many threads running `entry`: the file that the build makes of `computeBlocks.ts`. */
export function startBlockPool(entry: URL, size: number): ThreadPool {
  const threads = new Set<Worker>();
  for (let i = 0; i < size; i++) {
    const thread = new Worker(entry, { workerData: { module: kernelModule() } });
    thread.unref();
    thread.on("error", () => threads.delete(thread));
    thread.on("exit", () => threads.delete(thread));
    threads.add(thread);
  }
  return {
    get size() {
      return threads.size;
    },
    offer(task) {
      for (const thread of threads) thread.postMessage(task);
    },
    async close() {
      const ending = [...threads].map((thread) => thread.terminate());
      threads.clear();
      await Promise.all(ending);
    },
  };
}
