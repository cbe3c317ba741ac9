/**
 * The heavy loops of numerics behind one interface, with two makers: `wasmKernel` (SIMD, compiled from `assembly/`) and
 * `plainKernel` (TypeScript, where WebAssembly is not allowed). Both add in the same order, so their results are equal bit for
 * bit; callers never know which one runs. `currentKernel()` picks.
 *
 * Memory: each kernel owns one piece of memory. A caller reserves bytes, lays its numbers there through `f64` and `u16`
 * (indices are byte addresses divided by 8 and 2), calls operations with byte addresses, and reads the results before anyone
 * else reserves: nothing is kept between calls. Columns are copied in by `set` a block at a time (`layout.ts`), which costs
 * less than reading them in place would gain.
 *
 * To add an operation: write it in `assembly/<topic>.ts` and export it from `assembly/index.ts`; write it again in
 * `plain/<topic>.ts` with the same lanes and order of additions and spread it into `plainKernel.ts`; add its signature to an
 * interface `<Topic>Operations` here; compare both bit for bit in `tests/numerics/kernels`. The build compiles it by itself.
 */
import type { DiagnoseOperations } from "./plain/diagnose.ts";
import type { MomentOperations } from "./plain/moments.ts";
import type { ReduceOperations } from "./plain/reduce.ts";
import type { RefineOperations } from "./plain/refine.ts";

/** All operations; addresses and sizes in bytes, counts in rows or columns. */
export interface Operations extends MomentOperations, RefineOperations, ReduceOperations, DiagnoseOperations {}

export interface Kernel {
  readonly name: "wasm" | "plain";
  readonly operations: Operations;
  /** Makes at least so many bytes usable and gives the first address. Views from before may be stale afterwards. */
  reserve(bytes: number): number;
  /** All memory as doubles. */
  readonly f64: Float64Array;
  /** All memory as codes. */
  readonly u16: Uint16Array;
}
