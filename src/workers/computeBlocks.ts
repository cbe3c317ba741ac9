// A thread that helps to sum rows: a task in, its parts computed into the task's shared memory. It ends with the program.
import { parentPort, workerData } from "node:worker_threads";
import { computeParts, type PartTask } from "../numerics/kernels/blockPool.ts";
import { planColumns } from "../numerics/kernels/columnPlan.ts";
import { plainKernel } from "../numerics/kernels/plainKernel.ts";
import { partMoments } from "../numerics/kernels/sumParts.ts";
import { wasmKernel } from "../numerics/kernels/wasmKernel.ts";

const { module } = workerData as { readonly module: WebAssembly.Module | null };
const kernel = module === null ? plainKernel() : wasmKernel(module);

parentPort?.on("message", (task: PartTask) => {
  const plan = planColumns(task.columns);
  computeParts(task, (part) => partMoments(kernel, plan, task, part));
});
