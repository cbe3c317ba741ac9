/** Columns of many rows lie on memory that threads share, with the same values; few rows stay as they are. */
import { describe, expect, test } from "vitest";
import { type Indicator, indicator } from "../../src/numerics/column.ts";
import { doubles, sharedColumns, sharedNumbers } from "../../src/numerics/sharedMemory.ts";

const MANY = 100_000;
const isShared = (values: Float64Array | Uint16Array): boolean => values.buffer instanceof SharedArrayBuffer;

describe("shared memory", () => {
  test("is taken from 100,000 rows on", () => {
    expect(isShared(doubles(MANY))).toBe(true);
    expect(isShared(doubles(MANY - 1))).toBe(false);
    expect(doubles(MANY)).toHaveLength(MANY);
  });

  test("holds the same numbers, copied once", () => {
    const values = Float64Array.from({ length: MANY }, (_, i) => 1 / (i - 3));
    const shared = sharedNumbers(values);
    expect(isShared(shared)).toBe(true);
    expect(shared.every((value, i) => Object.is(value, values[i]))).toBe(true);
    expect(sharedNumbers(shared)).toBe(shared);
    const few = values.slice(0, 5);
    expect(sharedNumbers(few)).toBe(few);
  });

  test("keeps levels of one choice on the same codes, and those of two apart", () => {
    const one = new Uint16Array(MANY).map((_, i) => i % 3);
    const two = one.slice();
    const columns = sharedColumns([indicator(one, 1), indicator(one, 2), indicator(two, 1)]) as Indicator[];
    expect(columns[0]!.codes).toBe(columns[1]!.codes);
    expect(columns[2]!.codes).not.toBe(columns[0]!.codes);
    expect(columns.map(({ level }) => level)).toEqual([1, 2, 1]);
    expect(isShared(columns[0]!.codes)).toBe(true);
    expect(columns[0]!.codes.every((code, i) => code === one[i])).toBe(true);
  });
});
