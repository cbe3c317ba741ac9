/** The operations of `../assembly/diagnose.ts` in TypeScript: the same operations in the same order; what they do is said there. */
import { COLUMN_STRIDE } from "../layout.ts";
import type { PlainMemory } from "./plainMemory.ts";

const FULL_LEVERAGE = 1e-10;

export interface DiagnoseOperations {
  addSquaredLengths(first: number, columns: number, rows: number, t: number, upper: number, out: number): void;
  diagnoseRows(
    e: number,
    y: number,
    roots: number,
    lengths: number,
    rows: number,
    s: number,
    freedom: number,
    rank: number,
    out: number,
  ): void;
}

export function diagnoseOperations(memory: PlainMemory): DiagnoseOperations {
  return {
    addSquaredLengths: (first, columns, rows, t, upper, out) =>
      addSquaredLengths(memory.f64, { first: first / 8, columns, rows, t: t / 8, isUpper: upper === 1, out: out / 8 }),
    diagnoseRows: (e, y, roots, lengths, rows, s, freedom, rank, out) => {
      const at = { e: e / 8, y: y / 8, roots: roots / 8, lengths: lengths / 8, out: out / 8 };
      for (let i = 0; i < rows + (rows % 2); i++) diagnoseRow(memory.f64, at, i, s, freedom, rank);
    },
  };
}

interface Lengths {
  readonly first: number;
  readonly columns: number;
  readonly rows: number;
  readonly t: number;
  readonly isUpper: boolean;
  readonly out: number;
}

function addSquaredLengths(f64: Float64Array, { first, columns, rows, t, isUpper, out }: Lengths): void {
  for (let i = 0; i < Math.ceil(rows / 8) * 8; i++) {
    let h = f64[out + i]!;
    for (let b = 0; b < columns; b++) {
      const last = isUpper ? b - (b % 3) + 3 : columns;
      let sum = 0;
      for (let a = 0; a < last; a++) sum += f64[t + a * columns + b]! * f64[first + a * COLUMN_STRIDE + i]!;
      h += sum * sum;
    }
    f64[out + i] = h;
  }
}

interface RowPlaces {
  readonly e: number;
  readonly y: number;
  readonly roots: number;
  readonly lengths: number;
  readonly out: number;
}

function diagnoseRow(f64: Float64Array, at: RowPlaces, i: number, s: number, freedom: number, rank: number): void {
  const residual = f64[at.e + i]!;
  const response = f64[at.y + i]!;
  const root = f64[at.roots + i]!;
  const h = root * root * f64[at.lengths + i]!;
  const rest = 1 - h;
  const gap = rest > FULL_LEVERAGE ? rest : Number.NaN;
  const r = (root * residual) / (s * Math.sqrt(gap));
  const square = r * r;
  const t = r * Math.sqrt(freedom / Math.max(0, freedom + 1 - square));
  const ratio = h / gap;
  const out = at.out + i;
  f64[out] = response - residual;
  f64[out + COLUMN_STRIDE] = h;
  f64[out + 2 * COLUMN_STRIDE] = r;
  f64[out + 3 * COLUMN_STRIDE] = t;
  f64[out + 4 * COLUMN_STRIDE] = (square * ratio) / rank;
  f64[out + 5 * COLUMN_STRIDE] = t * Math.sqrt(ratio);
  f64[out + 6 * COLUMN_STRIDE] = response - residual / gap;
}
