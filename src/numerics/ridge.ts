/**
 * Ridge: slopes drawn towards zero by a penalty, the intercept never (Hoerl & Kennard 1970), with the leave-one-out error of any
 * penalty in closed form: a sale left out errs by e/(1 − h), as under least squares, because the penalty stays (Allen 1974;
 * Golub, Heath & Wahba 1979). One eigen-decomposition serves all penalties.
 * Symbols: z columns centred by weighted means and divided by their scales; A = Z′WZ + Λ₀ = VDV′; b = V(D + λ)⁻¹V′Z′Wy;
 * h_i = w_i(1/Σw + Σ_j t_ij²/(D_j + λ)) with t_i = V′z_i.
 */
import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import type { Column } from "./column.ts";
import { goldenSection } from "./goldenSection.ts";
import { checkColumns, NumericsError } from "./numericsError.ts";
import { eachTile, type Frame, frameOf, TILE_ROWS, weightedProducts } from "./weightedSteps.ts";

export interface RidgePoint {
  /** λ; slopes per scale are penalised by λβ². */
  readonly penalty: number;
  /** √(Σ w (e/(1 − h))² / Σ w), in response units. */
  readonly looError: number;
  /** 1 + Σ D/(D + λ): how many coefficients' worth of freedom is left. */
  readonly effectiveCount: number;
}

export interface RidgeChoice {
  readonly best: RidgePoint;
  /** From no penalty upwards. */
  readonly curve: readonly RidgePoint[];
}

export interface RidgeOptions {
  readonly weights?: Float64Array | null;
  /** Λ₀ in raw units, k: penalties that stand whatever λ is. */
  readonly penalty?: Float64Array | null;
}

/** Penalties looked at first: 10⁻⁸ to 10² of the sales' weight, four per power of ten. */
const GRID = { from: -8, to: 2, steps: 40 } as const;
/** The chosen penalty keeps three digits: the error is flat there, and a stated penalty can be typed again. */
const DIGITS = 3;
/** Of ln λ: half a unit of the third digit is 5·10⁻⁴. */
const LN_TOLERANCE = 1e-4;

interface Spectrum {
  readonly frame: Frame;
  readonly weights: Float64Array | null;
  readonly totalWeight: number;
  /** Response less its weighted mean, n. */
  readonly response: Float64Array;
  /** D, k; V with its columns scaled to the frame, k × k row-major: t = z·V. */
  readonly values: Float64Array;
  readonly vectors: Float64Array;
  /** V′Z′Wy, k. */
  readonly rotated: Float64Array;
}

/**
 * The penalty with the least leave-one-out error, and the curve it was found on. `scales` (k): what one standardised unit of
 * each column is in raw units. Refuses shape, notFinite, tooFewRows (fewer than three rows).
 */
export function chooseRidgePenalty(
  columns: readonly Column[],
  response: Float64Array,
  scales: Float64Array,
  options: RidgeOptions = {},
): RidgeChoice {
  const spectrum = spectrumOf(columns, response, scales, options);
  const unit = spectrum.totalWeight;
  const grid = Array.from({ length: GRID.steps + 1 }, (_, at) => gridPenalty(at, unit));
  const curve = ridgeCurve(spectrum, [0, ...grid]);
  const least = leastAt(curve);
  if (least === 0) return { best: curve[0]!, curve };
  const low = least === 1 ? Math.log(gridPenalty(-1, unit)) : Math.log(curve[least - 1]!.penalty);
  const high = Math.log(curve[Math.min(least + 1, curve.length - 1)]!.penalty);
  const found = goldenSection((at) => ridgeCurve(spectrum, [Math.exp(at)])[0]!.looError, low, high, LN_TOLERANCE);
  const [rounded] = ridgeCurve(spectrum, [Number(Math.exp(found).toPrecision(DIGITS))]);
  const best = [rounded!, curve[least]!, curve[0]!].reduce((a, b) => (b.looError < a.looError ? b : a));
  return { best, curve };
}

/** The same figures at stated penalties. */
export function ridgeErrors(
  columns: readonly Column[],
  response: Float64Array,
  scales: Float64Array,
  penalties: readonly number[],
  options: RidgeOptions = {},
): RidgePoint[] {
  return ridgeCurve(spectrumOf(columns, response, scales, options), penalties);
}

function gridPenalty(at: number, unit: number): number {
  const exponent = GRID.from + ((GRID.to - GRID.from) * at) / GRID.steps;
  return Number((unit * 10 ** exponent).toPrecision(DIGITS));
}

function leastAt(curve: readonly RidgePoint[]): number {
  return curve.reduce((best, point, at) => (point.looError < curve[best]!.looError ? at : best), 0);
}

function spectrumOf(
  columns: readonly Column[],
  response: Float64Array,
  scales: Float64Array,
  options: RidgeOptions,
): Spectrum {
  checkColumns([], response);
  const n = response.length;
  if (n < 3) throw new NumericsError("tooFewRows", `${n} rows have no leave-one-out error`);
  const weights = options.weights ?? null;
  const frame = frameOf(columns, n, options.penalty ?? null, { weights, scales });
  const k = frame.k;
  const q = k + 1;
  const totalWeight = weights === null ? n : weights.reduce((sum, w) => sum + w, 0);
  const mean = response.reduce((sum, y, i) => sum + (weights?.[i] ?? 1) * y, 0) / totalWeight;
  const centred = response.map((y) => y - mean);
  const { matrix, vector } = weightedProducts(frame, weights, centred);
  const inner = Matrix.from1DArray(q, q, matrix).subMatrix(1, k, 1, k);
  const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(inner, { assumeSymmetric: true });
  const vectors = Float64Array.from(eigenvectorMatrix.to1DArray());
  const rotated = new Float64Array(k);
  for (let a = 0; a < k; a++) for (let j = 0; j < k; j++) rotated[j]! += vectors[a * k + j]! * vector[a + 1]!;
  const values = Float64Array.from(realEigenvalues, (value) => Math.max(0, value));
  return { frame, weights, totalWeight, response: centred, values, vectors, rotated };
}

/** One pass over the rows for all penalties. Directions without spread are left out where nothing is added to them. */
function ridgeCurve(spectrum: Spectrum, penalties: readonly number[]): RidgePoint[] {
  const { frame, values, rotated, totalWeight } = spectrum;
  const k = frame.k;
  const floor = 1e-14 * values.reduce((largest, value) => Math.max(largest, value), 0);
  const shrunk = penalties.map((penalty) => values.map((d) => (d + penalty > floor ? 1 / (d + penalty) : 0)));
  const sums = new Float64Array(penalties.length);
  eachScore(spectrum, (score, i) => {
    const w = spectrum.weights === null ? 1 : spectrum.weights[i]!;
    for (let l = 0; l < penalties.length; l++) {
      const inverse = shrunk[l]!;
      let h = w / totalWeight;
      let e = spectrum.response[i]!;
      for (let j = 0; j < k; j++) {
        const part = score[j]! * inverse[j]!;
        h += w * score[j]! * part;
        e -= part * rotated[j]!;
      }
      sums[l]! += w * (e / (1 - h)) ** 2;
    }
  });
  return penalties.map((penalty, l) => ({
    penalty,
    looError: Math.sqrt(sums[l]! / totalWeight),
    effectiveCount: values.reduce((sum, d, j) => sum + d * shrunk[l]![j]!, 1),
  }));
}

/** Visits t_i = V′z_i of every row. */
function eachScore(spectrum: Spectrum, visit: (score: Float64Array, row: number) => void): void {
  const { frame, vectors } = spectrum;
  const k = frame.k;
  const score = new Float64Array(k);
  eachTile(frame, (tile, start, size) => {
    for (let i = 0; i < size; i++) {
      score.fill(0);
      for (let a = 0; a < k; a++) {
        const z = tile[(a + 1) * TILE_ROWS + i]!;
        for (let j = 0; j < k; j++) score[j]! += z * vectors[a * k + j]!;
      }
      visit(score, start + i);
    }
  });
}
