/** Runs every check over a fit, the most serious finding first; checks that cannot be run are left out with the reason. */
import type { Diagnosis, FitDiagnoses } from "../domain/diagnosis.ts";
import { NumericsError } from "../numerics/numericsError.ts";
import { type RowDiagnostics, rowDiagnostics } from "../numerics/rowDiagnostics.ts";
import { columnsOf, type Diagnostic, type DiagnosticContext, type Finding } from "./diagnostics/diagnostic.ts";
import { DIAGNOSTICS } from "./diagnostics/index.ts";
import type { Fit } from "./fit.ts";

const SEVERITY = { trouble: 0, look: 1, fine: 2 } as const;

export function diagnoseFit(fit: Fit): FitDiagnoses {
  const found: Diagnosis[] = [];
  const leftOut: { code: Diagnosis["code"]; label: string; reason: string }[] = [];
  const context = contextOf(fit);
  for (const diagnostic of DIAGNOSTICS) {
    const { code, label } = diagnostic;
    const finding = whyNot(fit, diagnostic) ?? findingOf(fit, diagnostic, context);
    if (typeof finding === "string") leftOut.push({ code, label, reason: finding });
    else found.push({ code, label, ...finding });
  }
  found.sort((a, b) => SEVERITY[a.verdict] - SEVERITY[b.verdict] || (a.p ?? 1) - (b.p ?? 1));
  return { found, leftOut };
}

const TOO_MUCH_ALIKE = "The sales are too few, or too much alike, for this check.";

/** Beside what a check foresees: fitted prices of two values have no square of their own, and equal distances no spread. */
function findingOf(fit: Fit, diagnostic: Diagnostic, context: DiagnosticContext): Finding | string {
  try {
    const finding = diagnostic.run(fit, context);
    return typeof finding === "string" || Number.isFinite(finding.statistic) ? finding : TOO_MUCH_ALIKE;
  } catch (cause) {
    if (cause instanceof NumericsError) return TOO_MUCH_ALIKE;
    throw cause;
  }
}

export function contextOf(fit: Fit): DiagnosticContext {
  let rows: RowDiagnostics | null = null;
  return {
    rows: () => {
      rows ??= rowDiagnostics(columnsOf(fit), fit.design.response, fit.solution, fit.rule.weights);
      return rows;
    },
  };
}

function whyNot({ columns, rule, solution }: Fit, { needs, underWeights }: Diagnostic): string | null {
  if (!underWeights && (rule.weights !== null || rule.penalty !== null))
    return "The check holds for least squares with equal weights and without a penalty.";
  if (columns.length === 0) return "The model has no attributes.";
  if (solution.residualDf < needs) return "There are too few sales for so many attributes.";
  return solution.residualSumOfSquares > 0 ? null : "The model meets every sale exactly.";
}
