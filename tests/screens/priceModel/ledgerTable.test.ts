import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Ledger, LedgerRow } from "../../../src/domain/appraisal.ts";
import { ledgerColumns, printLedger } from "../../../src/screens/priceModel/ledgerTable.ts";

function rowOf(own: number, carried: readonly number[]): LedgerRow {
  const parts = carried.map((amount, index) => ({ from: `left_${index}`, fromLabel: `Left ${index}`, amount }));
  const coefficient = carried.reduce((sum, part) => sum + part, own);
  return {
    attribute: "hours",
    label: "Hours",
    level: null,
    stepWords: "1,000 h",
    coefficient,
    ownPart: own,
    carriedParts: parts,
    money: { coefficient, own, carried: parts },
    moneyRange95: { low: coefficient - 100, high: coefficient + 100 },
    signTurned: false,
    sentence: "",
  };
}

function ledgerOf(...rows: LedgerRow[]): Ledger {
  return { referenceSet: [], leftOut: [], rows, leftOutOwn: [], headline: "", identityError: 0 };
}

const amount = fc.double({ min: -50_000, max: 50_000, noNaN: true });

describe("the printed ledger", () => {
  test("printed parts always add up to the printed coefficient", () => {
    fc.assert(
      fc.property(amount, fc.array(amount, { maxLength: 6 }), (own, carried) => {
        const { rows } = printLedger(ledgerOf(rowOf(own, carried)));
        const { printed, reads, exactReads } = rows[0]!;
        expect(printed.reduce((sum, part) => sum + part, 0)).toBe(reads);
        expect(Math.abs(reads - exactReads)).toBeLessThanOrEqual(10);
      }),
    );
  });

  test("no carried part is lost when more than two share the columns", () => {
    fc.assert(
      fc.property(amount, fc.array(amount, { minLength: 3, maxLength: 6 }), (own, carried) => {
        const { columns, rows } = printLedger(ledgerOf(rowOf(own, carried)));
        expect(columns).toHaveLength(2);
        const shown = rows[0]!.parts.reduce((sum, part) => sum + part, 0);
        expect(shown).toBeCloseTo(rows[0]!.exactReads, 6);
      }),
    );
  });

  test("with nothing left out there is no carried column", () => {
    expect(ledgerColumns(ledgerOf(rowOf(-700, [])))).toEqual([]);
  });

  test("the largest carried attribute has a column of its own, the rest are counted", () => {
    const columns = ledgerColumns(ledgerOf(rowOf(100, [1, 50, 2])));
    expect(columns.map((column) => column.heading)).toEqual(["for left 1", "for 2 others"]);
  });
});
