/** What a check of a fit found, as plain data: made by hedonic/diagnoseFit, shown as it is. */

export type Verdict = "fine" | "look" | "trouble";

export type DiagnosisCode =
  | "spread"
  | "spreadWithPrice"
  | "shape"
  | "tails"
  | "curvature"
  | "bends"
  | "order"
  | "forecast"
  | "drift"
  | "outlier"
  | "influence"
  | "collinearity";

export interface Diagnosis {
  readonly code: DiagnosisCode;
  readonly label: string;
  readonly statistic: number;
  /** Degrees of freedom: one for chi-squared and t, two for F, none for a statistic with a distribution of its own. */
  readonly df: readonly number[];
  /** Null where the check is a measure and not a test. */
  readonly p: number | null;
  readonly verdict: Verdict;
  readonly sentence: string;
  readonly whatToDo: string;
  readonly source: string;
  /** Sales concerned, the worst first, as places in the SaleColumns the design was built from (Design.rows); at most 20. */
  readonly sales?: readonly number[];
  /** Attributes concerned, the worst first: keys of their groups. */
  readonly attributes?: readonly string[];
  /** Figures behind the verdict, in the order they are read. */
  readonly details?: readonly DiagnosisDetail[];
}

export interface DiagnosisDetail {
  readonly label: string;
  readonly value: number;
  /** From where on the value counts as large; null where there is no such limit. */
  readonly limit: number | null;
}

export interface FitDiagnoses {
  /** The most serious first. */
  readonly found: readonly Diagnosis[];
  readonly leftOut: readonly { readonly code: DiagnosisCode; readonly label: string; readonly reason: string }[];
}
