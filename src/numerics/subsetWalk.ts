/**
 * A walk over all 2^k sets of groups of columns that never does the same elimination twice: from each set to those with one
 * later group more (a depth-first tree of Schur complements, Furnival & Wilson 1974). Each step takes a column out of all
 * later ones; depth is k at most, so rounding does not add up over the sets.
 * Symbols: M symmetric, c_l = M_jl/M_jj (the slope of l on the pivot j, the columns before it held).
 */

/** Something that is carried along the walk, one state per depth. */
export interface Carried {
  /** The state at `to` is that at `from` with the pivot taken out of everything later; `from` may equal `to`. */
  take(from: number, to: number, pivot: number): void;
}

export interface SubsetPlan {
  /** Column numbers in the order of elimination: those that are always in, then the groups, widest first. */
  readonly order: readonly number[];
  /** Groups in that order: where their columns start and end in `order`, and the bit that a set has for them. */
  readonly groups: readonly { readonly start: number; readonly end: number; readonly bit: number }[];
  readonly alwaysIn: number;
}

/** Bit g of a set stands for groups[g]. */
export function planSubsets(groups: readonly (readonly number[])[], alwaysIn: readonly number[] = []): SubsetPlan {
  const order = [...alwaysIn];
  const sorted = groups.map((columns, g) => ({ columns, bit: 2 ** g }));
  sorted.sort((a, b) => b.columns.length - a.columns.length || a.bit - b.bit);
  const placed = sorted.map(({ columns, bit }) => {
    const start = order.length;
    order.push(...columns);
    return { start, end: order.length, bit };
  });
  return { order, groups: placed, alwaysIn: alwaysIn.length };
}

/** Depths that a walk needs: one for the start, one for what is always in, one per group. */
export function depthsOf(plan: SubsetPlan): number {
  return plan.groups.length + 2;
}

/** Takes what is always in, then visits every set once; the carried things are in their state for it at `depth`. */
export function walkSubsets(
  plan: SubsetPlan,
  carried: readonly Carried[],
  visit: (set: number, depth: number) => void,
): void {
  const { groups } = plan;
  const include = (depth: number, start: number, end: number): void => {
    for (let pivot = start; pivot < end; pivot++) {
      for (const one of carried) one.take(pivot === start ? depth : depth + 1, depth + 1, pivot);
    }
  };
  const from = (depth: number, next: number, set: number): void => {
    visit(set, depth);
    for (let g = next; g < groups.length; g++) {
      const { start, end, bit } = groups[g]!;
      include(depth, start, end);
      from(depth + 1, g + 1, set + bit);
    }
  };
  include(0, 0, plan.alwaysIn);
  from(plan.alwaysIn > 0 ? 1 : 0, 0, 0);
}

export interface Eliminated extends Carried {
  /** Per depth M, size × size row-major; only entries on and above the diagonal, later than the last pivot, are kept. */
  readonly levels: readonly Float64Array[];
  /** c of each pivot that is in now, size × size: row j holds c_l for l > j. All zero for a dependent pivot. */
  readonly ratios: Float64Array;
  /** M_jj of each pivot that is in now; 0 for a dependent one. */
  readonly pivots: Float64Array;
  /** Per depth how many pivots were independent, and the smallest of them relative to its column's own diagonal. */
  readonly ranks: Uint16Array;
  readonly smallest: Float64Array;
}

/** A pivot below this share of its column's own spread is rounding: the column depends on those before it. */
const DEPENDENT = 1e-11;

/** M carried along the walk. `matrix` holds at least the upper triangle. */
export function carryMatrix(matrix: Float64Array, size: number, depths: number): Eliminated {
  const levels = Array.from({ length: depths }, (_, depth) => (depth === 0 ? matrix : new Float64Array(size * size)));
  const ratios = new Float64Array(size * size);
  const pivots = new Float64Array(size);
  const ranks = new Uint16Array(depths);
  const smallest = new Float64Array(depths).fill(1);
  const diagonal = Float64Array.from({ length: size }, (_, j) => matrix[j * size + j]!);
  return {
    levels,
    ratios,
    pivots,
    ranks,
    smallest,
    take(from, to, j) {
      const source = levels[from]!;
      const target = levels[to]!;
      const row = j * size;
      const pivot = source[row + j]!;
      const isIndependent = pivot > DEPENDENT * diagonal[j]!;
      const inverse = isIndependent ? 1 / pivot : 0;
      pivots[j] = isIndependent ? pivot : 0;
      ranks[to] = ranks[from]! + (isIndependent ? 1 : 0);
      smallest[to] = Math.min(smallest[from]!, isIndependent ? pivot / diagonal[j]! : 0);
      for (let l = j + 1; l < size; l++) {
        const ratio = source[row + l]! * inverse;
        const at = l * size;
        ratios[row + l] = ratio;
        for (let m = l; m < size; m++) target[at + m] = source[at + m]! - ratio * source[row + m]!;
      }
    },
  };
}

/**
 * A second quadratic form Q of the same variables, to which each step does what it does to the variables, z_l − c_l z_j:
 * Q_lm − c_l Q_jm − c_m Q_jl + c_l c_m Q_jj. So the response's entry is the sum of squared errors, on the rows that Q was summed
 * over, of the coefficients that M gives. `size` is that of M or less: later variables of M are not carried.
 */
export function carryForm(
  form: Float64Array,
  size: number,
  by: Eliminated,
  width: number,
  depths: number,
): Carried & {
  readonly levels: readonly Float64Array[];
} {
  const levels = Array.from({ length: depths }, (_, depth) => (depth === 0 ? form : new Float64Array(size * size)));
  const { ratios } = by;
  return {
    levels,
    take(from, to, j) {
      const source = levels[from]!;
      const target = levels[to]!;
      const row = j * size;
      const pivot = source[row + j]!;
      for (let l = j + 1; l < size; l++) {
        const ratio = ratios[j * width + l]!;
        const at = l * size;
        const first = source[row + l]! - ratio * pivot;
        for (let m = l; m < size; m++) {
          target[at + m] = source[at + m]! - ratio * source[row + m]! - ratios[j * width + m]! * first;
        }
      }
    },
  };
}
