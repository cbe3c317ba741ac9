/** The power profile against the likelihood written out, and data whose power is known. */
import { describe, expect, test } from "vitest";
import { profilePower } from "../../src/numerics/powerProfile.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";
import { publishedSales } from "../fixtures/publishedSales.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

describe("on the published houses", () => {
  const { columns, price } = publishedSales("houseprices");
  const profile = profilePower(columns, price);
  const n = price.length;
  const lnSum = price.reduce((sum, y) => sum + Math.log(y), 0);

  /** Box & Cox 1964, equation 8, with the Jacobian apart. */
  function likelihood(power: number): number {
    const moved = price.map((y) => (power === 0 ? Math.log(y) : (y ** power - 1) / power));
    const { residualSumOfSquares } = solveLeastSquares(columns, moved, { intercept: true });
    return (-n / 2) * Math.log(residualSumOfSquares / n) + (power - 1) * lnSum;
  }

  test("differences along the curve are those of the likelihood with its Jacobian", () => {
    const top = likelihood(profile.best);
    for (const { power, logLikelihood } of profile.curve.filter((_, at) => at % 8 === 0)) {
      expect(logLikelihood / (likelihood(power) - top)).toBeCloseTo(1, 7);
    }
  });

  test("nothing near the best is better, and the ends lie χ²/2 below it", () => {
    const top = likelihood(profile.best);
    expect(likelihood(profile.best + 1e-3)).toBeLessThan(top);
    expect(likelihood(profile.best - 1e-3)).toBeLessThan(top);
    expect(top - likelihood(profile.low!)).toBeCloseTo(1.920729410347062, 5);
    expect(top - likelihood(profile.high!)).toBeCloseTo(1.920729410347062, 5);
  });
});

test.each([-1, 0, 0.5, 1])("a response made straight by the power %f has it in its interval", (power) => {
  const draw = drawFrom(21);
  const x = Float64Array.from({ length: 300 }, () => draw());
  const straight = x.map((v) => 4 + 2 * v + 0.3 * (draw() + draw() + draw() - 1.5));
  const y = straight.map((v) => (power === 0 ? Math.exp(v) : v ** (1 / power)));
  const { low, high } = profilePower([x], y);
  expect(low ?? -2).toBeLessThan(power);
  expect(high ?? 2).toBeGreaterThan(power);
});

test("another currency changes neither the best power nor its interval", () => {
  const { columns, price } = publishedSales("diamonds600");
  const one = profilePower(columns, price);
  const other = profilePower(
    columns,
    price.map((y) => 1e4 * y),
  );
  expect(other.best).toBeCloseTo(one.best, 5);
  expect(other.low).toBeCloseTo(one.low!, 6);
  expect(other.high).toBeCloseTo(one.high!, 6);
});

test("prices of zero and too few rows are refused", () => {
  const x = Float64Array.from([1, 2, 3, 4]);
  expect(() => profilePower([x], Float64Array.from([1, 0, 2, 3]))).toThrow(
    expect.objectContaining({ code: "notFinite", columns: [-1] }),
  );
  expect(() => profilePower([x.slice(0, 2)], x.slice(0, 2))).toThrow(expect.objectContaining({ code: "tooFewRows" }));
});
