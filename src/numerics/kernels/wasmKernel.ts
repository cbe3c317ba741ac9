// A kernel on WebAssembly: an instance of the compiled assembly sources with memory of its own.
import type { Kernel, Operations } from "./kernel.ts";

const PAGE_BYTES = 65536;

type Exports = Operations & { readonly memory: WebAssembly.Memory; workspaceStart(): number };

/** A kernel of a compiled module; every thread makes its own. */
export function wasmKernel(module: WebAssembly.Module): Kernel {
  const instance = new WebAssembly.Instance(module, { env: { abort: refuse } });
  const operations = instance.exports as unknown as Exports;
  const { memory } = operations;
  const start = operations.workspaceStart();
  let f64 = new Float64Array(memory.buffer);
  let u16 = new Uint16Array(memory.buffer);
  return {
    name: "wasm",
    operations,
    reserve(bytes) {
      const missing = start + bytes - memory.buffer.byteLength;
      if (missing > 0) memory.grow(Math.ceil(missing / PAGE_BYTES));
      if (f64.buffer !== memory.buffer) {
        f64 = new Float64Array(memory.buffer);
        u16 = new Uint16Array(memory.buffer);
      }
      return start;
    },
    get f64() {
      return f64;
    },
    get u16() {
      return u16;
    },
  };
}

function refuse(): never {
  throw new Error("the kernel stopped");
}
