/**
 * What a range is made of when some attributes of the subject are not known, and what assuming values for them would do.
 * With s² of the fit without them (S) and of the fit with them (L), h₀ the subject's leverage in S:
 *   s_S²(1 + h₀) = noise s_L² + not knowing (s_S² − s_L²) + estimation s_S²·h₀,
 * the squared half-range of one sale but for the factor t². Where s_S ≤ s_L the attributes say nothing beside the others and not
 * knowing them costs nothing.
 */
import type { NotKnowing } from "../domain/appraisal.ts";
import { formatMoney, formatPercent, listWords, lowerStart, niceStep, roundTo } from "../domain/format.ts";
import type { AttributeGroup, Fit, SubjectRow } from "../hedonic/fit.ts";
import { fitColumns } from "../hedonic/fitPriceModel.ts";
import { valueAt } from "../numerics/column.ts";
import { estimatePrice, subjectLeverage } from "./estimatePrice.ts";

const LEVEL = 0.9;

/** Quantile of what the attribute adds to the price among the sales. */
const ASSUMED = [
  { code: "low", label: "assume low", at: 0.25 },
  { code: "typical", label: "assume typical", at: 0.5 },
  { code: "high", label: "assume high", at: 0.75 },
] as const;

/** Null where every attribute is known or no range can be given. `fit` is the fit without the unknown groups. */
export function notKnowing(
  fit: Fit,
  row: SubjectRow,
  unknown: readonly AttributeGroup[],
  currencyCode: string,
): NotKnowing | null {
  const now = estimatePrice(fit, row, [LEVEL], null);
  const range = now.rangeForOneSale[0];
  const s = fit.solution.residualStandardError;
  if (unknown.length === 0 || range === undefined || s === null) return null;
  const withThem = fitColumns(fit.design, [...fit.groups, ...unknown], fit.rule);
  const sWith = withThem.solution.residualStandardError;
  if (sWith === null) return null;
  const leverage = subjectLeverage(fit, row);
  const noise = Math.min(sWith, s) ** 2;
  const whole = s * s * (1 + leverage);
  const shares = { noise: noise / whole, notKnowing: (s * s - noise) / whole, estimation: (s * s * leverage) / whole };
  const assumed = ASSUMED.map(({ code, label, at }) => {
    const x = Float64Array.from(row.x);
    for (const group of unknown) assume(withThem, group, at, x);
    const estimate = estimatePrice(withThem, { x, notKnown: [] }, [LEVEL], null);
    const { low, high } = estimate.rangeForOneSale[0]!;
    return { code, label, amount: estimate.amount, low, high };
  });
  const typical = assumed[1]!;
  const parts = {
    level: LEVEL,
    width: range.high - range.low,
    widthIfKnown: typical.high - typical.low,
    shares,
    assumed,
  };
  return { ...parts, sentence: sentence(parts, unknown, currencyCode) };
}

/** Puts the columns of a sale whose value adds the quantile `at` of what values of the group add. */
function assume(fit: Fit, group: AttributeGroup, at: number, x: Float64Array): void {
  const { n, columns } = fit.design;
  const adds = new Float64Array(n);
  for (const index of group.columns) {
    const slope = fit.solution.slopes[fit.columns.indexOf(index)]!;
    for (let i = 0; i < n; i++) adds[i]! += slope * valueAt(columns[index]!.values, i);
  }
  const wanted = Float64Array.from(adds).sort()[Math.round(at * (n - 1))]!;
  const chosen = adds.indexOf(wanted);
  for (const index of group.columns) x[index] = valueAt(columns[index]!.values, chosen);
}

/** Adverse selection is common practice, no source: what is not told is often not good. */
function sentence(
  { width, widthIfKnown, shares, assumed }: Omit<NotKnowing, "sentence">,
  unknown: readonly AttributeGroup[],
  currencyCode: string,
): string {
  const step = Math.max(1, niceStep(width / 100));
  const money = (amount: number): string => formatMoney(roundTo(amount, step), currencyCode);
  const names = listWords(unknown.map(({ label }) => lowerStart(label)));
  const narrower = roundTo(width - widthIfKnown, step);
  const worth =
    narrower > 0 ? `finding out would narrow it by about ${money(narrower)}` : "finding out would hardly narrow it";
  const split = `Of the range, ${formatPercent(shares.noise)} is how sales differ anyway, ${formatPercent(shares.notKnowing)} is not knowing ${names}, ${formatPercent(shares.estimation)} is how well the model is known; ${worth}.`;
  const [low, , high] = assumed;
  return `${split} Assuming values instead would read ${money(low!.amount)} to ${money(high!.amount)} with ranges that pretend to know; what is not known is often bad news.`;
}
