/**
 * Invented sales for the benchmark, the same at every run: numeric attributes on the mixed scales of real lists (areas, years,
 * places, day numbers), choices as codes, a price that depends on all of them. Ours gets the columns; the references get the
 * same numbers from one file of doubles, column after column: price, numeric attributes, codes.
 */
import { closeSync, openSync, writeSync } from "node:fs";
import { type Column, indicator } from "../../src/numerics/column.ts";

export interface Shape {
  readonly rows: number;
  readonly numeric: number;
  /** Number of levels of each choice; the first level is the reference. */
  readonly levels: readonly number[];
}

export interface BenchData extends Shape {
  readonly numbers: readonly Float64Array[];
  readonly codes: readonly Uint16Array[];
  readonly response: Float64Array;
  /** Numeric columns, then the levels of every choice but its first. */
  readonly columns: readonly Column[];
}

const SCALES = [
  [120, 40],
  [1995, 12],
  [47.2, 0.05],
  [8.6, 0.05],
  [20000, 900],
  [3, 1],
  [0.4, 0.2],
  [5e5, 2e5],
] as const;

export const P30 = { numeric: 20, levels: [6, 5] };
export const P60 = { numeric: 20, levels: [25, 16] };

/** Uniform in [0, 1): a 32-bit mix of a counter (Weyl sequence, murmur finaliser by Appleby). */
export function uniforms(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return ((z ^ (z >>> 16)) >>> 0) / 2 ** 32;
  };
}

function sharedDoubles(length: number): Float64Array {
  return new Float64Array(new SharedArrayBuffer(8 * length) as unknown as ArrayBuffer);
}

export function drawData({ rows, numeric, levels }: Shape, seed = 20260101): BenchData {
  const draw = uniforms(seed);
  const response = sharedDoubles(rows);
  for (let i = 0; i < rows; i++) response[i] = 40000 + 3000 * (draw() + draw() + draw() - 1.5);
  const numbers = Array.from({ length: numeric }, (_, j) => {
    const [mean, spread] = SCALES[j % SCALES.length]!;
    const column = sharedDoubles(rows);
    for (let i = 0; i < rows; i++) {
      const z = 2 * (draw() + draw() + draw() - 1.5);
      column[i] = mean + spread * z;
      response[i] = response[i]! + (1000 / (j + 1)) * z;
    }
    return column;
  });
  const codes = levels.map((count) => {
    const column = new Uint16Array(new SharedArrayBuffer(2 * rows) as unknown as ArrayBuffer);
    for (let i = 0; i < rows; i++) {
      column[i] = Math.floor(draw() * count);
      response[i] = response[i]! + 150 * column[i]!;
    }
    return column;
  });
  return { rows, numeric, levels, numbers, codes, response, columns: columnsOf(numbers, codes, levels) };
}

export function columnsOf(
  numbers: readonly Float64Array[],
  codes: readonly Uint16Array[],
  levels: readonly number[],
): Column[] {
  const choices = codes.flatMap((column, c) =>
    Array.from({ length: levels[c]! - 1 }, (_, at) => indicator(column, at + 1)),
  );
  return [...numbers, ...choices];
}

export function writeData(path: string, { response, numbers, codes }: BenchData): void {
  const file = openSync(path, "w");
  for (const column of [response, ...numbers, ...codes.map((some) => Float64Array.from(some))]) {
    const bytes = new Uint8Array(column.buffer, column.byteOffset, column.byteLength);
    for (let at = 0; at < bytes.length; ) at += writeSync(file, bytes, at, bytes.length - at);
  }
  closeSync(file);
}
