/** The operations of `../assembly/reduce.ts` in TypeScript: the same operations in the same order; what they do is said there. */
import { COLUMN_STRIDE } from "../layout.ts";
import type { PlainMemory } from "./plainMemory.ts";

export interface ReduceOperations {
  centreColumn(column: number, rows: number, high: number, low: number, factor: number): void;
  scaleRows(column: number, rows: number, factors: number): void;
  foldTile(r: number, tile: number, columns: number, rows: number): void;
  addSquaredForms(first: number, columns: number, rows: number, t: number, out: number): void;
}

export function reduceOperations(memory: PlainMemory): ReduceOperations {
  return {
    centreColumn: (column, rows, high, low, factor) => centreColumn(memory.f64, column / 8, rows, high, low, factor),
    scaleRows: (column, rows, factors) => scaleRows(memory.f64, column / 8, rows, factors / 8),
    foldTile: (r, tile, columns, rows) => foldTile(memory.f64, r / 8, tile / 8, columns, rows),
    addSquaredForms: (first, columns, rows, t, out) =>
      addSquaredForms(memory.f64, first / 8, columns, rows, t / 8, out / 8),
  };
}

/** Rows of a tile with the zero that fills up an odd one. */
function filled(rows: number): number {
  return rows + (rows % 2);
}

function centreColumn(f64: Float64Array, at: number, rows: number, high: number, low: number, factor: number): void {
  for (let i = 0; i < rows; i++) f64[at + i] = (f64[at + i]! - high - low) * factor;
  if (rows % 2 === 1) f64[at + rows] = 0;
}

function scaleRows(f64: Float64Array, at: number, rows: number, factors: number): void {
  for (let i = 0; i < filled(rows); i++) f64[at + i] = f64[at + i]! * f64[factors + i]!;
}

/** Σ a·b, even and odd rows apart. */
function dot(f64: Float64Array, a: number, b: number, rows: number): number {
  let even = 0;
  let odd = 0;
  for (let i = 0; i < filled(rows); i += 2) {
    even += f64[a + i]! * f64[b + i]!;
    odd += f64[a + i + 1]! * f64[b + i + 1]!;
  }
  return even + odd;
}

function foldTile(f64: Float64Array, r: number, tile: number, columns: number, rows: number): void {
  for (let j = 0; j < columns; j++) {
    const v = tile + j * COLUMN_STRIDE;
    const diagonal = r + j * columns + j;
    const sigma = dot(f64, v, v, rows);
    if (sigma === 0) continue;
    const old = f64[diagonal]!;
    const length = Math.sqrt(old * old + sigma);
    const next = old > 0 ? -length : length;
    const head = old - next;
    const factor = 2 / (head * head + sigma);
    f64[diagonal] = next;
    for (let l = j + 1; l < columns; l++) {
      const target = tile + l * COLUMN_STRIDE;
      const top = r + j * columns + l;
      const amount = (f64[top]! * head + dot(f64, v, target, rows)) * factor;
      f64[top] = f64[top]! - amount * head;
      for (let i = 0; i < filled(rows); i++) f64[target + i] = f64[target + i]! - f64[v + i]! * amount;
    }
  }
}

function addSquaredForms(
  f64: Float64Array,
  first: number,
  columns: number,
  rows: number,
  t: number,
  out: number,
): void {
  for (let i = 0; i < filled(rows); i++) {
    let h = f64[out + i]!;
    for (let b = 0; b < columns; b++) {
      let s = 0;
      for (let a = 0; a < columns; a++) s += f64[t + a * columns + b]! * f64[first + a * COLUMN_STRIDE + i]!;
      h += s * s;
    }
    f64[out + i] = h;
  }
}
