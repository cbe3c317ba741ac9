/**
 * Coefficients of two models side by side. On the same sales and the same reference set both have the same own part, so their
 * difference is a difference of what they carry: b₂ − b₁ = Σ_g (carried₂,g − carried₁,g), exactly (the ledger's identity twice).
 */
import type { Coefficient, Ledger, LedgerRow, ModelReport } from "../domain/appraisal.ts";
import type { ComparedCoefficient } from "../domain/comparison.ts";

interface Side {
  readonly report: ModelReport;
  readonly ledger: Ledger;
}

/** `areAlike`: both sides rest on the same sales, response and reference set. Order of the first side, then what only the second has. */
export function compareCoefficients(first: Side, second: Side, areAlike: boolean): ComparedCoefficient[] {
  const nameOf = (one: Coefficient) => `${one.attribute} ${one.level ?? ""} ${one.stepWords}`;
  const shown = (side: Side) => side.report.coefficients.filter((one) => one.moneyPerStep !== null);
  const inSecond = new Map(shown(second).map((one) => [nameOf(one), one]));
  const inFirst = shown(first);
  const names = new Set(inFirst.map(nameOf));
  const pairs = [
    ...inFirst.map((one) => [one, inSecond.get(nameOf(one)) ?? null] as const),
    ...shown(second)
      .filter((one) => !names.has(nameOf(one)))
      .map((one) => [null, one] as const),
  ];
  return pairs.map(([a, b]) => {
    const either = (a ?? b)!;
    const difference = a === null || b === null ? null : b.moneyPerStep! - a.moneyPerStep!;
    return {
      attribute: either.attribute,
      label: either.label,
      level: either.level,
      stepWords: either.stepWords,
      first: a?.moneyPerStep ?? null,
      second: b?.moneyPerStep ?? null,
      firstRange95: rangeOf(a),
      secondRange95: rangeOf(b),
      difference,
      parts: difference === null || !areAlike ? [] : partsOf(first.ledger, second.ledger, either, difference),
    };
  });
}

function rangeOf(one: Coefficient | null): { low: number; high: number } | null {
  if (one === null || one.moneyLow95 === null || one.moneyHigh95 === null) return null;
  return { low: one.moneyLow95, high: one.moneyHigh95 };
}

/** Shares of the difference in coefficients, put on its money: they add up to it. */
function partsOf(first: Ledger, second: Ledger, one: Coefficient, money: number): ComparedCoefficient["parts"] {
  const rowOf = (ledger: Ledger): LedgerRow | undefined =>
    ledger.rows.find((row) => row.attribute === one.attribute && row.level === one.level);
  const [a, b] = [rowOf(first), rowOf(second)];
  if (a === undefined || b === undefined) return [];
  const difference = b.coefficient - a.coefficient;
  if (difference === 0) return [];
  const amounts = new Map<string, { label: string; amount: number }>();
  const add = (row: LedgerRow, sign: number): void => {
    for (const part of row.carriedParts) {
      const now = amounts.get(part.from) ?? { label: part.fromLabel, amount: 0 };
      amounts.set(part.from, { ...now, amount: now.amount + sign * part.amount });
    }
  };
  add(a, -1);
  add(b, 1);
  return [...amounts]
    .map(([from, { label, amount }]) => ({ from, label, amount: (amount / difference) * money }))
    .filter((part) => part.amount !== 0);
}
