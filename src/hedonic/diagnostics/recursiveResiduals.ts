/**
 * Recursive residuals w_t = (y_t − ŷ_t|t−1)/√(1 + h_t): each row against the fit of the rows before it (Brown, Durbin & Evans 1975).
 * They are independent with variance σ² under the model, and Σw² = Σe². A row that shows something new (a first level, the first
 * rows of all) has none: there are n − p. As long as directions are unseen the fit starts from no knowledge of them (Koopman 1997:
 * exact initial updates with the covariance P and the unseen part U).
 * Columns are turned by T into q of one size and at right angles over all rows, so that nothing is ill-conditioned by their units.
 */
import { isIndicator } from "../../numerics/column.ts";
import type { Fit } from "../fit.ts";

/** What is left unseen of a row below this share of its length is rounding. */
const NOTHING = 1e-9;

interface State {
  readonly q: number;
  /** Coefficients of the turned columns. */
  readonly b: Float64Array;
  /** (X′X)⁻¹ of the rows so far on what they have shown, q × q. */
  readonly p: Float64Array;
  /** Projection on what no row has shown yet, q × q. */
  readonly u: Float64Array;
  unseen: number;
}

/** n − p values in the design's row order, in response units; rows with leverage 1 have none. */
export function recursiveResiduals(fit: Fit): Float64Array {
  const { design } = fit;
  const q = fit.columns.length + 1;
  const p = new Float64Array(q * q);
  const state: State = { q, b: new Float64Array(q), p, u: p.slice(), unseen: q };
  for (let a = 0; a < q; a++) state.u[a * q + a] = 1;
  const turn = turner(fit);
  const found = new Float64Array(design.n);
  const z = new Float64Array(q);
  let count = 0;
  for (let t = 0; t < design.n; t++) {
    turn(t, z);
    const y = design.response[t]! - fit.solution.responseMean;
    if (state.unseen > 0 && learn(state, z, y)) continue;
    found[count++] = step(state, z, y);
  }
  return found.subarray(0, count);
}

/** Writes row t as [1, √n·T′(x − x̄)]. */
function turner({ design, columns, solution }: Fit): (t: number, z: Float64Array) => void {
  const { rootInverse, means } = solution;
  const k = columns.length;
  const root = rootInverse.map((value) => value * Math.sqrt(design.n));
  const values = columns.map((index) => design.columns[index]!.values);
  return (t, z) => {
    z.fill(0);
    z[0] = 1;
    for (let a = 0; a < k; a++) {
      const column = values[a]!;
      const x = isIndicator(column) ? (column.codes[t] === column.level ? 1 : 0) : column[t]!;
      const d = x - means[a]!;
      for (let b = 0; b < k; b++) z[b + 1] = z[b + 1]! + root[a * k + b]! * d;
    }
  };
}

/** The usual update; comes back with w. */
function step({ q, b, p }: State, z: Float64Array, y: number): number {
  const g = times(p, z, q);
  let error = y;
  let f = 1;
  for (let a = 0; a < q; a++) {
    error -= b[a]! * z[a]!;
    f += g[a]! * z[a]!;
  }
  for (let a = 0; a < q; a++) {
    const share = g[a]! / f;
    b[a] = b[a]! + share * error;
    for (let c = 0; c < q; c++) p[a * q + c] = p[a * q + c]! - share * g[c]!;
  }
  return error / Math.sqrt(f);
}

/** Takes in a row that shows something new, and says whether it did. */
function learn(state: State, z: Float64Array, y: number): boolean {
  const { q, b, p, u } = state;
  const fresh = times(u, z, q);
  const length = z.reduce((sum, one) => sum + one * one, 0);
  const f = fresh.reduce((sum, one, a) => sum + one * z[a]!, 0);
  if (!(f > NOTHING * length)) return false;
  const g = times(p, z, q);
  const error = z.reduce((rest, one, a) => rest - one * b[a]!, y);
  const h = g.reduce((sum, one, a) => sum + one * z[a]!, 1);
  for (let a = 0; a < q; a++) {
    const gain = fresh[a]! / f;
    b[a] = b[a]! + gain * error;
    for (let c = 0; c < q; c++) {
      const other = fresh[c]! / f;
      p[a * q + c] = p[a * q + c]! + gain * other * h - gain * g[c]! - other * g[a]!;
      u[a * q + c] = u[a * q + c]! - gain * fresh[c]!;
    }
  }
  state.unseen--;
  return true;
}

function times(matrix: Float64Array, z: Float64Array, q: number): Float64Array {
  const result = new Float64Array(q);
  for (let a = 0; a < q; a++) {
    let sum = 0;
    for (let c = 0; c < q; c++) sum += matrix[a * q + c]! * z[c]!;
    result[a] = sum;
  }
  return result;
}
