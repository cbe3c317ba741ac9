/**
 * A random set of rows that fits exactly one plane, to start a robust search from: rows are taken in random order and one is
 * left out when it says nothing that the rows before it have not said, so that rare levels of a choice never make the set
 * singular (Koller & Stahel 2017). Rows are orthogonalised as they come: Z_s = LQ, β = Q′L⁻¹y_s.
 */
import { type Frame, readFrameRow } from "./weightedSteps.ts";

/** A row counts as new when more than this part of its length is new. */
const NEW_DIRECTION = 1e-6;

export interface ElementalSubset {
  /** k + 1 row numbers. */
  readonly rows: Int32Array;
  /** β (k + 1) through these rows. */
  readonly coefficients: Float64Array;
}

/** The first k + 1 independent rows in the given order; null when the rows do not hold that many. */
export function elementalSubset(frame: Frame, response: Float64Array, order: Int32Array): ElementalSubset | null {
  const q = frame.k + 1;
  /** Q, q × q, and L⁻¹y_s, q; `rank` of them are there. */
  const basis = new Float64Array(q * q);
  const solved = new Float64Array(q);
  const rows = new Int32Array(q);
  const row = new Float64Array(q);
  let rank = 0;
  for (let at = 0; at < order.length && rank < q; at++) {
    const i = order[at]!;
    readFrameRow(frame, i, row);
    const length = lengthOf(row);
    let explained = takeOut(row, basis, rank, solved);
    if (lengthOf(row) <= NEW_DIRECTION * length) continue;
    // Once more: one pass leaves rounding behind that would tilt the next directions (Giraud et al. 2005).
    explained += takeOut(row, basis, rank, solved);
    const remaining = lengthOf(row);
    for (let l = 0; l < q; l++) basis[rank * q + l] = row[l]! / remaining;
    solved[rank] = (response[i]! - explained) / remaining;
    rows[rank] = i;
    rank += 1;
  }
  if (rank < q) return null;
  const coefficients = new Float64Array(q);
  for (let j = 0; j < q; j++) for (let l = 0; l < q; l++) coefficients[l]! += solved[j]! * basis[j * q + l]!;
  return { rows, coefficients };
}

/** Takes what lies along the first `rank` directions out of `row`; gives back the response that this part explains. */
function takeOut(row: Float64Array, basis: Float64Array, rank: number, solved: Float64Array): number {
  const q = row.length;
  let explained = 0;
  for (let j = 0; j < rank; j++) {
    const from = j * q;
    let along = 0;
    for (let l = 0; l < q; l++) along += row[l]! * basis[from + l]!;
    for (let l = 0; l < q; l++) row[l]! -= along * basis[from + l]!;
    explained += along * solved[j]!;
  }
  return explained;
}

function lengthOf(row: Float64Array): number {
  let sum = 0;
  for (let l = 0; l < row.length; l++) sum += row[l]! * row[l]!;
  return Math.sqrt(sum);
}
