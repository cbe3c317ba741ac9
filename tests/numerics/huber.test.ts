/** Huber's estimate against fixed points worked out elsewhere (tests/reference/README.md) and its own equations. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { huberEstimate } from "../../src/numerics/huber.ts";
import { weightedMedian } from "../../src/numerics/weightedMedian.ts";
import { frameOf, rawCoefficients } from "../../src/numerics/weightedSteps.ts";
import { publishedSales, readReference, worstDifference } from "../fixtures/publishedSales.ts";

describe.each([
  // The stored fixed points satisfy their own equations to 5e-12 and 1e-10.
  { name: "houseprices" as const, robust: "houseprices/robust.json", tolerance: 1e-10 },
  { name: "diamonds600" as const, robust: "diamonds600/expected.json", tolerance: 1e-10 },
])("on $name", ({ name, robust, tolerance }) => {
  const sales = publishedSales(name);
  const { huberM } = readReference(robust).robust;
  const found = huberEstimate(sales.columns, sales.lnPrice);

  test("coefficients and scale are those of the fixed point", () => {
    const frame = frameOf(sales.columns, sales.lnPrice.length, null);
    expect(worstDifference(rawCoefficients(frame, found.coefficients), sales.names, huberM.coefficients)).toBeLessThan(
      tolerance,
    );
    expect(Math.abs(found.scale / huberM.scale - 1)).toBeLessThan(tolerance);
    expect(found.hasSettled).toBe(true);
  });

  test("the same sales count less, down to the same least weight", () => {
    expect(found.robustness.filter((w) => w < 1)).toHaveLength(huberM.downweighted);
    expect(Math.abs(Math.min(...found.robustness) / huberM.minWeight - 1)).toBeLessThan(1e-9);
  });
});

test("equal weights change nothing, and whole weights do as repeated rows do", () => {
  const x = Float64Array.from([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  const y = Float64Array.from([1, 2.3, 2.9, 4.1, 5.3, 5.9, 7.2, 7.7, 19]);
  const plain = huberEstimate([x], y);
  const doubled = huberEstimate([x], y, { weights: new Float64Array(9).fill(2) });
  expect(doubled.scale).toBeCloseTo(plain.scale, 12);
  const counts = Float64Array.from([1, 2, 1, 3, 1, 1, 2, 1, 1]);
  const repeat = (values: Float64Array) => Float64Array.from([...values].flatMap((v, i) => Array(counts[i]!).fill(v)));
  const weighted = huberEstimate([x], y, { weights: counts });
  const repeated = huberEstimate([repeat(x)], repeat(y));
  expect(weighted.scale).toBeCloseTo(repeated.scale, 11);
});

test("sales that lie on the model exactly have scale zero and count in full", () => {
  const x = Float64Array.from([1, 2, 3, 4, 5]);
  const found = huberEstimate(
    [x],
    x.map((v) => 3 + 2 * v),
  );
  expect(found.scale).toBe(0);
  expect([...found.weights]).toEqual([1, 1, 1, 1, 1]);
});

test("columns that depend on each other and values that are no numbers are refused", () => {
  const x = Float64Array.from([1, 2, 3, 4, 5]);
  expect(() => huberEstimate([x, x.map((v) => 2 * v)], x)).toThrow(expect.objectContaining({ code: "rankDeficient" }));
  expect(() => huberEstimate([x], x.with(2, Number.NaN))).toThrow(expect.objectContaining({ code: "notFinite" }));
});

test("a weighted median with equal weights is the median", () => {
  fc.assert(
    fc.property(fc.float64Array({ minLength: 1, maxLength: 30, noNaN: true, min: -1e6, max: 1e6 }), (values) => {
      expect(weightedMedian(values, new Float64Array(values.length).fill(0.37))).toBeCloseTo(
        weightedMedian(values, null),
        9,
      );
    }),
    { seed: 4, numRuns: 200 },
  );
});
