/**
 * Laws of moments: parts add up, rows come and go, weights count rows, choices equal their columns of zeros and ones; and what
 * is refused. Exact means and cross-products of whole numbers are worked out in whole-number arithmetic.
 */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  accumulateMoments,
  addRow,
  type Moments,
  mergeMoments,
  partsBy,
  removeRow,
} from "../../src/numerics/accumulateMoments.ts";
import { type Column, indicator, numbersOf, rowsOf, valueAt } from "../../src/numerics/column.ts";
import { drawColumns, drawWeights } from "./kernels/columns.ts";

const SETTINGS = { seed: 4711, numRuns: 30 };
const shapes = fc.record({
  seed: fc.integer({ min: 1, max: 1e6 }),
  rows: fc.integer({ min: 3, max: 5000 }),
  numbers: fc.integer({ min: 1, max: 7 }),
  levels: fc.constantFrom([], [2], [4], [5, 3], [6, 4, 2]),
});

/** S in the units of the columns, divided by the spreads: comparable whatever the scales. */
function expectSame(found: Moments, right: Moments, tolerance: number): void {
  const q = right.scales.length;
  expect(found.rowCount).toBe(right.rowCount);
  expect(Math.abs(found.weightSum - right.weightSum)).toBeLessThanOrEqual(tolerance * right.weightSum);
  const size = (m: Moments, j: number): number => m.scales[j]! * Math.sqrt(m.crossProducts[j * q + j]!);
  for (let j = 0; j < q; j++) {
    const spread = size(right, j);
    const mean = Math.abs(found.means[j]! - right.means[j]! + (found.meanTails[j]! - right.meanTails[j]!));
    expect(mean).toBeLessThanOrEqual(tolerance * (spread + Math.abs(right.means[j]!) * 2 ** -52));
    for (let k = 0; k < q; k++) {
      const at = j * q + k;
      const difference =
        found.crossProducts[at]! * found.scales[j]! * found.scales[k]! -
        right.crossProducts[at]! * right.scales[j]! * right.scales[k]!;
      expect(Math.abs(difference)).toBeLessThanOrEqual(tolerance * spread * size(right, k));
    }
  }
}

const rowAt = (columns: readonly Column[], i: number): number[] => columns.map((column) => valueAt(column, i));

describe("moments of parts", () => {
  test("merge to the moments of the whole", () => {
    fc.assert(
      fc.property(shapes, fc.double({ min: 0, max: 1, noNaN: true }), ({ seed, rows, numbers, levels }, at) => {
        const columns = drawColumns(seed, rows, numbers, levels);
        const cut = Math.min(rows - 1, 1 + Math.floor(at * (rows - 2)));
        const parts = [
          accumulateMoments(columns.map((column) => rowsOf(column, 0, cut))),
          accumulateMoments(columns.map((column) => rowsOf(column, cut, rows))),
        ];
        expectSame(mergeMoments(parts), accumulateMoments(columns), 1e-13);
      }),
      SETTINGS,
    );
  });

  test("by groups are those of each group's rows alone, and add up to all", () => {
    fc.assert(
      fc.property(shapes, ({ seed, rows, numbers, levels }) => {
        const columns = drawColumns(seed, rows, numbers, levels);
        const weights = drawWeights(seed, rows).fill(1, 0, 3);
        const groups = Uint16Array.from({ length: rows }, (_, i) => (i * i) % 5);
        const parts = partsBy(columns, groups, 6, weights);
        expect(parts).toHaveLength(6);
        expect(parts[5]!.rowCount).toBe(0);
        const inFirst = [...groups.keys()].filter((i) => groups[i] === 0 && weights[i]! > 0);
        const chosen = columns.map((column) => Float64Array.from(inFirst, (i) => valueAt(column, i)));
        const alone = accumulateMoments(chosen, { weights: Float64Array.from(inFirst, (i) => weights[i]!) });
        expectSame(parts[0]!, alone, 1e-13);
        expectSame(mergeMoments(parts), accumulateMoments(columns, { weights }), 1e-13);
      }),
      SETTINGS,
    );
  });
});

describe("one row", () => {
  test("that is added and removed again leaves the moments as they were", () => {
    fc.assert(
      fc.property(shapes, ({ seed, rows, numbers, levels }) => {
        const columns = drawColumns(seed, rows, numbers, levels);
        const whole = accumulateMoments(columns);
        const row = rowAt(columns, seed % rows);
        for (const weight of [1, 0.3, 0]) expectSame(removeRow(addRow(whole, row, weight), row, weight), whole, 1e-12);
      }),
      SETTINGS,
    );
  });

  test("that is added counts as if it had been there", () => {
    const columns = drawColumns(5, 400, 6, [4]);
    const weights = drawWeights(5, 400).fill(0.7, 399);
    const before = accumulateMoments(
      columns.map((column) => rowsOf(column, 0, 399)),
      { weights: weights.subarray(0, 399) },
    );
    expectSame(addRow(before, rowAt(columns, 399), 0.7), accumulateMoments(columns, { weights }), 1e-13);
  });

  test("cannot be removed when it is the last, nor have a weight below 0", () => {
    const one = accumulateMoments([Float64Array.of(4)]);
    expect(() => removeRow(one, [4])).toThrow(expect.objectContaining({ code: "tooFewRows" }));
    expect(() => addRow(one, [4], -1)).toThrow(expect.objectContaining({ code: "notFinite" }));
    expect(() => addRow(one, [4, 5])).toThrow(expect.objectContaining({ code: "shape" }));
  });
});

describe("weights", () => {
  test("of two count a row twice", () => {
    fc.assert(
      fc.property(shapes, ({ seed, rows, numbers, levels }) => {
        const columns = drawColumns(seed, rows, numbers, levels);
        const twice = accumulateMoments(
          columns.map((column) => {
            const values = numbersOf(column);
            return Float64Array.from({ length: 2 * rows }, (_, i) => values[i >> 1]!);
          }),
        );
        const found = accumulateMoments(columns, { weights: new Float64Array(rows).fill(2) });
        expectSame({ ...found, rowCount: 2 * rows }, twice, 1e-13);
      }),
      SETTINGS,
    );
  });

  test("of zero leave the row out, to the bit, whatever it holds", () => {
    const columns = drawColumns(9, 5000, 6, [5]);
    const weights = Float64Array.from({ length: 5000 }, (_, i) => (i % 3 === 1 ? 0 : 1));
    (columns[0] as Float64Array)[1] = 1e300;
    (columns[1] as Float64Array)[4] = Number.NaN;
    const kept = [...weights.keys()].filter((i) => weights[i] === 1);
    const numbers = columns.slice(0, 6).map((column) => Float64Array.from(kept, (i) => valueAt(column, i)));
    const codes = Uint16Array.from(kept, (i) => (columns[6] as ReturnType<typeof indicator>).codes[i]!);
    const alone = [...numbers, ...[1, 2, 3, 4].map((level) => indicator(codes, level))];
    expect(accumulateMoments(columns, { weights })).toStrictEqual(
      accumulateMoments(alone, { weights: new Float64Array(kept.length).fill(1) }),
    );
  });

  test("that lie on a few far rows keep the digits of those rows", () => {
    const column = Float64Array.from({ length: 1000 }, (_, i) => (i < 990 ? 1e9 * (i % 2) : i - 990));
    const weights = Float64Array.from({ length: 1000 }, (_, i) => (i < 990 ? 1e-40 : 1));
    const { means, scales, crossProducts } = accumulateMoments([column], { weights });
    expect(means[0]).toBeCloseTo(4.5, 12);
    expect(crossProducts[0]! * scales[0]! ** 2).toBeCloseTo(82.5, 11);
  });
});

describe("choices", () => {
  test("summed by groups equal their columns of zeros and ones", () => {
    fc.assert(
      fc.property(shapes, fc.boolean(), ({ seed, rows, numbers, levels }, isWeighted) => {
        const columns = drawColumns(seed, rows, numbers, levels);
        const options = isWeighted ? { weights: drawWeights(seed, rows).fill(1, 0, 1) } : {};
        expectSame(accumulateMoments(columns, options), accumulateMoments(columns.map(numbersOf), options), 1e-13);
      }),
      SETTINGS,
    );
  });

  test("with a level that all rows or none have make a constant column, exactly", () => {
    const codes = new Uint16Array(700).fill(2);
    const columns = [1, 2, 3].map((level) => indicator(codes, level));
    const number = Float64Array.from({ length: 700 }, (_, i) => 0.1 * i);
    const { means, crossProducts } = accumulateMoments([...columns, number]);
    expect([...means.subarray(0, 3)]).toEqual([0, 1, 0]);
    expect(crossProducts.filter((value) => value !== 0)).toHaveLength(1);
  });
});

describe("accuracy", () => {
  test("cross-products of whole numbers of up to seven figures are exact but for one rounding of each sum", () => {
    const rows = 3001;
    const x = Float64Array.from({ length: rows }, (_, i) => 1e7 + ((i * 7919) % 1000));
    const y = Float64Array.from({ length: rows }, (_, i) => (i * 104729) % 4096);
    const big = (values: Float64Array): bigint[] => [...values].map(BigInt);
    const sum = (values: readonly bigint[]): bigint => values.reduce((a, b) => a + b, 0n);
    const [bx, by] = [big(x), big(y)];
    const exact = BigInt(rows) * sum(bx.map((value, i) => value * by[i]!)) - sum(bx) * sum(by);
    const { scales, crossProducts } = accumulateMoments([x, y]);
    const found = crossProducts[1]! * scales[0]! * scales[1]!;
    expect(Math.abs(found / (Number(exact) / rows) - 1)).toBeLessThan(4e-15);
  });

  test("a million identical rows have spread exactly zero and scale one", () => {
    const columns = [new Float64Array(1e6).fill(0.1), new Float64Array(1e6).fill(1e15 / 3)];
    const { rowCount, weightSum, means, scales, crossProducts } = accumulateMoments(columns);
    expect([rowCount, weightSum]).toEqual([1e6, 1e6]);
    expect([...means]).toEqual([0.1, 1e15 / 3]);
    expect([...scales]).toEqual([1, 1]);
    expect([...crossProducts]).toEqual([0, 0, 0, 0]);
  });
});

describe("refused", () => {
  const column = Float64Array.of(1, 2, 3);
  test.each([
    ["no columns", [], undefined, "shape", []],
    ["no rows", [new Float64Array(0)], undefined, "shape", []],
    ["unequal lengths", [column, Float64Array.of(1)], undefined, "shape", [1]],
    ["values that are not numbers", [column, Float64Array.of(1, Number.NaN, 3)], undefined, "notFinite", [1]],
    ["infinite values", [Float64Array.of(1, Number.NEGATIVE_INFINITY, 3), column], undefined, "notFinite", [0]],
    ["another number of weights", [column], Float64Array.of(1, 1), "shape", []],
    ["a weight below zero", [column], Float64Array.of(1, -1, 1), "notFinite", []],
    ["a weight that is not a number", [column], Float64Array.of(1, Number.NaN, 1), "notFinite", []],
    ["weights beyond what can be added", [column], Float64Array.of(1e290, 1e290, 1), "notFinite", []],
    ["weights that are all zero", [column], new Float64Array(3), "tooFewRows", []],
  ] as const)("%s", (_, columns, weights, code, blamed) => {
    expect(() => accumulateMoments(columns, { weights })).toThrow(
      expect.objectContaining({ name: "NumericsError", code, columns: blamed }),
    );
  });
});
