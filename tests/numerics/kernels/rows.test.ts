/** The passes over rows: both kernels give the same bits, and the plain one is what the words say. */
import { describe, expect, test } from "vitest";
import { kernelModule } from "../../../src/numerics/kernels/currentKernel.ts";
import type { Kernel } from "../../../src/numerics/kernels/kernel.ts";
import { COLUMN_STRIDE } from "../../../src/numerics/kernels/layout.ts";
import { plainKernel } from "../../../src/numerics/kernels/plainKernel.ts";
import { wasmKernel } from "../../../src/numerics/kernels/wasmKernel.ts";
import { drawFrom } from "../../fixtures/randomClass.ts";

const COLUMNS = 9;
const SIZES = [1, 2, 3, 7, 8, 63, 255, 256, 257, 4095, 4096];
const BYTES = COLUMN_STRIDE * 8;

/** Fills a kernel's memory from a seed, runs the work, and gives back all of it. */
function memoryAfter(kernel: Kernel, rows: number, work: (kernel: Kernel, at: (column: number) => number) => void) {
  const start = kernel.reserve((COLUMNS + 4) * BYTES);
  const next = drawFrom(rows + 17);
  const at = (column: number): number => start + column * BYTES;
  for (let j = 0; j < COLUMNS + 4; j++) {
    kernel.f64.fill(0, at(j) / 8, at(j) / 8 + COLUMN_STRIDE);
    for (let i = 0; i < rows; i++) kernel.f64[at(j) / 8 + i] = (next() - 0.5) * 10 ** (j % 4);
  }
  for (let i = 0; i < rows; i++) kernel.u16[at(COLUMNS) / 2 + i] = Math.floor(next() * 5);
  work(kernel, at);
  return kernel.f64.slice(start / 8, start / 8 + (COLUMNS + 4) * COLUMN_STRIDE);
}

const WORKS: Record<string, (rows: number) => (kernel: Kernel, at: (column: number) => number) => void> = {
  "subtractProduct, settle and addProducts": (rows) => (kernel, at) => {
    const { operations, f64 } = kernel;
    for (const column of [0, 1, 2]) {
      const b = 1 / 3 + column;
      const t = 134217729 * b;
      const head = t - (t - b);
      operations.subtractProduct(at(column), rows, b, head, b - head, 1e-18, at(5), at(6));
    }
    operations.settle(rows, at(5), at(6));
    f64.fill(0, at(7) / 8, at(7) / 8 + 8);
    operations.addProducts(at(3), rows, at(5), at(6), at(7));
    operations.weightPairs(at(4), rows, at(5), at(6), at(1), at(2));
  },
  "subtractTable and addByCode": (rows) => (kernel, at) => {
    kernel.operations.subtractTable(at(COLUMNS), rows, at(1), at(5), at(6));
    kernel.f64.fill(0, at(7) / 8, at(7) / 8 + 12);
    kernel.operations.addByCode(at(COLUMNS), rows, at(5), at(6), at(7));
  },
  "centreColumn and scaleRows": (rows) => (kernel, at) => {
    kernel.operations.centreColumn(at(2), rows, 0.25, 1e-17, 0.5);
    kernel.operations.scaleRows(at(3), rows, at(4));
  },
  "foldTile, twice": (rows) => (kernel, at) => {
    const tile = Math.min(rows, 256);
    const r = at(COLUMNS + 1);
    kernel.f64.fill(0, r / 8, r / 8 + 49);
    kernel.operations.foldTile(r, at(0), 7, tile);
    kernel.operations.foldTile(r, at(1), 7, tile);
  },
  addSquaredForms: (rows) => (kernel, at) => {
    kernel.operations.addSquaredForms(at(0), 6, rows, at(7), at(8));
  },
};

describe("both kernels give the same bits", () => {
  const module = kernelModule()!;
  for (const [name, work] of Object.entries(WORKS)) {
    test.each(SIZES)(`${name}, %i rows`, (rows) => {
      const fast = memoryAfter(wasmKernel(module), rows, work(rows));
      const plain = memoryAfter(plainKernel(), rows, work(rows));
      expect(fast.findIndex((value, i) => !Object.is(value, plain[i]))).toBe(-1);
    });
  }
});

test("a folded triangle has the cross-products of its tiles", () => {
  const kernel = plainKernel();
  const rows = 200;
  const columns = 6;
  const before: number[][] = [];
  const memory = memoryAfter(kernel, rows, (own, at) => {
    for (let j = 0; j < columns; j++) before.push([...own.f64.slice(at(j) / 8, at(j) / 8 + rows)]);
    const r = at(COLUMNS + 1);
    own.f64.fill(0, r / 8, r / 8 + columns * columns);
    own.operations.foldTile(r, at(0), columns, rows);
  });
  const r = memory.subarray((COLUMNS + 1) * COLUMN_STRIDE);
  for (let j = 0; j < columns; j++) {
    for (let l = 0; l < columns; l++) {
      const expected = before[j]!.reduce((sum, x, i) => sum + x * before[l]![i]!, 0);
      let found = 0;
      for (let i = 0; i <= Math.min(j, l); i++) found += r[i * columns + j]! * r[i * columns + l]!;
      const size = Math.sqrt(before[j]!.reduce((s, x) => s + x * x, 0) * before[l]!.reduce((s, x) => s + x * x, 0));
      expect(Math.abs(found - expected)).toBeLessThan(1e-13 * size);
    }
  }
});
