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
  /** Columns with the ones, filled up to fours by columns of zeros. */
  readonly q: number;
  /** Coefficients of the turned columns. */
  readonly b: Float64Array;
  /** (X′X)⁻¹ of the rows so far on what they have shown, q × q. */
  readonly p: Float64Array;
  /** Projection on what no row has shown yet, q × q. */
  readonly u: Float64Array;
  unseen: number;
  /** P·z of the row at hand, q. */
  readonly g: Float64Array;
}

/** n − p values in the design's row order, in response units; rows with leverage 1 have none. */
export function recursiveResiduals(fit: Fit): Float64Array {
  const { design } = fit;
  const rank = fit.columns.length + 1;
  const q = 4 * Math.ceil(rank / 4);
  const p = new Float64Array(q * q);
  const state: State = { q, b: new Float64Array(q), p, u: p.slice(), unseen: rank, g: new Float64Array(q) };
  for (let a = 0; a < rank; a++) state.u[a * q + a] = 1;
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
  const isUpper = root.every((value, at) => value === 0 || Math.floor(at / k) <= at % k);
  const values = columns.map((index) => design.columns[index]!.values);
  return (t, z) => {
    z.fill(0);
    z[0] = 1;
    for (let a = 0; a < k; a++) {
      const column = values[a]!;
      const x = isIndicator(column) ? (column.codes[t] === column.level ? 1 : 0) : column[t]!;
      const d = x - means[a]!;
      for (let b = isUpper ? a : 0, at = a * k + b; b < k; b++, at++) z[b + 1] = z[b + 1]! + root[at]! * d;
    }
  };
}

/** The usual update; comes back with w. */
function step({ q, b, p, g }: State, z: Float64Array, y: number): number {
  let error = y;
  let f = 1;
  for (let a = 0; a < q; a++) {
    const sum = dot(p, a * q, z);
    g[a] = sum;
    error -= b[a]! * z[a]!;
    f += sum * z[a]!;
  }
  for (let a = 0; a < q; a++) {
    const share = g[a]! / f;
    b[a] = b[a]! + share * error;
    for (let c = 0, at = a * q; c < q; c++, at++) p[at] = p[at]! - share * g[c]!;
  }
  return error / Math.sqrt(f);
}

/** Takes in a row that shows something new, and says whether it did. */
function learn(state: State, z: Float64Array, y: number): boolean {
  const { q, b, p, u } = state;
  const fresh = times(u, z);
  const length = z.reduce((sum, one) => sum + one * one, 0);
  const f = fresh.reduce((sum, one, a) => sum + one * z[a]!, 0);
  if (!(f > NOTHING * length)) return false;
  const g = times(p, z);
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

/** Four sums side by side, so that none waits for the one before it; z is a multiple of four long. */
function dot(matrix: Float64Array, from: number, z: Float64Array): number {
  let [s0, s1, s2, s3] = [0, 0, 0, 0];
  for (let c = 0, at = from; c < z.length; c += 4, at += 4) {
    s0 += matrix[at]! * z[c]!;
    s1 += matrix[at + 1]! * z[c + 1]!;
    s2 += matrix[at + 2]! * z[c + 2]!;
    s3 += matrix[at + 3]! * z[c + 3]!;
  }
  return s0 + s1 + (s2 + s3);
}

function times(matrix: Float64Array, z: Float64Array): Float64Array {
  return z.map((_, a) => dot(matrix, a * z.length, z));
}
