/**
 * A fit that answers while someone switches columns or takes sales in and out, from moments alone, whatever the number of
 * rows: sweep operator (Beaton 1964; Goodnight 1979) on the upper triangle of A = [columns, response].
 * Swept on k: A_ij − A_ik A_kj/A_kk elsewhere, A_ik/A_kk in its row, −1/A_kk on the diagonal; swept back, the row's sign turns.
 * With a set swept: the response's column holds b, its diagonal Σ w e² (+ penalties), the set's own block −C⁻¹.
 * Not refined: a reported fit comes from `solveLeastSquares` and replaces it.
 */
import { addRow, type Moments, removeRow } from "./accumulateMoments.ts";
import { NumericsError } from "./numericsError.ts";

export interface LiveAnswer {
  /** Always false: the refined fit of the same columns has the last digits. */
  readonly isFinal: false;
  /** Column numbers in ascending order. */
  readonly columns: readonly number[];
  readonly intercept: number;
  /** b in raw units, in the order of `columns`. */
  readonly slopes: Float64Array;
  /** Of the slopes; NaN without residual degrees of freedom. */
  readonly standardErrors: Float64Array;
  readonly residualSumOfSquares: number;
  readonly residualDf: number;
  /** s; null without residual degrees of freedom. */
  readonly residualStandardError: number | null;
  /** Against the mean; 0 for a constant response. */
  readonly r2: number;
  /** Smallest pivot relative to its column's spread since the last start afresh: digits lost are twice those of 1/√ of it. */
  readonly smallestPivot: number;
}

export interface LiveEstimate {
  /** ȳ + Σ b_j(x_j − x̄_j), on the response's scale. */
  readonly fitted: number;
  /** 1/Σw + d′C⁻¹d with d = x − x̄, penalties in C. */
  readonly leverage: number;
}

export interface LiveFit {
  /** Switches each of the columns that is out in, and each that is in out; O(q²) each. */
  switchColumns(columns: readonly number[]): void;
  /** Takes one sale more in, [columns, response]. */
  addSale(row: ArrayLike<number>, weight?: number): void;
  /** Takes a sale out that is in the moments at this weight. */
  removeSale(row: ArrayLike<number>, weight?: number): void;
  answer(): LiveAnswer;
  /** At one value per candidate column, raw; those of columns that are out are not read. */
  estimateAt(x: ArrayLike<number>): LiveEstimate;
  /** The moments as edited. */
  readonly moments: Moments;
}

/** A pivot below this share of its column's spread: the column depends on those that are in. */
const DEPENDENT = 1e-11;
/** After a pivot this small the next switch starts afresh: sweeping back over it would keep its rounding. */
const FRESH_PIVOT = 1e-4;
/** And after so many switches in any case; rounding grows with their number. */
const FRESH_SWITCHES = 64;

interface State {
  moments: Moments;
  readonly q: number;
  readonly penalty: Float64Array | null;
  /** q × q, upper triangle. */
  readonly swept: Float64Array;
  readonly row: Float64Array;
  readonly isIn: Uint8Array;
  switches: number;
  smallest: number;
}

/**
 * A live fit of `columns` of the moments of [all candidate columns, response]; `penalty` one per candidate in raw units.
 * Refuses (shape) columns that are not there and (rankDeficient) columns that depend on those already in, naming them; the fit
 * stays as it was.
 */
export function openLiveFit(
  moments: Moments,
  columns: readonly number[],
  penalty: Float64Array | null = null,
): LiveFit {
  const q = moments.scales.length;
  if (penalty !== null && penalty.length !== q - 1)
    throw new NumericsError("shape", `${penalty.length} penalties for ${q - 1} columns`);
  const state: State = {
    moments,
    q,
    penalty,
    swept: new Float64Array(q * q),
    row: new Float64Array(q),
    isIn: new Uint8Array(q),
    switches: 0,
    smallest: 1,
  };
  switchColumns(state, columns);
  return {
    switchColumns: (some) => switchColumns(state, some),
    addSale: (row, weight) => replaceMoments(state, addRow(state.moments, row, weight)),
    removeSale: (row, weight) => replaceMoments(state, removeRow(state.moments, row, weight)),
    answer: () => answerOf(state),
    estimateAt: (x) => estimateAt(state, x),
    get moments() {
      return state.moments;
    },
  };
}

function switchColumns(state: State, columns: readonly number[]): void {
  const { q, isIn } = state;
  const wrong = columns.filter((j) => !(j >= 0 && j < q - 1) || isIn[j] === undefined);
  if (wrong.length > 0) throw new NumericsError("shape", "there are no such columns", [...wrong]);
  const before = isIn.slice();
  for (const j of columns) isIn[j] = 1 - isIn[j]!;
  state.switches += columns.length;
  const isFresh = state.switches >= FRESH_SWITCHES || state.smallest < FRESH_PIVOT || before.every((one) => one === 0);
  const dependent = isFresh ? startAfresh(state) : sweepAll(state, columns, before);
  if (dependent.length === 0) return;
  isIn.set(before);
  startAfresh(state);
  throw new NumericsError("rankDeficient", "columns depend on those that are in", dependent);
}

/** Sweeps what has changed; the columns that could not be swept. */
function sweepAll(state: State, columns: readonly number[], before: Uint8Array): number[] {
  return columns.filter((j) => state.isIn[j] !== before[j] && !sweep(state, j, state.isIn[j] === 0));
}

function replaceMoments(state: State, moments: Moments): void {
  const before = state.moments;
  state.moments = moments;
  const dependent = startAfresh(state);
  if (dependent.length === 0) return;
  state.moments = before;
  startAfresh(state);
  throw new NumericsError("rankDeficient", "columns depend on each other in the sales that are left", dependent);
}

/** A from the moments, then every column that is in swept. */
function startAfresh(state: State): number[] {
  const { moments, q, penalty, swept, isIn } = state;
  swept.set(moments.crossProducts);
  if (penalty !== null) {
    for (let j = 0; j < q - 1; j++) swept[j * q + j] = swept[j * q + j]! + penalty[j]! / moments.scales[j]! ** 2;
  }
  state.switches = 0;
  state.smallest = 1;
  const dependent: number[] = [];
  for (let j = 0; j < q - 1; j++) if (isIn[j] === 1 && !sweep(state, j, false)) dependent.push(j);
  return dependent;
}

/** Sweeps on column k, or back; false, and nothing done, where its pivot is only rounding. */
function sweep(state: State, k: number, isBack: boolean): boolean {
  const { q, swept, row } = state;
  const pivot = swept[k * q + k]!;
  if (!isBack && !isPivot(state, k, pivot)) return false;
  for (let i = 0; i < k; i++) row[i] = swept[i * q + k]!;
  for (let i = k; i < q; i++) row[i] = swept[k * q + i]!;
  const inverse = 1 / pivot;
  for (let i = 0; i < q; i++) {
    const ratio = row[i]! * inverse;
    if (i === k || ratio === 0) continue;
    const at = i * q;
    for (let j = i; j < q; j++) swept[at + j] = swept[at + j]! - ratio * row[j]!;
  }
  const sign = isBack ? -inverse : inverse;
  for (let i = 0; i < k; i++) swept[i * q + k] = row[i]! * sign;
  for (let i = k + 1; i < q; i++) swept[k * q + i] = row[i]! * sign;
  swept[k * q + k] = -inverse;
  return true;
}

function isPivot(state: State, k: number, pivot: number): boolean {
  const { moments, q, penalty } = state;
  const own = moments.crossProducts[k * q + k]! + (penalty === null ? 0 : penalty[k]! / moments.scales[k]! ** 2);
  if (!(pivot > DEPENDENT * own)) return false;
  state.smallest = Math.min(state.smallest, pivot / own);
  return true;
}

function answerOf(state: State): LiveAnswer {
  const { moments, q, swept, isIn, smallest } = state;
  const { means, scales } = moments;
  const y = q - 1;
  const columns: number[] = [];
  for (let j = 0; j < y; j++) if (isIn[j] === 1) columns.push(j);
  const slopes = new Float64Array(columns.length);
  const standardErrors = new Float64Array(columns.length);
  const residualSum = residualSumOf(state, columns) * scales[y]! ** 2;
  const residualDf = moments.rowCount - columns.length - 1;
  const s = residualDf > 0 ? Math.sqrt(residualSum / residualDf) : null;
  let intercept = means[y]!;
  columns.forEach((j, a) => {
    slopes[a] = (swept[j * q + y]! * scales[y]!) / scales[j]!;
    standardErrors[a] = s === null ? Number.NaN : (s * Math.sqrt(-swept[j * q + j]!)) / scales[j]!;
    intercept -= slopes[a]! * means[j]!;
  });
  const total = moments.crossProducts[q * q - 1]! * scales[y]! ** 2;
  return {
    isFinal: false,
    columns,
    intercept,
    slopes,
    standardErrors,
    residualSumOfSquares: residualSum,
    residualDf,
    residualStandardError: s,
    r2: total > 0 ? 1 - residualSum / total : 0,
    smallestPivot: smallest,
  };
}

function estimateAt({ moments, q, swept, isIn }: State, x: ArrayLike<number>): LiveEstimate {
  const { means, scales, weightSum } = moments;
  const y = q - 1;
  const d = Float64Array.from({ length: y }, (_, j) => (isIn[j] === 1 ? (x[j]! - means[j]!) / scales[j]! : 0));
  let fitted = means[y]!;
  let form = 0;
  for (let i = 0; i < y; i++) {
    if (isIn[i] !== 1) continue;
    fitted += swept[i * q + y]! * scales[y]! * d[i]!;
    form -= swept[i * q + i]! * d[i]! * d[i]!;
    for (let j = i + 1; j < y; j++) if (isIn[j] === 1) form -= 2 * swept[i * q + j]! * d[i]! * d[j]!;
  }
  return { fitted, leverage: 1 / weightSum + form };
}

/** Σ w e² in the response's scale: what stands swept, less Σ λ b². */
function residualSumOf({ moments, q, swept, penalty }: State, columns: readonly number[]): number {
  let sum = swept[q * q - 1]!;
  if (penalty !== null) {
    for (const j of columns) sum -= (penalty[j]! / moments.scales[j]! ** 2) * swept[j * q + q - 1]! ** 2;
  }
  return Math.max(0, sum);
}
