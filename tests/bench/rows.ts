// The rows of the benchmark and what each is to reach. One place: the figures take their reach from here.

export interface BenchRow {
  readonly id: string;
  readonly work: string;
  /** By what a figure is held against: a ratio to reach, or a time not to exceed. */
  readonly reaches: Readonly<Record<string, number>>;
}

export const LSTSQ = "numpy lstsq";
export const NORMAL = "numpy normal equations";
export const LM_FIT = "R .lm.fit";
export const LM = "R lm";
/** hatvalues, rstandard, rstudent, cooks.distance, dffits, fitted values and price without the row. */
export const R_APART = "R, each function called by itself";
export const R_SHARED = "R, all from one shared lm.influence";
export const C_ORDER = "numpy lstsq, design row by row (as column_stack makes it)";
export const ML_MATRIX = "ml-matrix QR";
export const PAPAPARSE = "plain papaparse (which ours uses)";
export const DIGITS_1E5 = "correct digits up to condition 1e5";
export const DIGITS_1E8 = "correct digits up to condition 1e8";

export const ROWS: readonly BenchRow[] = [
  {
    id: "fit",
    work: "fit from columns in memory, 10⁶ × 30",
    reaches: { [LSTSQ]: 6, [LM_FIT]: 5, [LM]: 10 },
  },
  { id: "guarded", work: "guarded and refined fit, 10⁶ × 30", reaches: { [LSTSQ]: 3, [DIGITS_1E5]: 15 } },
  { id: "careful", work: "careful path, 10⁶ × 30", reaches: { [LSTSQ]: 1.5, [DIGITS_1E8]: 15 } },
  { id: "levels", work: "fit with many choice levels, 10⁵ × 60", reaches: { [LSTSQ]: 20, [LM_FIT]: 15 } },
  { id: "small", work: "fit, 10³ × 30", reaches: { [LSTSQ]: 1.5 } },
  { id: "threads", work: "moments on two threads, 10⁶ rows", reaches: { "one thread": 1.8 } },
  {
    id: "live",
    work: "all coefficients and standard errors after a change, p = 30",
    reaches: {
      "switch one attribute": 0.05,
      "switch one attribute, a choice of 6 levels": 0.05,
      "add one sale": 0.05,
      "remove one sale": 0.05,
    },
  },
  {
    id: "sets",
    work: "all 2¹⁵ attribute sets, 1000 sales",
    reaches: { "R² + leave-one-out error (rows) + shares": 20 },
  },
  { id: "rows", work: "seven row diagnostics, 10⁶ × 30", reaches: { [R_APART]: 10, [R_SHARED]: 10 } },
  {
    id: "load",
    work: "load 10⁶ × 22 from the store",
    reaches: { "rows to arrays": 2000, "from the columnar copy": 200 },
  },
  { id: "memory", work: "peak memory of the whole process, 10⁶ × 60", reaches: { [LSTSQ]: 5, [C_ORDER]: 5 } },
  { id: "growth", work: "fit, p = 30, n = 10³ … 10⁶", reaches: {} },
  { id: "mlmatrix", work: "fit, 10⁵ × 30", reaches: {} },
  { id: "import", work: "read a file of sales, 10⁵ × 22, to cells", reaches: {} },
];

export function reachOf(row: string, what: string): number | null {
  const found = ROWS.find(({ id }) => id === row);
  if (found === undefined) throw new Error(`there is no row ${row}`);
  return found.reaches[what] ?? null;
}
