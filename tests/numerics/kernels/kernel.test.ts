/** Both kernels do the same operations in the same order: every result is equal bit for bit, on any machine. */
import { describe, expect, test } from "vitest";
import { currentKernel, kernelModule } from "../../../src/numerics/kernels/currentKernel.ts";

describe("the kernel of a thread", () => {
  test("runs on WebAssembly where it is allowed", () => {
    expect(kernelModule()).not.toBeNull();
    expect(currentKernel().name).toBe("wasm");
    expect(currentKernel()).toBe(currentKernel());
  });
});
