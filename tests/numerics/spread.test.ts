/** The size of deviations, and the power of two next to it. */
import { describe, expect, test } from "vitest";
import { powerOfTwoNear, rootMeanSquare } from "../../src/numerics/spread.ts";

describe("powerOfTwoNear", () => {
  test.each([
    [1, 1],
    [1.4142135623730949, 1],
    [Math.SQRT2, 2],
    [2.8, 2],
    [3, 4],
    [0.7, 0.5],
    [0.71, 1],
    [1000, 1024],
    [1e-3, 2 ** -10],
    [Number.MAX_VALUE, 2 ** 1000],
    [Number.MIN_VALUE, 2 ** -1000],
    [0, 1],
    [-4, 1],
    [Number.NaN, 1],
    [Number.POSITIVE_INFINITY, 1],
  ])("of %f is %f", (size, power) => {
    expect(powerOfTwoNear(size)).toBe(power);
  });

  test("of every power of two from 2^−1000 to 2^1000 is itself", () => {
    const powers = Array.from({ length: 2001 }, (_, at) => 2 ** (at - 1000));
    expect(powers.map(powerOfTwoNear)).toEqual(powers);
  });
});

describe("rootMeanSquare", () => {
  test("is taken around the centre given, tail and all", () => {
    expect(rootMeanSquare(Float64Array.of(1, 3, 5), 3, 0)).toBeCloseTo(Math.sqrt(8 / 3), 15);
    expect(rootMeanSquare(Float64Array.of(7, 7), 7, 0)).toBe(0);
    expect(rootMeanSquare(Float64Array.of(1, 1), 0.5, 0.25)).toBe(0.25);
  });

  test("neither overflows nor vanishes", () => {
    expect(rootMeanSquare(Float64Array.of(-1e300, 1e300), 0, 0)).toBe(1e300);
    expect(rootMeanSquare(Float64Array.of(-1e-300, 1e-300), 0, 0)).toBe(1e-300);
  });
});
