/**
 * The carry-over ledger: what each coefficient says itself, and what it carries for attributes left out.
 * Omitted-variable algebra, exact in sample: with included columns A and left-out columns B of a reference set,
 *   b_A(short) − b_A(long) = Δ·b_B(long),  Δ = (X_A'X_A)⁻¹X_A'X_B   (X centred; Goldberger 1991, ch. 17; Gelbach 2016, eq. 5).
 * own part of a = b_a(long); carried part from attribute g = Σ over its columns j of Δ_{a,j}·b_j(long).
 */

import type { Ledger, LedgerRow, ModelReport } from "../domain/appraisal.ts";
import type { Fit } from "../hedonic/fit.ts";
import { type Reading, readingsOf, readOff, stepWordsOf, varianceOf } from "../hedonic/readings.ts";
import { numbersOf } from "../numerics/column.ts";
import { solveLeastSquares } from "../numerics/solveLeastSquares.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";
import { type Association, carriedCovariance } from "./carriedErrors.ts";
import { type ComesWith, ledgerHeadline, type Move, rowSentence } from "./ledgerWords.ts";

export interface CarryOverInput {
  /** Fit of the whole reference set (after exact dependencies). */
  readonly long: Fit;
  /** Fit of the included groups, a subset of the long fit's. */
  readonly short: Fit;
  /** Report of the short fit: labels, step words and ranges stand there. */
  readonly report: ModelReport;
  readonly currencyCode: string;
}

/**
 * Rows in the order of the short fit's columns. Coefficients on the response's scale per unit of the column; money per step
 * at the average sale. Guards: nothing left out → every carried list is empty and own part = coefficient.
 */
export function carryOver({ long, short, report, currencyCode }: CarryOverInput): Ledger {
  const leftOutGroups = long.groups.filter((group) => !short.groups.some((kept) => kept.key === group.key));
  const associations = leftOutGroups.flatMap((group) => associate(short, group.columns));
  const covariances = new Map(
    leftOutGroups.map((group) => [group.key, carriedCovariance(short, long, group, associations)]),
  );
  const slopeInLong = new Map(long.columns.map((column, at) => [column, long.solution.slopes[at]!]));
  const ownSlopes = short.columns.map((column) => slopeInLong.get(column)!);
  const carriedSlopes = leftOutGroups.map((group) => {
    const own = associations.filter((one) => group.columns.includes(one.column));
    return short.columns.map((_, at) => sumOf(own.map((one) => one.slopes[at]! * slopeInLong.get(one.column)!)));
  });
  const k = short.columns.length;
  let identityError = 0;
  const described = readingsOf(short).map((reading) => {
    const coefficient = readOff(reading, short.solution.slopes);
    const ownPart = readOff(reading, ownSlopes);
    const carriedParts = leftOutGroups.map((group, g) => ({
      from: group.key,
      fromLabel: group.label,
      amount: readOff(reading, carriedSlopes[g]!),
    }));
    const total = ownPart + sumOf(carriedParts.map((part) => part.amount));
    const size = Math.max(
      Math.abs(coefficient),
      Math.abs(ownPart),
      ...carriedParts.map((part) => Math.abs(part.amount)),
    );
    if (size > 0) identityError = Math.max(identityError, Math.abs(coefficient - total) / size);
    const partErrors = leftOutGroups.map(({ key }) => {
      const covariance = covariances.get(key) ?? null;
      return {
        from: key,
        amount: covariance === null ? null : Math.sqrt(Math.max(0, varianceOf(reading, covariance, k))),
      };
    });
    return describeRow({
      short,
      report,
      reading,
      coefficient,
      ownPart,
      ownError: ownErrorOf(reading, short, long),
      carriedParts,
      carriedErrors: partErrors,
      associations,
      currencyCode,
    });
  });
  const rows = described.map(({ row }) => row);
  const leftOut = leftOutGroups.map((group) => ({ key: group.key, label: group.label }));
  return {
    referenceSet: long.groups.map((group) => group.key),
    leftOut,
    rows,
    leftOutOwn: leftOutGroups.flatMap((group) => ownOf(group.key, long, report)),
    headline: ledgerHeadline(described, leftOut, currencyCode),
    identityError,
  };
}

/** Standard error of the own part: of the same reading in the long fit, at even spread. */
function ownErrorOf(reading: Reading, short: Fit, long: Fit): number | null {
  const s = long.solution.residualStandardError;
  if (s === null) return null;
  const terms = reading.terms.map(({ at, weight }) => ({ at: long.columns.indexOf(short.columns[at]!), weight }));
  const variance = varianceOf({ ...reading, terms }, long.solution.inverse, long.columns.length);
  return s * Math.sqrt(Math.max(0, variance));
}

/** Δ column by column: each left-out column regressed on the included ones, as carefully as a reported fit. */
function associate({ design, columns: included, rule }: Fit, leftOut: readonly number[]): Association[] {
  const columns = included.map((index) => design.columns[index]!.values);
  const options = {
    intercept: true,
    ...(rule.weights === null ? {} : { weights: rule.weights }),
    ...(rule.penalty === null ? {} : { penalty: Float64Array.from(included, (index) => rule.penalty![index]!) }),
  };
  return leftOut.map((column) => {
    const { slopes, residuals } = solveLeastSquares(columns, numbersOf(design.columns[column]!.values), options);
    return { column, slopes, residuals };
  });
}

interface RowParts {
  readonly short: Fit;
  readonly report: ModelReport;
  readonly reading: Reading;
  readonly coefficient: number;
  readonly ownPart: number;
  readonly ownError: number | null;
  readonly carriedParts: LedgerRow["carriedParts"];
  readonly carriedErrors: readonly { from: string; amount: number | null }[];
  readonly associations: readonly Association[];
  readonly currencyCode: string;
}

function describeRow(parts: RowParts): { row: LedgerRow; moves: ComesWith } {
  const { report, reading, coefficient, ownPart, carriedParts, currencyCode } = parts;
  const { attribute, level, step } = reading;
  const stated = report.coefficients.find((one) => one.attribute === attribute && one.level === level)!;
  const perUnit = moneyPerUnit(report, coefficient, step);
  const low = stated.moneyLow95;
  const high = stated.moneyHigh95;
  const row = {
    attribute,
    label: stated.label,
    level,
    stepWords: stated.stepWords,
    coefficient,
    ownPart,
    carriedParts,
    money: {
      coefficient: coefficient * perUnit,
      own: ownPart * perUnit,
      carried: carriedParts.map((part) => ({ from: part.from, amount: part.amount * perUnit })),
    },
    moneyRange95: low === null || high === null ? null : { low, high },
    errors: errorsOf(parts, perUnit),
    signTurned: carriedParts.length > 0 && Math.sign(coefficient) === -Math.sign(ownPart) && ownPart !== 0,
  };
  const moves = comesWith(parts, step);
  return { row: { ...row, sentence: rowSentence({ ...row, sentence: "" }, moves, currencyCode) }, moves };
}

/** Upper tail of a 95 % range. */
const TAIL_95 = 0.025;

/** Standard errors of the parts; null unless all of them are known. */
function errorsOf(
  { report, ownError, carriedErrors: errors }: RowParts,
  perUnit: number,
): NonNullable<LedgerRow["errors"]> | null {
  const carried = errors.flatMap(({ from, amount }) => (amount === null ? [] : [{ from, amount }]));
  const df = report.fitted?.errorsDf ?? report.residualDf;
  if (ownError === null || carried.length < errors.length || !(df > 0)) return null;
  const size = Math.abs(perUnit);
  const moneyCarried = carried.map(({ from, amount }) => ({ from, amount: amount * size }));
  return { own: ownError, carried, moneyOwn: ownError * size, moneyCarried, t95: tUpperQuantile(TAIL_95, df) };
}

/** "each 1,000 h comes with 0.88 more years": how a step of this column moves the one column of each left-out number. */
function comesWith(parts: RowParts, step: number): ComesWith {
  const { design } = parts.short;
  const moves = new Map<string, Move>();
  for (const association of parts.associations) {
    const { attribute, level } = design.columns[association.column]!;
    const group = design.groups.find((one) => one.key === attribute)!;
    if (level !== null || group.form === "ln" || group.unit === null) continue;
    const amount = readOff(parts.reading, association.slopes) * step;
    moves.set(attribute, { amount, unit: group.unit });
  }
  return moves;
}

/**
 * Money per unit of coefficient for one step: after ln, P̄·(e^(b·step) − 1)/b, so that parts are shares of the exact
 * one-step change and add up; P̄·step in the limit b → 0. Plain response: the step.
 */
export function moneyPerUnit(
  report: Pick<ModelReport, "response" | "averagePrice">,
  coefficient: number,
  step: number,
): number {
  if (report.response === "price") return step;
  const change = coefficient * step;
  return change === 0 ? report.averagePrice * step : (report.averagePrice * Math.expm1(change)) / coefficient;
}

/** What a left-out attribute itself says beside the whole reference set. */
function ownOf(key: string, long: Fit, report: ModelReport): Ledger["leftOutOwn"][number][] {
  const group = long.groups.find((one) => one.key === key)!;
  return group.columns.map((column) => {
    const estimate = long.solution.slopes[long.columns.indexOf(column)]!;
    const { level } = long.design.columns[column]!;
    return {
      key,
      label: group.label,
      level,
      estimate,
      money: estimate * moneyPerUnit(report, estimate, group.step),
      stepWords: stepWordsOf(group, level),
    };
  });
}

function sumOf(parts: readonly number[]): number {
  return parts.reduce((sum, part) => sum + part, 0);
}
