// The kernel of this thread: WebAssembly where it may run, else plain TypeScript.
import binary from "./assembly/index.ts?wasm";
import type { Kernel } from "./kernel.ts";
import { plainKernel } from "./plainKernel.ts";
import { wasmKernel } from "./wasmKernel.ts";

let module: WebAssembly.Module | null | undefined;
let kernel: Kernel | undefined;

/** The kernel of this thread, made at the first call. */
export function currentKernel(): Kernel {
  if (kernel === undefined) {
    const compiled = kernelModule();
    kernel = compiled === null ? plainKernel() : wasmKernel(compiled);
  }
  return kernel;
}

/** The compiled module, to hand to another thread; null where WebAssembly or its SIMD is not allowed. */
export function kernelModule(): WebAssembly.Module | null {
  if (module === undefined) module = compileModule();
  return module;
}

function compileModule(): WebAssembly.Module | null {
  try {
    return new WebAssembly.Module(Uint8Array.from(atob(binary), (letter) => letter.charCodeAt(0)));
  } catch {
    return null;
  }
}
