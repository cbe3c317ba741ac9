/**
 * A fit as the report that screens and sheets show. t ranges at 95 %; money per step at the average sale: after ln,
 * P̄(e^(b·step) − 1) with P̄ = exp(mean ln price). Leave-one-out: e_i/(1 − h_i) (Allen 1974, PRESS). Smearing: Duan 1983.
 */

import type { AttributeEvidence, Coefficient, FitAccount, ModelReport } from "../domain/appraisal.ts";
import { MARKET_KEY } from "../domain/attribute.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import { correlation, inflation, partialCorrelation } from "../numerics/collinearity.ts";
import { numbersOf } from "../numerics/column.ts";
import { quantileOfSorted, sortedOf } from "../numerics/quantile.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";
import type { FitErrors } from "./errorRules/errors.ts";
import type { AttributeGroup, Design, Fit } from "./fit.ts";
import { type Reading, readingsOf, readOff, varianceOf } from "./readings.ts";
import type { ResolvedSet } from "./resolveDependencies.ts";

export interface ReportInput {
  readonly fit: Fit;
  readonly model: PriceModel;
  readonly resolved: ResolvedSet;
  readonly leftOut: ModelReport["leftOut"];
  /** Fit of the whole reference set: what moves together is judged among all of it. */
  readonly reference: Fit;
  /** Null: an even spread, every sale counting alike and nothing drawn in. */
  readonly errors: FitErrors | null;
  readonly fitted: FitAccount;
}

export function reportModel({ fit, model, resolved, leftOut, reference, errors, fitted }: ReportInput): ModelReport {
  const { solution, design } = fit;
  const { residualSumOfSquares: rss, totalSumOfSquares: sst, residualDf } = solution;
  const press = pressOf(fit);
  const averagePrice = design.responseForm === "lnPrice" ? Math.exp(solution.responseMean) : solution.responseMean;
  return {
    model,
    response: design.responseForm,
    attributes: fit.groups.map((group) => group.key),
    leftOut,
    n: design.n,
    p: solution.rank,
    rank: solution.rank,
    residualDf,
    s: solution.residualStandardError,
    r2: sst > 0 ? 1 - rss / sst : null,
    adjustedR2: sst > 0 && residualDf > 0 ? 1 - rss / residualDf / (sst / (design.n - 1)) : null,
    looR2: sst > 0 && press !== null ? 1 - press / sst : null,
    looTypicalError: press === null ? null : typicalError(press, fit, averagePrice),
    digitsToTrust: solution.digitsToTrust,
    condition: solution.condition,
    path: solution.path,
    fitted,
    averagePrice,
    smearing: design.responseForm === "lnPrice" ? smearingOf(solution.residuals) : null,
    coefficients: coefficientsOf(fit, averagePrice, errors),
    dependencies: resolved.notices,
    attributeEvidence: design.groups.map((group) => evidenceOf(design, group, fit)),
    movingTogether: pairsOf(reference),
    widening: fit.groups.map((group) => wideningOf(fit, group)),
  };
}

/** Σ (e/(1 − h))², or null when a sale is the only one of its kind. */
function pressOf({ solution, leverages }: Fit): number | null {
  let sum = 0;
  for (let i = 0; i < leverages.length; i++) {
    const rest = 1 - leverages[i]!;
    if (rest < 1e-9) return null;
    sum += (solution.residuals[i]! / rest) ** 2;
  }
  return sum;
}

/** Root mean square of the leave-one-out errors as a share of price: after ln, e^rms − 1; plain, rms over the mean price. */
function typicalError(press: number, { design }: Fit, averagePrice: number): number {
  const rms = Math.sqrt(press / design.n);
  return design.responseForm === "lnPrice" ? Math.expm1(rms) : rms / averagePrice;
}

/** Duan 1983: the mean of e^residual. */
export function smearingOf(residuals: Float64Array): number {
  return residuals.reduce((sum, e) => sum + Math.exp(e), 0) / residuals.length;
}

function coefficientsOf(fit: Fit, averagePrice: number, errors: FitErrors | null): Coefficient[] {
  const { solution, design } = fit;
  const df = errors?.df ?? solution.residualDf;
  const t = df > 0 ? tUpperQuantile(0.025, df) : null;
  const { standardErrors, interceptStandardError } = errors ?? solution;
  const intercept: Coefficient = {
    attribute: "intercept",
    label: "Intercept",
    level: null,
    stepWords: "",
    estimate: solution.intercept!,
    ...rangeOf(solution.intercept!, interceptStandardError, fit.hc3InterceptStandardError, t),
    moneyPerStep: null,
    moneyLow95: null,
    moneyHigh95: null,
  };
  const k = fit.columns.length;
  const others = readingsOf(fit).map((reading): Coefficient => {
    const { attribute, label, level, stepWords, step, terms } = reading;
    const estimate = readOff(reading, solution.slopes);
    const isOne = terms.length === 1;
    const standardError = t === null ? null : isOne ? standardErrors[terms[0]!.at]! : spreadOf(reading, fit, errors, k);
    const range = rangeOf(estimate, standardError, isOne ? (fit.hc3StandardErrors?.[terms[0]!.at] ?? null) : null, t);
    const money = (b: number | null) => (b === null ? null : moneyOf(design, b, step, averagePrice));
    return {
      attribute,
      label,
      level,
      stepWords,
      estimate,
      ...range,
      moneyPerStep: money(estimate),
      moneyLow95: money(range.low95),
      moneyHigh95: money(range.high95),
    };
  });
  return [intercept, ...others];
}

/** Standard error of a combination of coefficients: from the rule's covariance, or s²C⁻¹. */
function spreadOf(reading: Reading, { solution }: Fit, errors: FitErrors | null, k: number): number {
  const s = solution.residualStandardError ?? 0;
  const variance =
    errors === null ? s * s * varianceOf(reading, solution.inverse, k) : varianceOf(reading, errors.covariance, k);
  return Math.sqrt(Math.max(0, variance));
}

function rangeOf(estimate: number, standardError: number | null, hc3: number | null, t: number | null) {
  const isKnown = standardError !== null && t !== null;
  return {
    standardError,
    hc3StandardError: isKnown ? hc3 : null,
    low95: isKnown ? estimate - t * standardError : null,
    high95: isKnown ? estimate + t * standardError : null,
  };
}

function moneyOf(design: Design, b: number, step: number, averagePrice: number): number {
  return design.responseForm === "lnPrice" ? averagePrice * Math.expm1(b * step) : b * step;
}

function evidenceOf(design: Design, group: AttributeGroup, fit: Fit): AttributeEvidence {
  const included = fit.groups.some((one) => one.key === group.key);
  const kind = group.isMarket
    ? ("market" as const)
    : group.form === "choice"
      ? ("choice" as const)
      : group.form === "yesNo"
        ? ("yesNo" as const)
        : ("number" as const);
  const base = {
    key: group.key,
    label: group.label,
    kind,
    form: group.form,
    unit: group.unit,
    decimals: group.decimals,
  };
  const columns = group.columns.map((index) => design.columns[index]!);
  if (group.form === "choice" || group.form === "yesNo") {
    const counts = columns.map(({ level, mean }) => ({ level: level!, count: Math.round(mean * design.n) }));
    const rest = design.n - counts.reduce((sum, { count }) => sum + count, 0);
    const levels = [{ level: group.reference ?? "", count: rest }, ...counts];
    return { ...base, included, spread: null, levels, reference: group.reference };
  }
  const own = numbersOf(columns[0]!.values);
  const raw = group.form === "ln" ? own.map((value) => Math.exp(value)) : (group.stored ?? own);
  const sorted = sortedOf(raw);
  const at = (p: number) => quantileOfSorted(sorted, p);
  const mean = raw.reduce((sum, value) => sum + value, 0) / raw.length;
  const spread = { low: at(0), q1: at(0.25), median: at(0.5), q3: at(0.75), high: at(1), mean };
  return { ...base, included, spread, levels: [], reference: null };
}

/** Pairs of one-column attributes by partial correlation, strongest first; choices of several columns are left to widening. */
function pairsOf(reference: Fit): ModelReport["movingTogether"] {
  const k = reference.columns.length;
  const single = reference.groups.filter((group) => group.columns.length === 1 && group.key !== MARKET_KEY);
  const pairs: { a: string; b: string; partialCorrelation: number; correlation: number }[] = [];
  single.forEach((first, i) => {
    for (const second of single.slice(i + 1)) {
      const [a, b] = [first.columns[0]!, second.columns[0]!];
      pairs.push({
        a: first.key,
        b: second.key,
        partialCorrelation: partialCorrelation(
          reference.solution.inverse,
          k,
          reference.columns.indexOf(a),
          reference.columns.indexOf(b),
        ),
        correlation: correlation(reference.design.moments, a, b),
      });
    }
  });
  return pairs.sort((x, y) => Math.abs(y.partialCorrelation) - Math.abs(x.partialCorrelation));
}

/** √VIF, or GVIF^(1/2df) for a choice (Fox & Monette 1992). */
function wideningOf(fit: Fit, group: AttributeGroup): ModelReport["widening"][number] {
  const at = group.columns.map((index) => fit.columns.indexOf(index));
  const times = inflation(fit.design.moments, fit.columns, fit.solution.inverse, at) ** (1 / (2 * at.length));
  return { key: group.key, label: group.label, times };
}
