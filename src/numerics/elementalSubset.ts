/**
 * A random set of rows that fits exactly one plane, to start a robust search from: rows are taken in random order and one is
 * left out when it says nothing that the rows before it have not said, so that rare levels of a choice never make the set
 * singular (Koller & Stahel 2017). Rows are orthogonalised as they come: Z_s = LQ, β = Q′L⁻¹y_s.
 */
import { type Frame, frameRow } from "./weightedSteps.ts";

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
  const basis: Float64Array[] = [];
  const solved = new Float64Array(q);
  const rows = new Int32Array(q);
  for (let at = 0; at < order.length && basis.length < q; at++) {
    const i = order[at]!;
    const row = frameRow(frame, i);
    const length = Math.hypot(...row);
    let left = response[i]!;
    for (const [j, q_j] of basis.entries()) left -= project(row, q_j) * solved[j]!;
    if (Math.hypot(...row) <= NEW_DIRECTION * length) continue;
    // Once more: one pass leaves rounding behind that would tilt the next directions (Giraud et al. 2005).
    for (const [j, q_j] of basis.entries()) left -= project(row, q_j) * solved[j]!;
    const remaining = Math.hypot(...row);
    if (remaining <= NEW_DIRECTION * length) continue;
    rows[basis.length] = i;
    solved[basis.length] = left / remaining;
    basis.push(row.map((value) => value / remaining));
  }
  if (basis.length < q) return null;
  const coefficients = new Float64Array(q);
  for (const [j, q_j] of basis.entries()) for (let l = 0; l < q; l++) coefficients[l]! += solved[j]! * q_j[l]!;
  return { rows, coefficients };
}

/** Takes the part along `direction` out of `row`; gives back how long it was. */
function project(row: Float64Array, direction: Float64Array): number {
  let along = 0;
  for (let l = 0; l < row.length; l++) along += row[l]! * direction[l]!;
  for (let l = 0; l < row.length; l++) row[l]! -= along * direction[l]!;
  return along;
}
