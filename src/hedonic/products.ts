/**
 * Products of two attributes: what one does may depend on the other. Members are centred at their means over the evidence, so
 * that each member's own coefficient still reads at the average of the other (Aiken & West 1991).
 */
import { type Column, numbersOf } from "../numerics/column.ts";
import type { AttributeGroup, DesignColumn } from "./fit.ts";

export interface ProductColumns {
  readonly columns: readonly Pick<DesignColumn, "level" | "values">[];
  readonly group: Omit<AttributeGroup, "columns">;
}

/** Columns of a in turn, each times every column of b. `means` are those of the design's columns. */
export function productColumns(a: AttributeGroup, b: AttributeGroup, columns: readonly DesignColumn[]): ProductColumns {
  const pairs = a.columns.flatMap((first) => b.columns.map((second) => [columns[first]!, columns[second]!] as const));
  const isSingle = pairs.length === 1;
  return {
    columns: pairs.map(([first, second]) => ({
      level: levelOf(first, second),
      values: product(first.values, first.mean, second.values, second.mean),
    })),
    group: {
      key: `${a.key}*${b.key}`,
      label: `${a.label} × ${b.label.charAt(0).toLowerCase()}${b.label.slice(1)}`,
      form: "line",
      unit: null,
      decimals: 2,
      step: a.step * b.step,
      stepWords: isSingle
        ? `${a.stepWords ?? "yes"} × ${b.stepWords ?? "yes"}`
        : (a.stepWords ?? b.stepWords ?? "both"),
      reference: null,
      isMarket: false,
      stored: null,
      numbersAt: () => [],
      knots: [],
      merged: null,
      reading: "reference",
      product: { a: a.key, b: b.key },
      blend: null,
    },
  };
}

function levelOf(first: DesignColumn, second: DesignColumn): string | null {
  const levels = [first.level, second.level].filter((level) => level !== null && level !== "yes");
  return levels.length === 0 ? null : levels.join(", ");
}

function product(a: Column, meanA: number, b: Column, meanB: number): Float64Array {
  const [x, z] = [numbersOf(a), numbersOf(b)];
  return x.map((value, i) => (value - meanA) * (z[i]! - meanB));
}
