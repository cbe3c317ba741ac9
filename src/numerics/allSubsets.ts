/**
 * Every set of groups of columns fitted at once from moments: no row is looked at. One walk over the sets (`subsetWalk.ts`)
 * on the matrix of [columns, response, subject]: the response's entry becomes the residual sum of squares, the subject's row
 * its distance from the mean and its leverage, with d = x₀ − x̄: 0 − d′C⁻¹g and 0 − d′C⁻¹d.
 * Unrefined: right to some 16 digits less twice the digits of the condition number; `smallestPivots` tells where.
 */
import type { Moments } from "./accumulateMoments.ts";
import { NumericsError } from "./numericsError.ts";
import {
  carryForm,
  carryMatrix,
  depthsOf,
  type Eliminated,
  planSubsets,
  type SubsetPlan,
  walkSubsets,
} from "./subsetWalk.ts";

/** A million sets, eight megabytes a list. */
const MOST_GROUPS = 20;

export interface SubsetOptions {
  /** Columns of every set. */
  readonly alwaysIn?: readonly number[] | undefined;
  /** x₀, one value per column of the moments but the response, raw units; columns of no group are not read. */
  readonly subject?: Float64Array | undefined;
  /** One per column, raw units: Σ w e² + Σ λ b² is made least in every set. */
  readonly penalty?: Float64Array | null | undefined;
  /** Whether the coefficients of every set are kept: 8 bytes per set and column. */
  readonly coefficients?: boolean | undefined;
}

/** Arrays over sets; bit g of a set's number stands for groups[g]. */
export interface SubsetTable {
  /** Σ w e². */
  readonly residualSums: Float64Array;
  readonly totalSum: number;
  /** 1 − Σ w e²/Σ w (y − ȳ)²; 0 for a constant response. */
  readonly r2: Float64Array;
  /** Columns with the intercept. Less than the set has where some depend on others: then fitted and leverages are NaN. */
  readonly ranks: Uint16Array;
  /** Smallest pivot relative to the column's own spread: 1/(largest variance inflation) where it stands last. */
  readonly smallestPivots: Float64Array;
  /** x₀'b and h₀ = 1/W + d′C⁻¹d; null without a subject. */
  readonly fitted: Float64Array | null;
  readonly leverages: Float64Array | null;
  /** Sets × columns of the moments but the response, raw units, NaN where not in the set; null unless asked for. */
  readonly coefficients: Float64Array | null;
}

/** What the walk needs: where each variable stands in the matrix and how it is scaled. */
interface Frame {
  readonly moments: Moments;
  readonly plan: SubsetPlan;
  /** Moment columns in matrix order, the response last. */
  readonly order: readonly number[];
  readonly size: number;
  readonly response: number;
}

/**
 * The table of all 2^k sets of `groups` (column numbers of the moments of [...columns, response]). Refuses (shape) more than
 * twenty groups, a column in two groups, the response among them, and lengths that disagree.
 */
export function allSubsets(
  moments: Moments,
  groups: readonly (readonly number[])[],
  options: SubsetOptions = {},
): SubsetTable {
  const frame = frameOf(moments, groups, options);
  const { plan, order, size, response } = frame;
  const depths = depthsOf(plan);
  const matrix = carryMatrix(matrixOf(frame, options), size, depths);
  const form = options.penalty ? carryForm(plainForm(frame), response + 1, matrix, size, depths) : null;
  const table = emptyTable(frame, 2 ** groups.length, options);
  const squared = moments.scales[order[response]!]! ** 2;
  walkSubsets(plan, form === null ? [matrix] : [matrix, form], (set, depth) => {
    const errors = form === null ? matrix.levels[depth]![response * (size + 1)]! : form.levels[depth]!.at(-1)!;
    const residualSum = Math.max(0, errors) * squared;
    table.residualSums[set] = residualSum;
    table.r2[set] = table.totalSum > 0 ? 1 - residualSum / table.totalSum : 0;
    table.ranks[set] = 1 + matrix.ranks[depth]!;
    table.smallestPivots[set] = matrix.smallest[depth]!;
    if (table.fitted !== null) writeSubject(table, frame, matrix, set, depth);
    if (table.coefficients !== null) writeCoefficients(table.coefficients, frame, matrix, set);
  });
  return table;
}

/** Whether group g is in the set. */
export function isInSet(set: number, g: number): boolean {
  return Math.floor(set / 2 ** g) % 2 === 1;
}

function frameOf(moments: Moments, groups: readonly (readonly number[])[], options: SubsetOptions): Frame {
  const columns = moments.scales.length - 1;
  if (groups.length > MOST_GROUPS)
    throw new NumericsError("shape", `${groups.length} groups where at most ${MOST_GROUPS} were expected`);
  const plan = planSubsets(groups, options.alwaysIn);
  const wrong = plan.order.filter((j, at) => !(j >= 0 && j < columns) || plan.order.indexOf(j) !== at);
  if (wrong.length > 0) throw new NumericsError("shape", "columns are named twice or are not there", wrong);
  for (const values of [options.subject, options.penalty]) {
    if (values && values.length !== columns)
      throw new NumericsError("shape", `${values.length} values for ${columns} columns`);
  }
  const unknown = options.subject ? plan.order.filter((j) => !Number.isFinite(options.subject![j]!)) : [];
  if (unknown.length > 0) throw new NumericsError("notFinite", "the subject has no value there", unknown);
  const order = [...plan.order, columns];
  return { moments, plan, order, size: order.length + (options.subject ? 1 : 0), response: order.length - 1 };
}

/** The upper triangle of [columns, response, subject] with the penalties on the diagonal. */
function matrixOf(frame: Frame, { subject, penalty }: SubsetOptions): Float64Array {
  const { moments, order, size, response } = frame;
  const matrix = new Float64Array(size * size);
  const q = moments.scales.length;
  order.forEach((j, a) => {
    for (let b = a; b < order.length; b++) matrix[a * size + b] = moments.crossProducts[j * q + order[b]!]!;
    if (a === response) return;
    if (penalty) matrix[a * size + a] = matrix[a * size + a]! + penalty[j]! / moments.scales[j]! ** 2;
    if (subject) {
      matrix[a * size + size - 1] = (subject[j]! - moments.means[j]! - moments.meanTails[j]!) / moments.scales[j]!;
    }
  });
  return matrix;
}

/** The cross-products of [columns, response] without penalties. */
function plainForm(frame: Frame): Float64Array {
  const { moments, order } = frame;
  const q = moments.scales.length;
  return Float64Array.from({ length: order.length ** 2 }, (_, at) => {
    const a = Math.floor(at / order.length);
    return moments.crossProducts[order[a]! * q + order[at % order.length]!]!;
  });
}

function emptyTable({ moments, order, response }: Frame, sets: number, options: SubsetOptions): SubsetTable {
  const y = order[response]!;
  const numbers = (wanted: unknown): Float64Array | null => (wanted ? new Float64Array(sets) : null);
  return {
    residualSums: new Float64Array(sets),
    totalSum: moments.crossProducts[y * (moments.scales.length + 1)]! * moments.scales[y]! ** 2,
    r2: new Float64Array(sets),
    ranks: new Uint16Array(sets),
    smallestPivots: new Float64Array(sets),
    fitted: numbers(options.subject),
    leverages: numbers(options.subject),
    coefficients: options.coefficients ? new Float64Array(sets * y).fill(Number.NaN) : null,
  };
}

function writeSubject(table: SubsetTable, frame: Frame, matrix: Eliminated, set: number, depth: number): void {
  const { moments, order, size, response } = frame;
  const y = order[response]!;
  const level = matrix.levels[depth]!;
  const isDependent = matrix.smallest[depth] === 0;
  const distance = level[response * size + size - 1]! * moments.scales[y]!;
  table.fitted![set] = isDependent ? Number.NaN : moments.means[y]! - distance;
  table.leverages![set] = isDependent ? Number.NaN : 1 / moments.weightSum - level[size * size - 1]!;
}

/** Back-substitution through the pivots of the set: b_j = c_jy − Σ_{l > j in the set} c_jl b_l. */
function writeCoefficients(to: Float64Array, frame: Frame, matrix: Eliminated, set: number): void {
  const { moments, plan, order, size, response } = frame;
  const y = order[response]!;
  const inside: number[] = [];
  for (let j = 0; j < plan.alwaysIn; j++) inside.push(j);
  for (const { start, end, bit } of plan.groups) {
    if (Math.floor(set / bit) % 2 === 1) for (let j = start; j < end; j++) inside.push(j);
  }
  const at = set * y;
  for (let a = inside.length - 1; a >= 0; a--) {
    const j = inside[a]!;
    let b = matrix.ratios[j * size + response]!;
    for (let i = a + 1; i < inside.length; i++) {
      b -= matrix.ratios[j * size + inside[i]!]! * to[at + order[inside[i]!]!]!;
    }
    to[at + order[j]!] = b;
  }
  for (const j of inside) to[at + order[j]!] = (to[at + order[j]!]! * moments.scales[y]!) / moments.scales[order[j]!]!;
}
