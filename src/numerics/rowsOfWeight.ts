// Which rows take part: those with a weight above 0, all together or group by group, in ascending order.
import type { Rows } from "./kernels/loadBlock.ts";
import { NumericsError } from "./numericsError.ts";

/** Weights may add up to this much, so that their products stay exact. */
const LARGEST_SUM = 1e290;

/**
 * The rows of weight above 0. Refuses (notFinite) a weight that is not a number from 0 up and sums beyond 1e290, and
 * (tooFewRows) weights that are all zero.
 */
export function rowsOfWeight(weights: Float64Array): Rows {
  let positive = 0;
  let sum = 0;
  for (let i = 0; i < weights.length; i++) {
    const weight = weights[i]!;
    if (!(weight >= 0)) throw new NumericsError("notFinite", `weight ${i} is ${weight}, not a number from 0 up`);
    if (weight > 0) positive++;
    sum += weight;
  }
  if (!(sum < LARGEST_SUM)) throw new NumericsError("notFinite", "the weights are too large to be added up");
  if (positive === 0) throw new NumericsError("tooFewRows", "all weights are zero");
  if (positive === weights.length) return { start: 0, end: weights.length };
  const rows = new Uint32Array(new SharedArrayBuffer(4 * positive));
  for (let i = 0, at = 0; i < weights.length; i++) if (weights[i]! > 0) rows[at++] = i;
  return rows;
}

/** The rows of each group 0 … groupCount − 1; rows with a higher number are in none. */
export function groupRows(groupCodes: Uint16Array, groupCount: number, rows: Rows): Uint32Array[] {
  const counts = new Uint32Array(groupCount);
  forEachRow(rows, (i) => {
    const group = groupCodes[i]!;
    if (group < groupCount) counts[group] = counts[group]! + 1;
  });
  const groups = Array.from(counts, (count) => new Uint32Array(count));
  counts.fill(0);
  forEachRow(rows, (i) => {
    const group = groupCodes[i]!;
    if (group >= groupCount) return;
    groups[group]![counts[group]!] = i;
    counts[group] = counts[group]! + 1;
  });
  return groups;
}

function forEachRow(rows: Rows, visit: (i: number) => void): void {
  if (rows instanceof Uint32Array) for (const i of rows) visit(i);
  else for (let i = rows.start; i < rows.end; i++) visit(i);
}
