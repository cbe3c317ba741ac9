/** The operations of `../assembly/refine.ts` in TypeScript: the same operations in the same order; what they do is said there. */
import type { PlainMemory } from "./plainMemory.ts";

const SPLITTER = 134217729;

export interface RefineOperations {
  subtractProduct(
    column: number,
    rows: number,
    bh: number,
    b1: number,
    b2: number,
    bl: number,
    high: number,
    low: number,
  ): void;
  subtractTable(codes: number, rows: number, table: number, high: number, low: number): void;
  settle(rows: number, high: number, low: number): void;
  weightPairs(weights: number, rows: number, high: number, low: number, outHigh: number, outLow: number): void;
  addProducts(column: number, rows: number, high: number, low: number, out: number): void;
  addByCode(codes: number, rows: number, high: number, low: number, out: number): void;
}

export function refineOperations(memory: PlainMemory): RefineOperations {
  return {
    subtractProduct: (column, rows, bh, b1, b2, bl, high, low) =>
      subtractProduct(memory.f64, column / 8, rows, [bh, b1, b2, bl], high / 8, low / 8),
    subtractTable: (codes, rows, table, high, low) =>
      subtractTable(memory, codes / 2, rows, table / 8, high / 8, low / 8),
    settle: (rows, high, low) => settle(memory.f64, rows, high / 8, low / 8),
    weightPairs: (weights, rows, high, low, outHigh, outLow) =>
      weightPairs(memory.f64, weights / 8, rows, [high / 8, low / 8], outHigh / 8, outLow / 8),
    addProducts: (column, rows, high, low, out) =>
      addProducts(memory.f64, column / 8, rows, high / 8, low / 8, out / 8),
    addByCode: (codes, rows, high, low, out) => addByCode(memory, codes / 2, rows, high / 8, low / 8, out / 8),
  };
}

/** Rows of a block with the zero that fills up an odd one. */
function filled(rows: number): number {
  return rows + (rows % 2);
}

function subtractProduct(
  f64: Float64Array,
  column: number,
  rows: number,
  [bh, b1, b2, bl]: readonly [number, number, number, number],
  high: number,
  low: number,
): void {
  for (let i = 0; i < filled(rows); i++) {
    const v = f64[column + i]!;
    const p = v * bh;
    const t = SPLITTER * v;
    const v1 = t - (t - v);
    const v2 = v - v1;
    const e = v2 * b2 - (p - v1 * b1 - v2 * b1 - v1 * b2) + v * bl;
    const old = f64[high + i]!;
    const s = old - p;
    const part = s - old;
    f64[low + i] = f64[low + i]! + (old - (s - part) - (p + part)) - e;
    f64[high + i] = s;
  }
}

function subtractTable(
  { f64, u16 }: PlainMemory,
  codes: number,
  rows: number,
  table: number,
  high: number,
  low: number,
): void {
  for (let i = 0; i < rows; i++) {
    const entry = table + 2 * u16[codes + i]!;
    const x = f64[entry]!;
    const old = f64[high + i]!;
    const s = old - x;
    const part = s - old;
    f64[low + i] = f64[low + i]! + (old - (s - part) - (x + part)) - f64[entry + 1]!;
    f64[high + i] = s;
  }
}

function settle(f64: Float64Array, rows: number, high: number, low: number): void {
  for (let i = 0; i < filled(rows); i++) {
    const h = f64[high + i]!;
    const l = f64[low + i]!;
    const s = h + l;
    f64[low + i] = l - (s - h);
    f64[high + i] = s;
  }
}

/** What rounding the product p of v and w took. */
function tailOfProduct(v: number, w: number, p: number): number {
  const tv = SPLITTER * v;
  const v1 = tv - (tv - v);
  const v2 = v - v1;
  const tw = SPLITTER * w;
  const w1 = tw - (tw - w);
  const w2 = w - w1;
  return v2 * w2 - (p - v1 * w1 - v2 * w1 - v1 * w2);
}

function weightPairs(
  f64: Float64Array,
  weights: number,
  rows: number,
  [high, low]: readonly [number, number],
  outHigh: number,
  outLow: number,
): void {
  for (let i = 0; i < filled(rows); i++) {
    const v = f64[weights + i]!;
    const w = f64[high + i]!;
    const p = v * w;
    const lowPart = f64[low + i]!;
    f64[outHigh + i] = p;
    f64[outLow + i] = tailOfProduct(v, w, p) + v * lowPart;
  }
}

function addProducts(f64: Float64Array, column: number, rows: number, high: number, low: number, out: number): void {
  for (let lane = 0; lane < 2; lane++) {
    let sumHigh = f64[out + lane]!;
    let sumLow = f64[out + 2 + lane]!;
    for (let i = lane; i < filled(rows); i += 2) {
      const v = f64[column + i]!;
      const w = f64[high + i]!;
      const p = v * w;
      const e = tailOfProduct(v, w, p);
      const s = sumHigh + p;
      const part = s - sumHigh;
      const lost = sumHigh - (s - part) + (p - part);
      sumLow += lost + e + v * f64[low + i]!;
      sumHigh = s;
    }
    f64[out + lane] = sumHigh;
    f64[out + 2 + lane] = sumLow;
  }
}

function addByCode(
  { f64, u16 }: PlainMemory,
  codes: number,
  rows: number,
  high: number,
  low: number,
  out: number,
): void {
  for (let i = 0; i < rows; i++) {
    const entry = out + 2 * u16[codes + i]!;
    const x = f64[high + i]!;
    const old = f64[entry]!;
    const s = old + x;
    const part = s - old;
    f64[entry + 1] = f64[entry + 1]! + (old - (s - part) + (x - part) + f64[low + i]!);
    f64[entry] = s;
  }
}
