/**
 * Natural cubic spline: cubic between knots, a straight line beyond the outer ones. Columns are made so that each coefficient
 * reads as something: δ_j is what the curve gains from knot j to knot j + 1.
 * Truncated power basis of Stone & Koo 1985, scaled as in Harrell 2015 (§2.4.5); quantiles of the knots from his table 2.3,
 * values from memory. Symbols: t knots (k), X basis (k − 1), M_mc = X_c(t_{m+1}) − X_c(t_m), N = X·M⁻¹.
 */
import { inverse, Matrix } from "ml-matrix";
import { NumericsError } from "./numericsError.ts";
import { quantileOfSorted } from "./quantile.ts";

const KNOT_QUANTILES: Readonly<Record<number, readonly number[]>> = {
  3: [0.1, 0.5, 0.9],
  4: [0.05, 0.35, 0.65, 0.95],
  5: [0.05, 0.275, 0.5, 0.725, 0.95],
  6: [0.05, 0.23, 0.41, 0.59, 0.77, 0.95],
  7: [0.025, 0.1833, 0.3417, 0.5, 0.6583, 0.8167, 0.975],
};

/** `count` knots at quantiles of the values. Refuses (rankDeficient) when fewer than `count` of them differ. */
export function splineKnots(values: Float64Array, count: number): number[] {
  const quantiles = KNOT_QUANTILES[count];
  if (quantiles === undefined) throw new NumericsError("shape", `${count} knots where 3 to 7 were expected`);
  const sorted = Float64Array.from(values).sort();
  const knots = quantiles.map((p) => quantileOfSorted(sorted, p));
  const distinct = new Set(knots).size;
  if (distinct < count) throw new NumericsError("rankDeficient", `only ${distinct} of ${count} knots differ`);
  return knots;
}

/** x → N(x), k − 1 numbers that are 0 at the first knot; the coefficient of the j-th is f(t_{j+1}) − f(t_j). */
export function naturalSpline(knots: readonly number[]): (x: number) => number[] {
  const size = knots.length - 1;
  const basis = truncatedPowers(knots);
  const atKnots = knots.map(basis);
  const gains = Matrix.zeros(size, size);
  for (let m = 0; m < size; m++) {
    for (let c = 0; c < size; c++) gains.set(m, c, atKnots[m + 1]![c]! - atKnots[m]![c]!);
  }
  const back = inverse(gains);
  return (x) => {
    const moved = basis(x).map((value, c) => value - atKnots[0]![c]!);
    return Array.from({ length: size }, (_, j) => moved.reduce((sum, value, c) => sum + value * back.get(c, j), 0));
  };
}

/** The columns N of a spline over n values, `count` of them. */
export function splineColumns(at: (x: number) => number[], values: Float64Array, count: number): Float64Array[] {
  const columns = Array.from({ length: count }, () => new Float64Array(values.length));
  for (let i = 0; i < values.length; i++) {
    const row = at(values[i]!);
    for (let j = 0; j < count; j++) columns[j]![i] = row[j]!;
  }
  return columns;
}

/** x − t₁ and k − 2 cubic pieces, each linear beyond the last knot. */
function truncatedPowers(knots: readonly number[]): (x: number) => number[] {
  const first = knots[0]!;
  const last = knots.at(-1)!;
  const before = knots.at(-2)!;
  const cube = (x: number): number => (x > 0 ? x * x * x : 0);
  const scale = (last - first) ** 2;
  return (x) => [
    x - first,
    ...knots.slice(0, -2).map((t) => {
      const pull = cube(x - before) * (last - t) - cube(x - last) * (before - t);
      return (cube(x - t) - pull / (last - before)) / scale;
    }),
  ];
}
