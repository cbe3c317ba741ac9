/**
 * Exact dependencies of a design once found, kept for as long as the design is. They do not change when attributes are left out:
 * only which of the columns is called the dependent one does, and that is read off the kept equations by Gaussian elimination
 * from the last column of the new order backwards, without a pass over the sales.
 */
import type { Dependency } from "../numerics/findDependencies.ts";
import type { Design } from "./fit.ts";

/** Per dependency the column less its terms, as coefficients by design column, each times the column's spread. */
type Equation = ReadonlyMap<number, number>;

/** A coefficient below this share of its equation's largest is what elimination leaves of none. */
const NONE = 1e-8;

const KNOWN = new WeakMap<Design, readonly Equation[]>();

/** `dependent` speaks of places in `order`, which holds design columns. */
export function rememberDependencies(design: Design, order: readonly number[], dependent: readonly Dependency[]): void {
  const spread = (column: number): number => design.moments.scales[column]!;
  const equations = dependent.map(({ column, terms }) => {
    const own = order[column]!;
    const equation = new Map([[own, spread(own)]]);
    for (const term of terms) equation.set(order[term.column]!, -term.coefficient * spread(order[term.column]!));
    return equation;
  });
  KNOWN.set(design, equations);
}

/** Design columns that depend on those before them in `order`; null while nobody has looked for dependencies. */
export function dependentIn(design: Design, order: readonly number[]): ReadonlySet<number> | null {
  const known = KNOWN.get(design);
  if (known === undefined) return null;
  let left = known.map((equation) => new Map(equation));
  const dependent = new Set<number>();
  for (const column of [...order].reverse()) {
    if (left.length === 0) break;
    const shares = left.map((equation) => Math.abs(equation.get(column) ?? 0) / largestOf(equation));
    const best = shares.indexOf(Math.max(...shares));
    if (!(shares[best]! > NONE)) continue;
    dependent.add(column);
    const pivot = left[best]!;
    left = left.filter((equation) => equation !== pivot);
    for (const equation of left) eliminate(equation, pivot, column);
  }
  return dependent;
}

function largestOf(equation: Equation): number {
  return Math.max(...[...equation.values()].map(Math.abs));
}

/** Takes `column` out of the equation; what cancels but for rounding goes too. */
function eliminate(equation: Map<number, number>, pivot: Equation, column: number): void {
  const factor = (equation.get(column) ?? 0) / pivot.get(column)!;
  if (factor === 0) return;
  for (const [key, value] of pivot) {
    const before = equation.get(key) ?? 0;
    const after = before - factor * value;
    const isNone = key === column || Math.abs(after) <= NONE * Math.max(Math.abs(before), Math.abs(factor * value));
    if (isNone) equation.delete(key);
    else equation.set(key, after);
  }
}
