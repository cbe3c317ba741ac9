/** Runs every check over a fit, the most serious finding first; checks that cannot be run are left out with the reason. */
import type { Diagnosis, FitDiagnoses } from "../domain/diagnosis.ts";
import { curvature } from "./diagnostics/curvature.ts";
import type { Diagnostic } from "./diagnostics/diagnostic.ts";
import { outlier } from "./diagnostics/outlier.ts";
import { shape } from "./diagnostics/shape.ts";
import { spread, spreadWithPrice } from "./diagnostics/spread.ts";
import type { Fit } from "./fit.ts";

const FAMILY: readonly Diagnostic[] = [spread, spreadWithPrice, shape, curvature, outlier];
const SEVERITY = { trouble: 0, look: 1, fine: 2 } as const;

export function diagnoseFit(fit: Fit): FitDiagnoses {
  const found: Diagnosis[] = [];
  const leftOut: { code: Diagnosis["code"]; reason: string }[] = [];
  for (const diagnostic of FAMILY) {
    const reason = whyNot(fit, diagnostic);
    if (reason === null) found.push(diagnostic.run(fit));
    else leftOut.push({ code: diagnostic.code, reason });
  }
  found.sort((a, b) => SEVERITY[a.verdict] - SEVERITY[b.verdict] || a.p - b.p);
  return { found, leftOut };
}

function whyNot({ columns, rule, solution }: Fit, { needs }: Diagnostic): string | null {
  if (rule.weights !== null || rule.penalty !== null)
    return "The check holds for least squares with equal weights and without a penalty.";
  if (columns.length === 0) return "The model has no attributes.";
  if (solution.residualDf < needs) return "There are too few sales for so many attributes.";
  return solution.residualSumOfSquares > 0 ? null : "The model meets every sale exactly.";
}
