/**
 * Which columns are exact combinations of earlier ones (and a constant), and the equation in the simplest numbers.
 * Order-preserving: earlier columns are kept. A column is dependent when no row differs from the combination by more than
 *   T = relativeTolerance · (root mean square deviation of the column) + 4 · (what storing the columns as doubles may cost),
 * where whole numbers cost nothing and other columns half a unit in the last place of their largest value. So a large
 * offset neither invents a dependency (whole serial numbers are exact) nor hides one (decimals get the room they need).
 * Symbols: n rows; z centred columns; Q orthonormal columns of those kept so far; r what is left of a column.
 */
import { accumulateMoments, type Moments } from "./accumulateMoments.ts";
import { type Centring, centreColumns, measureCentring, storedError } from "./centreColumns.ts";
import { choleskyFactor, invertUpper, scaledCondition, timesOwnTranspose } from "./choleskyFactor.ts";
import { checkColumns } from "./numericsError.ts";
import { type Combination, describeCombination } from "./simplestCombination.ts";
import type { Ratio } from "./simplestNumber.ts";

export interface DependencyOptions {
  readonly intercept: boolean;
  /** T's first part; 1e-9 unless said. */
  readonly relativeTolerance?: number;
  /** Moments of the columns, in order, when they are at hand (more columns may follow): spares a pass in ordinary cases. */
  readonly moments?: Moments;
}

export interface DependencyTerm {
  readonly column: number;
  readonly coefficient: number;
  /** The coefficient as a fraction in lowest terms, when it is a short one. */
  readonly ratio: Ratio | null;
}

/** column = constant + Σ coefficient · column, over the terms. */
export interface Dependency {
  readonly column: number;
  readonly constant: number;
  readonly terms: DependencyTerm[];
  /** Largest difference between the two sides, relative to the column's spread (to its size if it is constant). */
  readonly exactness: number;
}

export interface Dependencies {
  readonly kept: number[];
  readonly dependent: Dependency[];
}

export const DEFAULT_TOLERANCE = 1e-9;
/** A column with more than this share left over is independent without a closer look. */
const CLEARLY_LEFT = 1e-6;

/** Kept and dependent columns, in column order. Refuses shape and notFinite. */
export function findDependencies(columns: readonly Float64Array[], options: DependencyOptions): Dependencies {
  checkColumns(columns.length > 0 ? columns : [new Float64Array(1)]);
  if (isClearlyIndependent(columns, options)) return { kept: columns.map((_, j) => j), dependent: [] };
  const centring = measureCentring(columns, options.intercept);
  const z = centreColumns(columns, centring);
  const stored = columns.map(storedError);
  const tolerance = options.relativeTolerance ?? DEFAULT_TOLERANCE;
  const kept: number[] = [];
  const basis: Float64Array[] = [];
  const dependent: Dependency[] = [];
  for (let j = 0; j < columns.length; j++) {
    const direction = leftOver(z[j]!, basis);
    const share = Math.max(CLEARLY_LEFT, (100 * stored[j]!) / centring.spreads[j]!);
    const found =
      direction.share > share && centring.spreads[j]! > 8 * stored[j]!
        ? null
        : describeCombination({ columns, centring, stored, kept, column: j, tolerance, intercept: options.intercept });
    if (found !== null) dependent.push(asDependency(found, j, centring));
    else {
      kept.push(j);
      basis.push(direction.unit);
    }
  }
  return { kept, dependent };
}

export interface Estimable {
  /** null when there is no intercept. */
  readonly intercept: boolean | null;
  readonly columns: boolean[];
}

/**
 * Which single coefficients the data determine: those of columns that no dependency mentions (x_j is then outside the span
 * of the others; Searle 1971, ch. 5). The others change with the choice of the column that is left out.
 */
export function estimable(columns: readonly Float64Array[], options: DependencyOptions): Estimable {
  return estimableFrom(findDependencies(columns, options).dependent, columns.length, options.intercept);
}

/** The same from dependencies that are known already. */
export function estimableFrom(dependent: readonly Dependency[], columnCount: number, intercept: boolean): Estimable {
  const isFree = new Array<boolean>(columnCount).fill(true);
  for (const dependency of dependent) {
    for (const column of [dependency.column, ...dependency.terms.map((term) => term.column)]) isFree[column] = false;
  }
  return { intercept: intercept ? dependent.every((d) => d.constant === 0) : null, columns: isFree };
}

/** True when the moments alone rule out any dependency: a condition number below 1e4 leaves no room for one. */
function isClearlyIndependent(columns: readonly Float64Array[], options: DependencyOptions): boolean {
  const k = columns.length;
  if (k === 0) return true;
  if (columns[0]!.length <= k) return false;
  const moments = options.moments ?? accumulateMoments(columns);
  const q = moments.scales.length;
  const c = new Float64Array(k * k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      const product = (moments.means[i]! / moments.scales[i]!) * (moments.means[j]! / moments.scales[j]!);
      c[i * k + j] = moments.crossProducts[i * q + j]! + (options.intercept ? 0 : moments.rowCount * product);
    }
  }
  const r = choleskyFactor(c, k, 1e-8);
  if (typeof r === "number") return false;
  if (hasBarelySpread(columns, moments, options.intercept)) return false;
  return scaledCondition(c, timesOwnTranspose(invertUpper(r, k), k), k) < 1e4;
}

/** A spread near the rounding of the values themselves says nothing: look at the rows. */
function hasBarelySpread(columns: readonly Float64Array[], moments: Moments, intercept: boolean): boolean {
  return intercept && columns.some((_, j) => moments.scales[j]! < 1e-6 * Math.abs(moments.means[j]!));
}

/** What is left of z after projecting on the basis twice (once is not enough: Giraud, Langou & Rozložník 2005). */
function leftOver(z: Float64Array, basis: readonly Float64Array[]): { share: number; unit: Float64Array } {
  const rest = z.slice();
  const whole = norm(z);
  for (let round = 0; round < 2; round++) {
    for (const q of basis) {
      let s = 0;
      for (let i = 0; i < rest.length; i++) s += q[i]! * rest[i]!;
      for (let i = 0; i < rest.length; i++) rest[i] = rest[i]! - s * q[i]!;
    }
  }
  const size = norm(rest);
  return { share: whole > 0 ? size / whole : 0, unit: size > 0 ? rest.map((v) => v / size) : rest };
}

function norm(values: Float64Array): number {
  let total = 0;
  for (let i = 0; i < values.length; i++) total += values[i]! * values[i]!;
  return Math.sqrt(total);
}

function asDependency(found: Combination, column: number, centring: Centring): Dependency {
  const spread = centring.spreads[column]!;
  const isConstant = found.terms.length === 0;
  const size = isConstant ? Math.abs(found.constant) : spread;
  return {
    column,
    constant: found.constant,
    terms: found.terms,
    exactness: size > 0 ? found.largestResidual / size : 0,
  };
}
