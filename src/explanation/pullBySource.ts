/**
 * Pull of whole sources: the sum of their sales' weights, and the price fitted again without them. The columns stay as they are
 * (same knots, same levels); an estimator finds its weights afresh.
 */
import type { SourcePull } from "../domain/appraisal.ts";
import { AppError } from "../domain/errors.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { Fit, FitRule, SubjectRow } from "../hedonic/fit.ts";
import { fitColumns } from "../hedonic/fitPriceModel.ts";

/** Sources listed, those that weigh most first. */
const LISTED = 12;
/** Sales × coefficients² over all fits; beyond it the weights stand alone, as fitting again would take seconds. */
const WORK = 5e7;

export interface PullBySourceInput {
  readonly fit: Fit;
  readonly row: SubjectRow;
  readonly sales: SaleColumns;
  /** Weight of each sale of the fit on the subject's price. */
  readonly weights: Float64Array;
  /** The rule of a fit on sales with these weights, zeros for those out. */
  readonly refitRule: (kept: Float64Array) => FitRule;
}

/** Empty where all sales come from one source. */
export function pullBySource(input: PullBySourceInput): SourcePull[] {
  const { fit, sales, weights } = input;
  const { rows, n } = fit.design;
  const found = new Map<string, { count: number; weight: number }>();
  for (let i = 0; i < n; i++) {
    const source = sales.sources.at(rows[i]!)!;
    const one = found.get(source) ?? { count: 0, weight: 0 };
    found.set(source, { count: one.count + 1, weight: one.weight + weights[i]! });
  }
  if (found.size < 2) return [];
  const listed = [...found]
    .sort(([a, x], [b, y]) => Math.abs(y.weight) - Math.abs(x.weight) || (a < b ? -1 : 1))
    .slice(0, LISTED);
  const isQuick = n * (fit.columns.length + 1) ** 2 * listed.length <= WORK;
  return listed.map(([source, one]) => ({
    source,
    ...one,
    ...(isQuick ? { priceWithout: priceWithout(input, source) } : {}),
  }));
}

/** Null where the others cannot carry the coefficients. */
function priceWithout({ fit, row, sales, refitRule }: PullBySourceInput, source: string): number | null {
  const { rows, n, responseForm } = fit.design;
  const kept = Float64Array.from({ length: n }, (_, i) => (sales.sources.at(rows[i]!) === source ? 0 : 1));
  try {
    const { solution } = fitColumns(fit.design, fit.groups, refitRule(kept));
    const fitted = fit.columns.reduce(
      (sum, index, j) => sum + solution.slopes[j]! * (row.x[index]! - solution.means[j]!),
      solution.responseMean,
    );
    return responseForm === "lnPrice" ? Math.exp(fitted) : fitted;
  } catch (cause) {
    if (cause instanceof AppError) return null;
    throw cause;
  }
}
