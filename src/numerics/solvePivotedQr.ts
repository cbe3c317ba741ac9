/**
 * Least squares from the rows, without squaring the condition number: the careful path. Rows are reduced to a triangle tile by
 * tile (reduceRows), and the triangle is factored by Householder reflections with column pivoting (Businger & Golub 1965).
 * Symbols: Z n × k centred (with an intercept), weighted and scaled; ZP = QR, T = PR⁻¹ in raw units: (X′WX + Λ)⁻¹ = TT′.
 */
import { accumulateMoments } from "./accumulateMoments.ts";
import { type Centring, centringOf } from "./centring.ts";
import { invertUpper, scaledCondition, timesOwnTranspose } from "./choleskyFactor.ts";
import type { Column } from "./column.ts";
import { NumericsError } from "./numericsError.ts";
import { reduceRows } from "./reduceRows.ts";

export interface PivotedQrOptions {
  readonly intercept: boolean;
  /** A pivot below this share of its column's length ends the factorisation; 1e-13 unless said. */
  readonly relativeTolerance?: number;
  /** Of the columns and, last, the response. */
  readonly centring?: Centring;
  readonly weights?: Float64Array | null;
  readonly penalty?: Float64Array | null;
}

export interface PivotedQr {
  /** Slopes in raw units, k; zero for columns beyond the rank. */
  readonly coefficients: Float64Array;
  readonly rank: number;
  /** Column numbers in the order they were taken; those from `rank` on depend on the ones before. */
  readonly order: number[];
  /** |R_jj| relative to the length of its column, in pivot order, `rank` values. */
  readonly relativePivots: Float64Array;
  /** T, k × k row-major, raw units; zero rows and columns beyond the rank. */
  readonly rootInverse: Float64Array;
  /** Condition number of the taken columns, centred and scaled to length 1. */
  readonly condition: number;
}

/** Slopes, rank and inverse root. Refuses (shape, notFinite, tooFewRows) what cannot be factored; not a rank loss. */
export function solvePivotedQr(
  columns: readonly Column[],
  response: Float64Array,
  options: PivotedQrOptions,
): PivotedQr {
  const k = columns.length;
  if (response.length < k && !options.penalty) {
    throw new NumericsError("tooFewRows", `${response.length} rows cannot determine ${k} columns`);
  }
  const weights = options.weights ?? null;
  const centring =
    options.centring ??
    centringOf(accumulateMoments([...columns, response], { weights: weights ?? undefined }), options.intercept);
  const q = k + 1;
  const triangle = reduceRows(columns, response, centring, weights, options.penalty ?? null);
  const column = (j: number) => Float64Array.from({ length: q }, (_, i) => (i <= j ? triangle[i * q + j]! : 0));
  const z = Array.from({ length: k }, (_, j) => column(j));
  const rhs = column(k);
  const factored = reflect(z, rhs, options.relativeTolerance ?? 1e-13);
  return unscale(factored, rhs, centring, centring.scales[k]!);
}

interface Factored {
  readonly k: number;
  readonly rank: number;
  readonly order: number[];
  readonly relativePivots: Float64Array;
  /** R of the taken columns, rank × rank row-major. */
  readonly r: Float64Array;
}

/** Factors z in place (columns are swapped and overwritten) and applies the reflections to rhs. */
function reflect(z: Float64Array[], rhs: Float64Array, tolerance: number): Factored {
  const k = z.length;
  const order = z.map((_, j) => j);
  const lengths = z.map((column) => tailNorm(column, 0));
  const diagonal: number[] = [];
  const pivots: number[] = [];
  for (let step = 0; step < k; step++) {
    const rest = z.map((column, j) => (j < step ? 0 : relative(tailNorm(column, step), lengths[j]!)));
    const best = largestFrom(rest, step);
    if (!(rest[best]! > tolerance)) break;
    for (const list of [z, order, lengths] as unknown[][]) [list[step], list[best]] = [list[best], list[step]];
    const head = makeReflector(z[step]!, step);
    for (let j = step + 1; j < k; j++) applyReflector(z[step]!, head, z[j]!, step);
    applyReflector(z[step]!, head, rhs, step);
    diagonal.push(head.r);
    pivots.push(rest[best]!);
  }
  const rank = diagonal.length;
  const r = new Float64Array(rank * rank);
  for (let i = 0; i < rank; i++) for (let j = i; j < rank; j++) r[i * rank + j] = i === j ? diagonal[i]! : z[j]![i]!;
  return { k, rank, order, relativePivots: Float64Array.from(pivots), r };
}

function relative(size: number, whole: number): number {
  return whole > 0 ? size / whole : 0;
}

function largestFrom(values: number[], start: number): number {
  let best = start;
  for (let j = start + 1; j < values.length; j++) if (values[j]! > values[best]!) best = j;
  return best;
}

function tailNorm(column: Float64Array, start: number): number {
  let total = 0;
  for (let i = start; i < column.length; i++) total += column[i]! * column[i]!;
  return Math.sqrt(total);
}

/** Turns column[step…] into the reflection vector v; gives the R entry and v′v. */
function makeReflector(column: Float64Array, step: number): { r: number; vv: number } {
  const norm = tailNorm(column, step);
  const r = column[step]! > 0 ? -norm : norm;
  column[step] = column[step]! - r;
  let vv = 0;
  for (let i = step; i < column.length; i++) vv += column[i]! * column[i]!;
  return { r, vv };
}

function applyReflector(v: Float64Array, head: { vv: number }, target: Float64Array, step: number): void {
  if (head.vv === 0) return;
  let s = 0;
  for (let i = step; i < v.length; i++) s += v[i]! * target[i]!;
  const factor = (2 * s) / head.vv;
  for (let i = step; i < v.length; i++) target[i] = target[i]! - factor * v[i]!;
}

function unscale(f: Factored, rhs: Float64Array, centring: Centring, responseScale: number): PivotedQr {
  const { k, rank, order } = f;
  const inverse = invertUpper(f.r, rank);
  const coefficients = new Float64Array(k);
  const rootInverse = new Float64Array(k * k);
  for (let i = 0; i < rank; i++) {
    const column = order[i]!;
    let s = 0;
    for (let j = i; j < rank; j++) {
      s += inverse[i * rank + j]! * rhs[j]!;
      rootInverse[column * k + j] = inverse[i * rank + j]! / centring.scales[column]!;
    }
    coefficients[column] = (s * responseScale) / centring.scales[column]!;
  }
  const gram = timesOwnTranspose(transpose(f.r, rank), rank);
  const condition = scaledCondition(gram, timesOwnTranspose(inverse, rank), rank);
  return { coefficients, rank, order, relativePivots: f.relativePivots, rootInverse, condition };
}

function transpose(a: Float64Array, k: number): Float64Array {
  return a.map((_, at) => a[(at % k) * k + Math.floor(at / k)]!);
}
