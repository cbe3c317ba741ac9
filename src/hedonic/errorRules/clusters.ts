/** Which cluster each sale of a fit belongs to. */

import { lowerStart } from "../../domain/format.ts";
import type { TextColumn } from "../../domain/sale.ts";
import { isIndicator } from "../../numerics/column.ts";
import type { Fit } from "../fit.ts";
import { noSuchCluster } from "./refusals.ts";

/** What a model clusters by when it is not the key of a choice. */
export const BY_SOURCE = "source";

export interface Clusters {
  /** "source", or the label of the choice inside a sentence. */
  readonly label: string;
  /** n, 0 … count − 1 in order of first occurrence among the sales that count. */
  readonly codes: Int32Array;
  readonly count: number;
}

/** Refuses an attribute that is neither a choice nor yes/no of the reference set, and "source" without sources. */
export function clustersOf({ design, rule }: Fit, by: string, sources: TextColumn | null): Clusters {
  const group = design.groups.find(({ key }) => key === by);
  const label = by === BY_SOURCE ? "source" : lowerStart(group?.label ?? by);
  const keyOf = by === BY_SOURCE ? sourceOf(design.rows, sources) : levelOf({ design }, by);
  if (keyOf === null) throw noSuchCluster(label);
  const numbers = new Map<string | number, number>();
  const codes = Int32Array.from({ length: design.n }, (_, i) => {
    if (rule.weights !== null && !(rule.weights[i]! > 0)) return 0;
    const key = keyOf(i);
    const known = numbers.get(key);
    if (known !== undefined) return known;
    numbers.set(key, numbers.size);
    return numbers.size - 1;
  });
  return { label, codes, count: numbers.size };
}

function sourceOf(rows: Int32Array, sources: TextColumn | null): ((i: number) => string) | null {
  return sources === null ? null : (i) => sources.at(rows[i]!)!;
}

/** The stored level (a choice's columns share its codes), or 0/1 of yes/no. */
function levelOf({ design }: Pick<Fit, "design">, key: string): ((i: number) => number) | null {
  const group = design.groups.find((one) => one.key === key);
  const first = group?.columns[0];
  if (group === undefined || first === undefined || group.isMarket) return null;
  const { values } = design.columns[first]!;
  if (isIndicator(values)) return (i) => values.codes[i]!;
  return group.form === "yesNo" ? (i) => values[i]! : null;
}
