// A kernel in TypeScript alone: slower, the same bits.
import type { Kernel } from "./kernel.ts";
import { diagnoseOperations } from "./plain/diagnose.ts";
import { momentOperations } from "./plain/moments.ts";
import type { PlainMemory } from "./plain/plainMemory.ts";
import { reduceOperations } from "./plain/reduce.ts";
import { refineOperations } from "./plain/refine.ts";

export function plainKernel(): Kernel {
  const memory: PlainMemory = { f64: new Float64Array(0), u16: new Uint16Array(0) };
  return {
    name: "plain",
    operations: {
      ...momentOperations(memory),
      ...refineOperations(memory),
      ...reduceOperations(memory),
      ...diagnoseOperations(memory),
    },
    reserve(bytes) {
      if (memory.f64.byteLength < bytes) {
        memory.f64 = new Float64Array(Math.ceil(bytes / 8));
        memory.u16 = new Uint16Array(memory.f64.buffer);
      }
      return 0;
    },
    get f64() {
      return memory.f64;
    },
    get u16() {
      return memory.u16;
    },
  };
}
