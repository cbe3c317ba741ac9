/**
 * Recursive residuals w_t = (y_t − ŷ_t|t−1)/√(1 + h_t): each row against the fit of the rows before it (Brown, Durbin & Evans 1975).
 * They are independent with variance σ² under the model, and Σw² = Σe². Each row is turned into the triangle R of the rows before
 * by Givens rotations (Gentleman 1973); what is left of its response is w. A row that shows something new (the first rows of all,
 * a first level) goes into R whole and has none: there are n − p.
 */
import { isIndicator } from "../../numerics/column.ts";
import type { Fit } from "../fit.ts";
import { columnsOf } from "./diagnostic.ts";

/** What is left of a row whose entries are about 1 is rounding below this, and shows nothing new. */
const NOTHING = 1e-9;

/** n − p values in the design's row order, in response units. O(n·k²). */
export function recursiveResiduals(fit: Fit): Float64Array {
  const { design, solution } = fit;
  const width = fit.columns.length + 2;
  const triangle = new Float64Array(width * width);
  const load = loader(fit);
  const row = new Float64Array(width);
  const found = new Float64Array(design.n);
  let count = 0;
  for (let t = 0; t < design.n; t++) {
    load(t, row);
    row[width - 1] = design.response[t]! - solution.responseMean;
    if (!isAbsorbed(triangle, row)) found[count++] = row[width - 1]!;
  }
  return found.subarray(0, count);
}

/** Writes row t as [1, numbers less their mean over their spread, levels as they are]. */
function loader(fit: Fit): (t: number, row: Float64Array) => void {
  const columns = columnsOf(fit);
  const { means } = fit.solution;
  const scales = columns.map((column, j) => (isIndicator(column) ? 1 : spreadOf(column, means[j]!)));
  return (t, row) => {
    row[0] = 1;
    columns.forEach((column, j) => {
      row[j + 1] = isIndicator(column)
        ? column.codes[t] === column.level
          ? 1
          : 0
        : (column[t]! - means[j]!) / scales[j]!;
    });
  };
}

function spreadOf(column: Float64Array, mean: number): number {
  return Math.sqrt(column.reduce((sum, x) => sum + (x - mean) ** 2, 0) / column.length);
}

/** Turns the row into the triangle, last entry last; true when it shows something new, so that nothing of it is left. */
function isAbsorbed(triangle: Float64Array, row: Float64Array): boolean {
  const width = row.length;
  for (let a = 0; a < width - 1; a++) {
    const x = row[a]!;
    if (x === 0) continue;
    const diagonal = a * width + a;
    const r = triangle[diagonal]!;
    if (r === 0) {
      if (Math.abs(x) <= NOTHING) continue;
      // A diagonal is never below 0.
      for (let b = a; b < width; b++) triangle[a * width + b] = Math.sign(x) * row[b]!;
      return true;
    }
    const length = Math.sqrt(r * r + x * x);
    const cosine = r / length;
    const sine = x / length;
    triangle[diagonal] = length;
    for (let b = a + 1, at = diagonal + 1; b < width; b++, at++) {
      const u = triangle[at]!;
      const v = row[b]!;
      triangle[at] = cosine * u + sine * v;
      row[b] = cosine * v - sine * u;
    }
  }
  return false;
}
