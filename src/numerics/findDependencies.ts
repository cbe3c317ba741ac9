/**
 * Exact linear dependencies among columns, in the order the columns stand: an earlier column is kept, a later one that is
 * a combination of kept ones (and the constant) is dependent. The rows of centred, scaled columns are reduced to a triangle, and
 * Gram–Schmidt goes over its columns, each projection done twice (Giraud, Langou & Rozložník 2005); then the coefficients are
 * read off and made as simple as they can be.
 * A column depends on others when what is left of it is below RELATIVE_TOLERANCE of its centred length, plus what storing
 * its values as doubles may have cost. 1.36 × kW, exact in decimals only, is found; kW rounded to a whole hp is not.
 */

import { accumulateMoments, type Moments } from "./accumulateMoments.ts";
import { type Centring, centringOf, storedError } from "./centring.ts";
import { choleskyFactor, invertUpper, scaledCondition, timesOwnTranspose } from "./choleskyFactor.ts";
import { type Column, numbersOf } from "./column.ts";
import { reduceRows } from "./reduceRows.ts";
import { type Ratio, simplestRatio } from "./simplestRatio.ts";

export interface DependencyTerm {
  readonly column: number;
  readonly coefficient: number;
  /** The coefficient as a ratio of small whole numbers, where one reproduces the column. */
  readonly ratio: Ratio | null;
}

export interface Dependency {
  readonly column: number;
  readonly constant: number;
  readonly terms: readonly DependencyTerm[];
  /** Largest |difference| between the column and the equation, relative to the column's largest value. */
  readonly exactness: number;
}

export interface Dependencies {
  readonly kept: readonly number[];
  readonly dependent: readonly Dependency[];
}

export interface DependencyOptions {
  readonly intercept: boolean;
  readonly relativeTolerance?: number;
  /** Of exactly these columns, when they are at hand already. */
  readonly moments?: Moments;
}

export const RELATIVE_TOLERANCE = 1e-11;
/** A coefficient whose column would move the dependent one by less than this share of its length is none. */
const NO_PART = 1e-8;

/** Kept columns and one equation per dependent one. Refuses shape and notFinite. A constant column has only a constant. */
export function findDependencies(given: readonly Column[], options: DependencyOptions): Dependencies {
  // A choice of one level makes no column: a model of nothing else has none to compare, which is no error.
  if (given.length === 0) return { kept: [], dependent: [] };
  const moments = options.moments ?? accumulateMoments(given);
  if (areClearlyIndependent(moments, options)) return { kept: [...given.keys()], dependent: [] };
  const centring = centringOf(moments, options.intercept);
  const centred = triangleOf(given, centring);
  const columns = given.map(numbersOf);
  const basis: Basis = { vectors: [], rows: [], columns: [] };
  const dependent: Dependency[] = [];
  columns.forEach((column, j) => {
    const z = centred[j]!;
    const length = Math.sqrt(dotOf(z, z));
    const stored = (storedError(given[j]!) / centring.scales[j]!) * Math.sqrt(column.length) * 4;
    const floor = Math.max((options.relativeTolerance ?? RELATIVE_TOLERANCE) * length, stored);
    const parts = project(basis, z);
    const rest = Math.sqrt(dotOf(parts.rest, parts.rest));
    if (rest > floor) {
      basis.vectors.push(parts.rest.map((value) => value / rest));
      basis.rows.push([...parts.coordinates, rest]);
      basis.columns.push(j);
    } else {
      dependent.push(
        describe(columns, j, combine(basis, parts.coordinates, length, centred), centring, options.intercept),
      );
    }
  });
  return { kept: basis.columns, dependent };
}

/**
 * The columns of R with Z = QR, Z centred and scaled: k numbers stand for n rows, as lengths and angles among them are those
 * among the columns of Z.
 */
function triangleOf(columns: readonly Column[], centring: Centring): Float64Array[] {
  const q = columns.length + 1;
  const none = {
    means: [...centring.means, { hi: 0, lo: 0 }],
    spreads: centring.spreads,
    scales: Float64Array.of(...centring.scales, 1),
  };
  const r = reduceRows(columns, new Float64Array(columns[0]!.length), none, null, null);
  return columns.map((_, j) => Float64Array.from({ length: q }, (__, i) => (i <= j ? r[i * q + j]! : 0)));
}

/** What is left of a column beside the others is at least its length over the condition number; far from what is looked for. */
const CLEAR_CONDITION = 1e5;
/** A column whose mean is this much larger than its spread may have lost what tells it apart to its own storing. */
const FAR_OFFSET = 1e5;

/** Whether the moments alone rule every dependency out: positive pivots, a modest condition number, no far offset. */
function areClearlyIndependent(moments: Moments, { intercept, relativeTolerance }: DependencyOptions): boolean {
  if (!intercept || (relativeTolerance ?? 0) > 1e-8) return false;
  const { crossProducts, means, scales } = moments;
  const k = scales.length;
  if (means.some((mean, j) => Math.abs(mean) > FAR_OFFSET * scales[j]!)) return false;
  const r = choleskyFactor(crossProducts, k, 1e-12);
  if (typeof r === "number") return false;
  return scaledCondition(crossProducts, timesOwnTranspose(invertUpper(r, k), k), k) < CLEAR_CONDITION;
}

interface Basis {
  /** Orthonormal, one per kept column. */
  readonly vectors: Float64Array[];
  /** R by kept column: coordinates on the earlier vectors and on its own. */
  readonly rows: number[][];
  readonly columns: number[];
}

function project(basis: Basis, z: Float64Array): { rest: Float64Array; coordinates: number[] } {
  const rest = Float64Array.from(z);
  const coordinates = basis.vectors.map(() => 0);
  for (let pass = 0; pass < 2; pass++) {
    basis.vectors.forEach((q, at) => {
      const share = dotOf(q, rest);
      coordinates[at]! += share;
      for (let i = 0; i < rest.length; i++) rest[i]! -= share * q[i]!;
    });
  }
  return { rest, coordinates };
}

/** Coefficients on the centred, scaled kept columns, by back substitution; none where its part would be too small to matter. */
function combine(
  basis: Basis,
  coordinates: readonly number[],
  length: number,
  centred: readonly Float64Array[],
): { column: number; coefficient: number }[] {
  const k = basis.columns.length;
  const solved = new Array<number>(k).fill(0);
  for (let a = k - 1; a >= 0; a--) {
    let value = coordinates[a]!;
    for (let b = a + 1; b < k; b++) value -= basis.rows[b]![a]! * solved[b]!;
    solved[a] = value / basis.rows[a]![a]!;
  }
  return solved
    .map((coefficient, a) => ({ column: basis.columns[a]!, coefficient }))
    .filter(({ column, coefficient }) => {
      if (coefficient === 0) return false;
      const z = centred[column]!;
      return Math.abs(coefficient) * Math.sqrt(dotOf(z, z)) >= NO_PART * length;
    });
}

function describe(
  columns: readonly Float64Array[],
  j: number,
  scaled: readonly { column: number; coefficient: number }[],
  centring: Centring,
  intercept: boolean,
): Dependency {
  const target = columns[j]!;
  const size = target.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0) || 1;
  const raw = scaled.map(({ column, coefficient }) => ({
    column,
    coefficient: (coefficient * centring.scales[j]!) / centring.scales[column]!,
  }));
  const simple = raw.map((term): DependencyTerm => {
    const ratio = simplestRatio(term.coefficient, 1e-9);
    return { ...term, coefficient: ratio === null ? term.coefficient : ratio.numerator / ratio.denominator, ratio };
  });
  const rounded = equation(columns, j, simple, intercept, size);
  if (rounded.exactness <= 1e-9) return rounded;
  return equation(
    columns,
    j,
    raw.map((term) => ({ ...term, ratio: null })),
    intercept,
    size,
  );
}

function equation(
  columns: readonly Float64Array[],
  j: number,
  terms: readonly DependencyTerm[],
  intercept: boolean,
  size: number,
): Dependency {
  const target = columns[j]!;
  const left = target.map((value, i) =>
    terms.reduce((rest, term) => rest - term.coefficient * columns[term.column]![i]!, value),
  );
  const mean = intercept ? left.reduce((sum, value) => sum + value, 0) / left.length : 0;
  const simple = simplestRatio(mean, 1e-9);
  const constant = Math.abs(mean) < 1e-9 * size ? 0 : simple === null ? mean : simple.numerator / simple.denominator;
  const exactness = left.reduce((largest, value) => Math.max(largest, Math.abs(value - constant)), 0) / size;
  return { column: j, constant, terms, exactness };
}

function dotOf(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
