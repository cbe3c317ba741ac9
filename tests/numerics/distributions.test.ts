/** Every distribution function against tests/reference/distributions (50-digit mpmath): 12 digits over the whole grid. */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import {
  chiSquaredCdf,
  chiSquaredQuantile,
  chiSquaredUpperQuantile,
  chiSquaredUpperTail,
} from "../../src/numerics/chiSquared.ts";
import { fCdf, fQuantile, fUpperQuantile, fUpperTail } from "../../src/numerics/fDistribution.ts";
import { normalCdf, normalQuantile, normalUpperQuantile, normalUpperTail } from "../../src/numerics/normal.ts";
import { tUpperQuantile, tUpperTail } from "../../src/numerics/studentT.ts";

type Rows = string[][];
const path = new URL("../reference/distributions/distributions.json", import.meta.url);
const grid = JSON.parse(readFileSync(path, "utf8")) as Record<string, Record<string, Rows>>;

function worst(rows: Rows, found: (values: number[]) => number): { error: number; at: string } {
  let most = { error: 0, at: "" };
  for (const row of rows) {
    const values = row.map(Number);
    const exact = values.at(-1)!;
    const error = exact === 0 ? Math.abs(found(values)) : Math.abs(found(values) / exact - 1);
    if (!(error <= most.error)) most = { error, at: row.join(" ") };
  }
  return most;
}

/** 1 − p of the decimal p: of the double, the digits of a small tail are lost. */
function tailOf(p: number): number {
  return Number((1 - p).toFixed(12));
}

const checks: [string, Rows, (v: number[]) => number][] = [
  ["normal tails", grid.normal!.tail!, ([z]) => normalUpperTail(z!)],
  ["normal tails, mirrored", grid.normal!.tail!, ([z]) => normalCdf(-z!)],
  [
    "normal quantiles",
    grid.normal!.quantile!,
    ([p]) => (p! > 0.5 ? normalUpperQuantile(tailOf(p!)) : normalQuantile(p!)),
  ],
  ["t tails", grid.t!.tail!.map((row) => row.slice(0, 3)), ([df, t]) => tUpperTail(t!, df!)],
  [
    "t quantiles",
    grid.t!.quantile!,
    ([df, p]) => (p! > 0.5 ? tUpperQuantile(tailOf(p!), df!) : -tUpperQuantile(p!, df!)),
  ],
  ["chi-squared tails", grid.chi2!.tail!, ([df, x]) => chiSquaredUpperTail(x!, df!)],
  [
    "chi-squared quantiles",
    grid.chi2!.quantile!,
    ([df, p]) => (p! > 0.5 ? chiSquaredUpperQuantile(tailOf(p!), df!) : chiSquaredQuantile(p!, df!)),
  ],
  ["F tails", grid.F!.tail!, ([a, b, x]) => fUpperTail(x!, a!, b!)],
  [
    "F quantiles",
    grid.F!.quantile!,
    ([a, b, p]) => (p! > 0.5 ? fUpperQuantile(tailOf(p!), a!, b!) : fQuantile(p!, a!, b!)),
  ],
];

test.each(checks)("%s are right to 12 digits over the whole grid", (_, rows, found) => {
  const most = worst(rows, found);
  expect(rows.length).toBeGreaterThan(10);
  expect(most.error, most.at).toBeLessThan(1e-12);
});

test("quantiles asked by an upper tail give that tail back, however small", () => {
  for (const tail of [1e-200, 1e-20, 1e-6, 0.1, 0.4, 0.6, 0.99]) {
    expect(normalUpperTail(normalUpperQuantile(tail)) / tail).toBeCloseTo(1, 11);
    for (const df of [0.5, 1, 7, 300, 10000])
      expect(chiSquaredUpperTail(chiSquaredUpperQuantile(tail, df), df) / tail).toBeCloseTo(1, 11);
    expect(fUpperTail(fUpperQuantile(tail, 3, 40), 3, 40) / tail).toBeCloseTo(1, 11);
  }
});

test("lower tails are computed directly: of F(2, 2) it is f/(1 + f), of chi-squared with 2 degrees −expm1(−x/2)", () => {
  for (const x of [1e-30, 1e-9, 0.2, 3]) {
    expect(fCdf(x, 2, 2) / (x / (1 + x))).toBeCloseTo(1, 13);
    expect(chiSquaredCdf(x, 2) / -Math.expm1(-x / 2)).toBeCloseTo(1, 13);
  }
});
