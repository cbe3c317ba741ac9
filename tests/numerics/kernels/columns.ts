/** Drawn columns of every kind for the tests of moments: numbers of several sizes, levels of choices, yes/no, constants. */
import { type Column, indicator } from "../../../src/numerics/column.ts";
import { drawFrom } from "../../fixtures/randomClass.ts";

const KINDS: readonly ((draw: () => number, i: number) => number)[] = [
  (draw) => Math.floor(draw() * 200),
  (draw) => 45.2 + draw() / 1000,
  (_, i) => 20000 + Math.floor(i / 7),
  () => 12.5,
  (draw) => 1e-9 * (draw() - 0.5),
  (draw) => Math.exp(8 * draw()),
];

/** `numbers` columns of numbers, then one column per level but the first of choices with so many levels. */
export function drawColumns(seed: number, rows: number, numbers: number, levels: readonly number[]): Column[] {
  const draw = drawFrom(seed);
  const columns: Column[] = Array.from({ length: numbers }, (_, j) =>
    Float64Array.from({ length: rows }, (_, i) => KINDS[j % KINDS.length]!(draw, i)),
  );
  for (const count of levels) {
    const codes = Uint16Array.from({ length: rows }, () => Math.floor(count * draw() * draw()));
    for (let level = 1; level < count; level++) columns.push(indicator(codes, level));
  }
  return columns;
}

export function drawWeights(seed: number, rows: number): Float64Array {
  const draw = drawFrom(seed);
  return Float64Array.from({ length: rows }, () => (draw() < 0.2 ? 0 : 2 ** (-3 * draw())));
}
