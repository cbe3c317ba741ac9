/**
 * Errors out of sample of every set of groups of columns, exact, in one walk over the sets (`subsetWalk.ts`).
 * By folds, from moments alone: the coefficients of all other folds, tried on this fold's own cross-products about the others'
 * means, Q = S_f + W_f δδ′ (Geisser 1975). One sale left out, from the rows: e_i/(1 − h_i) with e and h carried along, which is
 * what a fit without the sale errs by (Allen 1974). Generalised: s² of each set made comparable (Golub, Heath & Wahba 1979).
 */
import { type Moments, mergeMoments } from "./accumulateMoments.ts";
import type { SubsetTable } from "./allSubsets.ts";
import { type Column, numbersOf } from "./column.ts";
import { NumericsError } from "./numericsError.ts";
import {
  type Carried,
  carryForm,
  carryMatrix,
  depthsOf,
  type Eliminated,
  planSubsets,
  type SubsetPlan,
  walkSubsets,
} from "./subsetWalk.ts";

export interface SubsetErrorOptions {
  readonly alwaysIn?: readonly number[] | undefined;
  /** One per column, raw units, as in `allSubsets`. */
  readonly penalty?: Float64Array | null | undefined;
}

/** A sale with 1 − h below this is the only one of its kind: no fit without it can price it. */
const FULL_LEVERAGE = 1e-10;

/**
 * Per set Σ w (y − ŷ)² over all rows, each priced by the fit of the other folds. `folds` are moments of [...columns, response]
 * by fold (`partsBy`); empty ones do not count. NaN for a set that some fit without a fold cannot tell apart. Refuses (tooFewRows)
 * fewer than two folds with rows.
 */
export function foldErrors(
  folds: readonly Moments[],
  groups: readonly (readonly number[])[],
  { alwaysIn, penalty }: SubsetErrorOptions = {},
): Float64Array {
  const filled = folds.filter(({ rowCount }) => rowCount > 0);
  if (filled.length < 2) throw new NumericsError("tooFewRows", `${filled.length} folds with rows where two are needed`);
  const plan = planSubsets(groups, alwaysIn);
  const errors = new Float64Array(2 ** groups.length);
  for (const fold of filled) {
    const others = mergeMoments(filled.filter((other) => other !== fold));
    addFold(errors, plan, others, fold, penalty ?? null);
  }
  return errors;
}

function addFold(
  errors: Float64Array,
  plan: SubsetPlan,
  others: Moments,
  fold: Moments,
  penalty: Float64Array | null,
): void {
  const y = others.scales.length - 1;
  const order = [...plan.order, y];
  const size = order.length;
  const depths = depthsOf(plan);
  const matrix = carryMatrix(penalised(others, order, penalty), size, depths);
  const form = carryForm(aboutMeansOf(others, fold, order), size, matrix, size, depths);
  const squared = others.scales[y]! ** 2;
  walkSubsets(plan, [matrix, form], (set, depth) => {
    const error = matrix.smallest[depth] === 0 ? Number.NaN : form.levels[depth]!.at(-1)! * squared;
    errors[set] = errors[set]! + error;
  });
}

/** Cross-products in matrix order with the penalties on the diagonal. */
function penalised({ crossProducts, scales }: Moments, order: readonly number[], penalty: Float64Array | null) {
  const size = order.length;
  const q = scales.length;
  const matrix = Float64Array.from({ length: size * size }, (_, at) => {
    return crossProducts[order[Math.floor(at / size)]! * q + order[at % size]!]!;
  });
  if (penalty !== null) {
    for (let a = 0; a < size - 1; a++) {
      matrix[a * size + a] = matrix[a * size + a]! + penalty[order[a]!]! / scales[order[a]!]! ** 2;
    }
  }
  return matrix;
}

/** Q of the fold in the others' scales: Σ w (x_j − m_j)(x_k − m_k)/(c_j c_k) over its rows, m and c of the others. */
function aboutMeansOf(others: Moments, fold: Moments, order: readonly number[]): Float64Array {
  const size = order.length;
  const q = others.scales.length;
  const ratio = Float64Array.from(order, (j) => fold.scales[j]! / others.scales[j]!);
  const shift = Float64Array.from(order, (j) => {
    const distance = fold.means[j]! - others.means[j]! + (fold.meanTails[j]! - others.meanTails[j]!);
    return distance / others.scales[j]!;
  });
  return Float64Array.from({ length: size * size }, (_, at) => {
    const a = Math.floor(at / size);
    const b = at % size;
    const within = fold.crossProducts[order[a]! * q + order[b]!]! * ratio[a]! * ratio[b]!;
    return within + fold.weightSum * shift[a]! * shift[b]!;
  });
}

/** Rows × sets up to which errors of all sets, one sale left out, are worth their time: some half a second. */
export const LEAVE_ONE_OUT_WORK = 1e8;

/**
 * Per set Σ w (e/(1 − h))² over all rows, each priced by the fit without it. `moments` of [...columns, response] with the same
 * weights. NaN for a set in which some sale is the only one of its kind. O(rows · 2^groups); `LEAVE_ONE_OUT_WORK` bounds it.
 */
export function leaveOneOutErrors(
  moments: Moments,
  columns: readonly Column[],
  response: Float64Array,
  groups: readonly (readonly number[])[],
  { alwaysIn, penalty, weights }: SubsetErrorOptions & { readonly weights?: Float64Array | null | undefined } = {},
): Float64Array {
  if (moments.scales.length !== columns.length + 1)
    throw new NumericsError("shape", `moments of ${moments.scales.length - 1} columns for ${columns.length}`);
  const plan = planSubsets(groups, alwaysIn);
  const order = [...plan.order, columns.length];
  const depths = depthsOf(plan);
  const matrix = carryMatrix(penalised(moments, order, penalty ?? null), order.length, depths);
  const rows = carryRows(standardised(moments, [...columns, response], order, weights ?? null), matrix, depths);
  const squared = moments.scales[columns.length]! ** 2;
  const errors = new Float64Array(2 ** groups.length);
  walkSubsets(plan, [matrix, rows], (set, depth) => {
    errors[set] = matrix.smallest[depth] === 0 ? Number.NaN : squared * rows.squaredErrors(depth);
  });
  return errors;
}

/**
 * √w e/(1 − h) of every row for the one set of these columns: its error when priced by the fit without it, on the response's
 * scale. Null for a set in which some sale is the only one of its kind, or columns depend on each other. O(rows · columns²).
 */
export function leaveOneOutRows(
  moments: Moments,
  columns: readonly Column[],
  response: Float64Array,
  { alwaysIn, penalty, weights }: SubsetErrorOptions & { readonly weights?: Float64Array | null | undefined },
): Float64Array | null {
  const plan = planSubsets([], alwaysIn);
  const order = [...plan.order, columns.length];
  const depths = depthsOf(plan);
  const matrix = carryMatrix(penalised(moments, order, penalty ?? null), order.length, depths);
  const rows = carryRows(standardised(moments, [...columns, response], order, weights ?? null), matrix, depths);
  const scale = moments.scales[columns.length]!;
  let errors: Float64Array | null = null;
  walkSubsets(plan, [matrix, rows], (_, depth) => {
    if (matrix.smallest[depth] === 0 || Number.isNaN(rows.squaredErrors(depth))) return;
    errors = rows.errors(depth).map((error) => error * scale);
  });
  return errors;
}

interface Rows {
  /** Columns in matrix order, each n: √w (x − m)/c. */
  readonly values: readonly Float64Array[];
  /** w/W, n. */
  readonly leverages: Float64Array;
}

function standardised(
  { means, meanTails, scales, weightSum }: Moments,
  columns: readonly Column[],
  order: readonly number[],
  weights: Float64Array | null,
): Rows {
  const n = columns[0]!.length;
  const roots = weights === null ? null : weights.map(Math.sqrt);
  const values = order.map((j) => {
    const standard = numbersOf(columns[j]!).map((x) => (x - means[j]! - meanTails[j]!) / scales[j]!);
    return roots === null ? standard : standard.map((z, i) => (roots[i] === 0 ? 0 : z * roots[i]!));
  });
  const leverages = weights === null ? new Float64Array(n).fill(1 / n) : weights.map((w) => w / weightSum);
  return { values, leverages };
}

/** The rows carried along: each column less its slope on the pivot, the leverages grown by z²/M_jj. */
function carryRows({ values, leverages }: Rows, by: Eliminated, depths: number) {
  const n = leverages.length;
  const size = values.length;
  const states = Array.from({ length: depths }, (_, depth) =>
    depth === 0
      ? { values, leverages }
      : { values: values.map(() => new Float64Array(n)), leverages: leverages.slice() },
  );
  const carried: Carried = {
    take(from, to, j) {
      const source = states[from]!;
      const target = states[to]!;
      const z = source.values[j]!;
      addSquares(target.leverages, source.leverages, z, by.pivots[j]! > 0 ? 1 / by.pivots[j]! : 0);
      for (let l = j + 1; l < size; l++) subtract(target.values[l]!, source.values[l]!, z, by.ratios[j * size + l]!);
    },
  };
  const squaredErrors = (depth: number): number => pressOf(states[depth]!.values[size - 1]!, states[depth]!.leverages);
  const errors = (depth: number): Float64Array => {
    const { values: left, leverages: h } = states[depth]!;
    return left[size - 1]!.map((e, i) => e / (1 - h[i]!));
  };
  return { ...carried, squaredErrors, errors };
}

function addSquares(to: Float64Array, from: Float64Array, z: Float64Array, factor: number): void {
  for (let i = 0; i < z.length; i++) to[i] = from[i]! + z[i]! * z[i]! * factor;
}

function subtract(to: Float64Array, from: Float64Array, z: Float64Array, factor: number): void {
  for (let i = 0; i < z.length; i++) to[i] = from[i]! - factor * z[i]!;
}

/** Σ (e/(1 − h))²; NaN where some 1 − h is nothing but rounding. */
function pressOf(e: Float64Array, h: Float64Array): number {
  let sum = 0;
  let least = 1;
  for (let i = 0; i < e.length; i++) {
    const gap = 1 - h[i]!;
    const error = e[i]! / gap;
    sum += error * error;
    if (gap < least) least = gap;
  }
  return least > FULL_LEVERAGE ? sum : Number.NaN;
}

/**
 * Generalised cross-validation n·Σ w e²/(n − p)² per set: an estimate of the squared error on a new sale from all rows together,
 * not a leave-one-out error. NaN without residual degrees of freedom.
 */
export function generalisedErrors({ residualSums, ranks }: SubsetTable, rowCount: number): Float64Array {
  return residualSums.map((sum, set) => {
    const df = rowCount - ranks[set]!;
    return df > 0 ? (rowCount * sum) / (df * df) : Number.NaN;
  });
}
