/** Partial pooling against the closed form of the balanced one-way layout, and laws that hold at its maximum. */
import { describe, expect, test } from "vitest";
import { NO_DIFFERENCE, poolLevels } from "../../src/numerics/partialPooling.ts";
import { frameOf, rawCoefficients, weightedStep } from "../../src/numerics/weightedSteps.ts";
import { drawFrom } from "../fixtures/randomClass.ts";

const LEVELS = 6;
const PER_LEVEL = 5;

function oneWay(spread: number) {
  const draw = drawFrom(2);
  const level = Array.from({ length: LEVELS * PER_LEVEL }, (_, i) => i % LEVELS);
  const effect = Array.from({ length: LEVELS }, () => spread * (draw() - 0.5));
  const y = Float64Array.from(level, (l) => 50 + effect[l]! + 4 * (draw() - 0.5));
  const columns = effect.map((_, l) => Float64Array.from(level, (one) => (one === l ? 1 : 0)));
  const means = effect.map((_, l) => y.filter((_, i) => level[i] === l).reduce((sum, v) => sum + v, 0) / PER_LEVEL);
  const mean = y.reduce((sum, v) => sum + v, 0) / y.length;
  const within = y.reduce((sum, v, i) => sum + (v - means[level[i]!]!) ** 2, 0) / (LEVELS * (PER_LEVEL - 1));
  const between = (PER_LEVEL * means.reduce((sum, m) => sum + (m - mean) ** 2, 0)) / (LEVELS - 1);
  return { y, columns, means, mean, within, tau2: (between - within) / PER_LEVEL, all: [...columns.keys()] };
}

function fitAt(columns: Float64Array[], y: Float64Array, penalty: Float64Array) {
  const frame = frameOf(columns, y.length, penalty);
  const b = weightedStep(frame, null, y, new Float64Array(columns.length + 1));
  return rawCoefficients(frame, b);
}

describe("balanced one-way layout (Searle, Casella & McCulloch 1992, chapter 4, from memory)", () => {
  const { y, columns, means, mean, within, tau2, all } = oneWay(10);
  const { groups, residualVariance } = poolLevels(columns, y, [all]);

  test("the variances are those of the mean squares", () => {
    expect(residualVariance / within).toBeCloseTo(1, 10);
    expect(groups[0]!.spread / Math.sqrt(tau2)).toBeCloseTo(1, 10);
    expect(groups[0]!.penalty / (within / tau2)).toBeCloseTo(1, 10);
  });

  test("least squares with that penalty draws every level to the mean by mτ²/(mτ² + σ²)", () => {
    const { slopes, intercept } = fitAt(columns, y, new Float64Array(LEVELS).fill(groups[0]!.penalty));
    const factor = (PER_LEVEL * tau2) / (PER_LEVEL * tau2 + within);
    expect(intercept).toBeCloseTo(mean, 10);
    for (const [l, slope] of slopes.entries()) expect(slope).toBeCloseTo(factor * (means[l]! - mean), 10);
    expect(slopes.reduce((sum, b) => sum + b, 0)).toBeCloseTo(0, 10);
  });
});

test("levels that differ by no more than chance are all drawn to the mean", () => {
  const { y, columns, all, tau2 } = oneWay(0);
  expect(tau2).toBeLessThan(0);
  const [group] = poolLevels(columns, y, [all]).groups;
  expect(group).toMatchObject({ spread: 0, penalty: NO_DIFFERENCE * y.length });
  const { slopes } = fitAt(columns, y, new Float64Array(LEVELS).fill(group!.penalty));
  for (const slope of slopes) expect(Math.abs(slope)).toBeLessThan(1e-8);
});

test("beside other columns and a second choice, no λ near the one found has a higher restricted likelihood", () => {
  const draw = drawFrom(9);
  const n = 160;
  const make = Array.from({ length: n }, () => Math.floor(9 * draw() * draw()));
  const dealer = Array.from({ length: n }, () => Math.floor(5 * draw()));
  const x = Float64Array.from({ length: n }, () => draw());
  const y = Float64Array.from({ length: n }, (_, i) => 3 * x[i]! + Math.sin(7 * make[i]!) + dealer[i]! / 4 + draw());
  const levels = (codes: number[], count: number) =>
    Array.from({ length: count }, (_, l) => Float64Array.from(codes, (one) => (one === l ? 1 : 0)));
  const columns = [x, ...levels(make, 9), ...levels(dealer, 5)];
  const sets = [
    [1, 2, 3, 4, 5, 6, 7, 8, 9],
    [10, 11, 12, 13, 14],
  ];
  const { groups, hasSettled } = poolLevels(columns, y, sets);
  expect(hasSettled).toBe(true);
  const penalties = groups.map((group) => group.penalty);
  const best = deviance(columns, y, sets, penalties);
  for (const factor of [0.9, 0.999, 1.001, 1.1]) {
    for (const at of [0, 1]) {
      expect(deviance(columns, y, sets, penalties.with(at, penalties[at]! * factor))).toBeGreaterThan(best);
    }
  }
});

/** −2ℓ from the covariance of the responses, V = I + Σ ZZ′/λ, written out: (n − p)ln(y′Py) + ln|V| + ln|X′V⁻¹X|. */
function deviance(columns: Float64Array[], y: Float64Array, sets: number[][], penalties: number[]): number {
  const n = y.length;
  const pooled = new Set(sets.flat());
  const fixed = [new Float64Array(n).fill(1), ...columns.filter((_, j) => !pooled.has(j))];
  const v = Array.from({ length: n }, (_, i) =>
    Float64Array.from({ length: n }, (_, j) =>
      sets.reduce(
        (sum, set, at) => sum + set.reduce((s, c) => s + columns[c]![i]! * columns[c]![j]!, 0) / penalties[at]!,
        i === j ? 1 : 0,
      ),
    ),
  );
  const { rows: vRest, logDeterminant } = eliminate(v, [...fixed, y], n);
  const p = fixed.length;
  const inner = eliminate(
    vRest.slice(0, p).map((row) => row.slice(0, p)),
    [vRest.map((row) => row[p]!).slice(0, p)],
    p,
  );
  const rss = vRest[p]![p]! - inner.rows[0]![0]!;
  return (n - p) * Math.log(rss) + logDeterminant + inner.logDeterminant;
}

/** ln|A| and B′A⁻¹B for the columns B, by Cholesky. */
function eliminate(a: ArrayLike<number>[], b: ArrayLike<number>[], n: number) {
  const l = Array.from({ length: n }, () => new Float64Array(n));
  let logDeterminant = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let s = a[i]![j]!;
      for (let m = 0; m < j; m++) s -= l[i]![m]! * l[j]![m]!;
      l[i]![j] = i === j ? Math.sqrt(s) : s / l[j]![j]!;
    }
    logDeterminant += 2 * Math.log(l[i]![i]!);
  }
  const solved = b.map((column) => {
    const u = Float64Array.from({ length: n }, (_, i) => column[i]!);
    for (let i = 0; i < n; i++) {
      for (let m = 0; m < i; m++) u[i]! -= l[i]![m]! * u[m]!;
      u[i]! /= l[i]![i]!;
    }
    return u;
  });
  const rows = solved.map((u) => Float64Array.from(solved, (w) => u.reduce((s, value, i) => s + value * w[i]!, 0)));
  return { rows, logDeterminant };
}

test("responses that the levels fit exactly are left as they are", () => {
  const level = [0, 0, 1, 1, 2, 2, 2];
  const columns = [0, 1, 2].map((l) => Float64Array.from(level, (one) => (one === l ? 1 : 0)));
  const y = Float64Array.from(level, (l) => 3 + l * l);
  const [group] = poolLevels(columns, y, [[0, 1, 2]]).groups;
  const { slopes } = fitAt(columns, y, new Float64Array(3).fill(group!.penalty));
  expect(slopes[2]! - slopes[0]!).toBeCloseTo(4, 8);
});

test("too few rows beside the other columns are refused", () => {
  const one = Float64Array.from([1, 0]);
  expect(() => poolLevels([one, one.map((v) => 1 - v), Float64Array.from([3, 5])], one, [[0, 1]])).toThrow(
    expect.objectContaining({ code: "tooFewRows" }),
  );
});
