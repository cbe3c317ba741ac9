/**
 * The sets that are looked at, and their table: which groups can be in or out, which are in every set, fits of all of them
 * at the weights and penalties of the fit in use.
 */
import type { AttributeGroup, Design, Fit, SubjectRow } from "../hedonic/fit.ts";
import { accumulateMoments, type Moments, partsBy } from "../numerics/accumulateMoments.ts";
import { allSubsets, type SubsetTable } from "../numerics/allSubsets.ts";
import type { Column } from "../numerics/column.ts";
import { foldErrors, LEAVE_ONE_OUT_WORK, leaveOneOutErrors } from "../numerics/subsetErrors.ts";

export interface SetTable {
  readonly fit: Fit;
  readonly moments: Moments;
  /** Bit g of a set stands for groups[g]. */
  readonly groups: readonly AttributeGroup[];
  readonly alwaysIn: readonly AttributeGroup[];
  /** Those of alwaysIn that are there because no more than fifteen can be in or out. */
  readonly pinned: readonly AttributeGroup[];
  /** Held in every set, or out of every set, by wish. */
  readonly heldIn: readonly AttributeGroup[];
  readonly heldOut: readonly AttributeGroup[];
  readonly notKnown: readonly AttributeGroup[];
  readonly table: SubsetTable;
  /** The set of the fit in use. */
  readonly current: number;
}

export interface SetTableInput {
  /** Groups of the reference set (after exact dependencies). */
  readonly reference: readonly AttributeGroup[];
  /** The fit in use: some of these groups. */
  readonly fit: Fit;
  readonly row: SubjectRow | null;
  /** Keys that are in every set, or in none; the others are free. */
  readonly pins?: Pins;
}

export interface Pins {
  readonly alwaysIn: readonly string[];
  readonly alwaysOut: readonly string[];
}

const NO_PINS: Pins = { alwaysIn: [], alwaysOut: [] };

const FOLDS = 10;
/** Attributes that can be in or out: 32,768 sets. */
const MOST_FREE = 15;

/** `coefficients`: whether those of every set are kept in the table. */
export function buildSetTable({ reference, fit, row, pins = NO_PINS }: SetTableInput, coefficients = true): SetTable {
  const { design, rule } = fit;
  const values: Column[] = design.columns.map((column) => column.values);
  const moments = accumulateMoments([...values, design.response], { weights: rule.weights ?? undefined });
  const isKnown = ({ key, columns }: AttributeGroup): boolean =>
    row === null || (!row.notKnown.includes(key) && columns.every((j) => Number.isFinite(row.x[j]!)));
  const isHeld = (keys: readonly string[]) => (group: AttributeGroup) => !group.isMarket && keys.includes(group.key);
  const known = reference.filter((group) => isKnown(group) && !isHeld(pins.alwaysOut)(group));
  const heldIn = known.filter(isHeld(pins.alwaysIn));
  const isGiven = (group: AttributeGroup): boolean => group.isMarket || heldIn.includes(group);
  const free = mostInDoubt(
    known.filter((group) => !isGiven(group)),
    known.filter(isGiven),
    moments,
    rule.penalty,
  );
  const alwaysIn = known.filter((group) => !free.includes(group));
  const table = allSubsets(moments, columnsOf(free), {
    alwaysIn: alwaysIn.flatMap(({ columns }) => [...columns]),
    subject: row?.x,
    penalty: rule.penalty,
    coefficients,
  });
  const isInUse = ({ key }: AttributeGroup): boolean => fit.groups.some((group) => group.key === key);
  return {
    fit,
    moments,
    groups: free,
    alwaysIn,
    pinned: alwaysIn.filter((group) => !isGiven(group)),
    heldIn,
    heldOut: reference.filter((group) => isKnown(group) && isHeld(pins.alwaysOut)(group)),
    notKnown: reference.filter((group) => !isKnown(group)),
    table,
    current: free.reduce((set, group, g) => set + (isInUse(group) ? 2 ** g : 0), 0),
  };
}

/** Of more than fifteen groups those that can go at the least loss of fit from the whole set, one by one, in their own order. */
function mostInDoubt(
  groups: readonly AttributeGroup[],
  given: readonly AttributeGroup[],
  moments: Moments,
  penalty: Float64Array | null,
): readonly AttributeGroup[] {
  if (groups.length <= MOST_FREE) return groups;
  const lossOf = (group: AttributeGroup): number => {
    const rest = [...given, ...groups].filter((other) => other !== group);
    const alwaysIn = rest.flatMap(({ columns }) => [...columns]);
    return allSubsets(moments, [], { alwaysIn, penalty }).residualSums[0]!;
  };
  const losses = new Map(groups.map((group) => [group, lossOf(group)]));
  const least = [...groups].sort((a, b) => losses.get(a)! - losses.get(b)!).slice(0, MOST_FREE);
  return groups.filter((group) => least.includes(group));
}

export function columnsOf(groups: readonly AttributeGroup[]): (readonly number[])[] {
  return groups.map(({ columns }) => columns);
}

/** A product of two attributes counts only beside both of them. */
export function isOffered({ groups, alwaysIn }: Pick<SetTable, "groups" | "alwaysIn">, set: number): boolean {
  const has = (key: string): boolean => {
    const g = groups.findIndex((group) => group.key === key);
    return g >= 0 ? (set & (1 << g)) !== 0 : alwaysIn.some((group) => group.key === key);
  };
  return groups.every((group, g) => (set & (1 << g)) === 0 || partsOf(group).every(has));
}

function partsOf({ key }: AttributeGroup): string[] {
  return key.includes("*") ? key.split("*") : [];
}

export interface SetErrors {
  readonly kind: "leave-one-out" | "ten-folds";
  /** Σ w (error on a sale not used)², per set. */
  readonly sums: Float64Array;
}

/** One sale left out where that takes some half a second at most; else ten folds, sales dealt out in turn in order of day. */
export function errorsOf({ fit, moments, groups, alwaysIn }: SetTable): SetErrors {
  const { design, rule } = fit;
  const values: Column[] = design.columns.map((column) => column.values);
  const options = { alwaysIn: alwaysIn.flatMap(({ columns }) => [...columns]), penalty: rule.penalty };
  if (design.n * 2 ** groups.length <= LEAVE_ONE_OUT_WORK || design.n < 2 * FOLDS) {
    const more = { ...options, weights: rule.weights };
    return {
      kind: "leave-one-out",
      sums: leaveOneOutErrors(moments, values, design.response, columnsOf(groups), more),
    };
  }
  const codes = Uint16Array.from({ length: design.n }, (_, i) => i % FOLDS);
  const folds = partsBy([...values, design.response], codes, FOLDS, rule.weights ?? undefined);
  return { kind: "ten-folds", sums: foldErrors(folds, columnsOf(groups), options) };
}

/** Rows × columns² that a few sets by themselves may take: some half a second. */
const SINGLE_SETS_WORK = 2e8;
const MOST_SINGLE_SETS = 20;

/** Exact errors with one sale left out of as many of these sets, in order, as take little time. */
export function leaveOneOutOf(sets: SetTable, wanted: readonly number[]): { set: number; sum: number }[] {
  const { fit, moments, groups, alwaysIn } = sets;
  const { design, rule } = fit;
  const values: Column[] = design.columns.map((column) => column.values);
  const width = values.length + 1;
  const count = Math.min(MOST_SINGLE_SETS, Math.floor(SINGLE_SETS_WORK / (design.n * width * width)));
  return wanted.slice(0, count).map((set) => {
    const inside = [...alwaysIn, ...groups.filter((_, g) => (set & (1 << g)) !== 0)];
    const options = { alwaysIn: columnsOf(inside).flat(), penalty: rule.penalty, weights: rule.weights };
    return { set, sum: leaveOneOutErrors(moments, values, design.response, [], options)[0]! };
  });
}

/** Root mean square error as a share of price, as in the report of a model: after ln e^rms − 1, plain over the average. */
export function typicalError({ design }: Fit, moments: Moments, sum: number): number {
  const rms = Math.sqrt(sum / moments.weightSum);
  return design.responseForm === "lnPrice" ? Math.expm1(rms) : rms / moments.means.at(-1)!;
}

/** From the response's scale to money. */
export function backFrom(design: Design): (value: number) => number {
  return design.responseForm === "lnPrice" ? Math.exp : (value) => value;
}
