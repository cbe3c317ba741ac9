/** Upper tails against closed forms. */
import { expect, test } from "vitest";
import { chiSquaredUpperTail, fUpperTail } from "../../src/numerics/testTails.ts";

test("chi-squared with 2 is e^(−x/2), and with 4 (1 + x/2)e^(−x/2)", () => {
  for (const x of [0.1, 1, 9, 60, 300]) {
    expect(chiSquaredUpperTail(x, 2) / Math.exp(-x / 2)).toBeCloseTo(1, 13);
    expect(chiSquaredUpperTail(x, 4) / ((1 + x / 2) * Math.exp(-x / 2))).toBeCloseTo(1, 13);
  }
});

// P(χ²₁ > 1.96²) by the error function: 0.04999579029644087 (Abramowitz & Stegun 26.2).
test("chi-squared with 1 is the two-sided normal tail", () => {
  expect(chiSquaredUpperTail(1.96 ** 2, 1) / 0.04999579029644087).toBeCloseTo(1, 12);
});

test("F with 2 and b is (1 + 2f/b)^(−b/2)", () => {
  for (const f of [0.01, 1, 5, 40]) expect(fUpperTail(f, 2, 30) / (1 + f / 15) ** -15).toBeCloseTo(1, 12);
});

test("nothing found is no evidence: the tail from 0 is 1", () => {
  for (const df of [1, 2, 3, 8]) expect(chiSquaredUpperTail(0, df)).toBe(1);
  expect(fUpperTail(0, 2, 30)).toBe(1);
});
