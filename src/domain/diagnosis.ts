/** What a check of a fit found, as plain data: made by hedonic/diagnoseFit, shown as it is. */

export type Verdict = "fine" | "look" | "trouble";

export interface Diagnosis {
  readonly code: "spread" | "spreadWithPrice" | "shape" | "curvature" | "outlier";
  readonly label: string;
  readonly statistic: number;
  /** Degrees of freedom: one for chi-squared and t, two for F. */
  readonly df: readonly number[];
  readonly p: number;
  readonly verdict: Verdict;
  readonly sentence: string;
  readonly whatToDo: string;
  readonly source: string;
}

export interface FitDiagnoses {
  /** The most serious first. */
  readonly found: readonly Diagnosis[];
  readonly leftOut: readonly { readonly code: Diagnosis["code"]; readonly reason: string }[];
}
