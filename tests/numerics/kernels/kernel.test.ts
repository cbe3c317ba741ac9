/** Both kernels do the same operations in the same order: every result is equal bit for bit, on any machine. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { planColumns } from "../../../src/numerics/kernels/columnPlan.ts";
import { currentKernel, kernelModule } from "../../../src/numerics/kernels/currentKernel.ts";
import { BLOCK_ROWS } from "../../../src/numerics/kernels/layout.ts";
import type { Rows } from "../../../src/numerics/kernels/loadBlock.ts";
import { plainKernel } from "../../../src/numerics/kernels/plainKernel.ts";
import { partCount, partMoments } from "../../../src/numerics/kernels/sumParts.ts";
import { wasmKernel } from "../../../src/numerics/kernels/wasmKernel.ts";
import { rowsOfWeight } from "../../../src/numerics/rowsOfWeight.ts";
import { drawColumns, drawWeights } from "./columns.ts";

const wasm = wasmKernel(kernelModule()!);
const plain = plainKernel();

const EDGES = [1, 2, 3, 7, 8, 9, 255, 256, 257, BLOCK_ROWS - 1, BLOCK_ROWS, BLOCK_ROWS + 1, 65535, 65536, 65537];
const MIXES: readonly (readonly [numbers: number, levels: readonly number[]])[] = [
  [1, []],
  [6, []],
  [7, [4]],
  [0, [5, 6]],
  [3, [2, 2, 3]],
  [5, [25, 16, 4]],
];

function bothKernels(rowCount: number, mix: (typeof MIXES)[number], isWeighted: boolean): void {
  const columns = drawColumns(rowCount + mix[0], rowCount, mix[0], mix[1]);
  const weights = isWeighted ? drawWeights(rowCount, rowCount).fill(1, 0, 1) : undefined;
  const rows: Rows = weights === undefined ? { start: 0, end: rowCount } : rowsOfWeight(weights);
  const plan = planColumns(columns);
  for (let part = 0; part < partCount(rows); part++) {
    const task = { columns, weights, rows };
    expect(partMoments(wasm, plan, task, part)).toStrictEqual(partMoments(plain, plan, task, part));
  }
}

describe("the kernel of a thread", () => {
  test("runs on WebAssembly where it is allowed", () => {
    expect(kernelModule()).not.toBeNull();
    expect(currentKernel().name).toBe("wasm");
    expect(currentKernel()).toBe(currentKernel());
  });
});

describe("both kernels give the same bits", () => {
  test.each(EDGES)("on %i rows, around the edges of lanes, tiles and blocks", (rowCount) => {
    const mixes = rowCount < 1000 ? MIXES : MIXES.slice(2, 3);
    for (const mix of mixes) for (const isWeighted of [false, true]) bothKernels(rowCount, mix, isWeighted);
  });

  test("on drawn sizes and mixes of columns", () => {
    const shape = fc.record({
      rowCount: fc.integer({ min: 1, max: 9000 }),
      mix: fc.constantFrom(...MIXES),
      isWeighted: fc.boolean(),
    });
    fc.assert(
      fc.property(shape, ({ rowCount, mix, isWeighted }) => bothKernels(rowCount, mix, isWeighted)),
      { seed: 20261, numRuns: 25 },
    );
  });

  test("on values that no double holds any more when they are summed or squared", () => {
    const columns = [
      Float64Array.from({ length: 300 }, (_, i) => (i % 3 === 0 ? 1.2e308 : 0.9e308)),
      Float64Array.from({ length: 300 }, (_, i) => 1e-200 * i),
      Float64Array.from({ length: 300 }, (_, i) => 1e200 * i),
    ];
    const task = { columns, weights: undefined, rows: { start: 0, end: 300 } };
    const moments = partMoments(wasm, planColumns(columns), task, 0)!;
    expect(moments).toStrictEqual(partMoments(plain, planColumns(columns), task, 0));
    expect(moments.crossProducts.every((value) => Number.isFinite(value))).toBe(true);
    expect(moments.means[0]).toBeCloseTo(1e308, -294);
  });
});
