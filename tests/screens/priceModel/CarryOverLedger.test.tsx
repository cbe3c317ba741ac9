/** The ledger of the demo class with age left out: sentence, picture and table say the same. */
import { beforeAll, describe, expect, test } from "vitest";
import type { Ledger } from "../../../src/domain/appraisal.ts";
import { formatNumber, formatSigned } from "../../../src/domain/format.ts";
import { rowRangeWords } from "../../../src/domain/ledgerRanges.ts";
import { CarryOverLedger } from "../../../src/screens/priceModel/CarryOverLedger.tsx";
import { type PrintedRow, printLedger } from "../../../src/screens/priceModel/ledgerTable.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

let ledger: Ledger;
let rows: readonly PrintedRow[];
let html: string;

beforeAll(async () => {
  const bench = await demoBench((model) => ({ ...model, leftOut: ["built"] }));
  const { report } = bench.appraisal!;
  ({ ledger } = bench.appraisal!);
  ({ rows } = printLedger(ledger));
  html = draw(bench, <CarryOverLedger bench={bench} ledger={ledger} report={report} currencyCode="EUR" />);
});

const squeeze = (text: string): string => text.replace(/\s+/g, "");
const ledgerRow = (row: PrintedRow) =>
  ledger.rows.find(({ attribute, level }) => `${attribute} ${level ?? ""}` === row.id)!;

describe("the ledger with age left out", () => {
  test("has in each row's picture the numbers that stand in its table", () => {
    const drawn = html.split("<tbody>")[1]!.split("</tbody>")[0]!.split("<tr").slice(1);
    expect(drawn).toHaveLength(rows.length);
    rows.forEach((row, k) => {
      const picture = /aria-label="([^"]*)"/.exec(drawn[k]!.slice(drawn[k]!.indexOf("<svg")))![1]!;
      expect(picture).toContain(`own part ${formatNumber(row.printed[0]!)}`);
      expect(picture).toContain(`reads ${formatNumber(row.reads)}`);
      const cells = wordsOf(drawn[k]!);
      expect(cells).toContain(formatNumber(row.printed[0]!));
      expect(cells).toContain(row.printed[1] === 0 ? "±0" : formatSigned(row.printed[1]!));
      expect(cells).toContain(formatNumber(row.reads));
    });
  });

  test("says each row's amounts and signs as the table prints them", () => {
    for (const row of rows) {
      const said = [...squeeze(row.sentence).matchAll(/€([\d,]+)(less|more)/g)].map(
        ([, digits, way]) => Number(digits!.replaceAll(",", "")) * (way === "less" ? -1 : 1),
      );
      expect([row.name, said[0] ?? 0]).toEqual([row.name, row.reads]);
      for (const amount of said) expect([row.reads, ...row.printed]).toContain(amount);
      expect(Math.sign(row.reads) * Math.sign(ledgerRow(row).money.coefficient)).toBeGreaterThanOrEqual(0);
      expect(row.signTurned).toBe(ledgerRow(row).money.own * ledgerRow(row).money.coefficient < 0);
    }
  });

  test("gives the row looked at with its ranges, the same that hover and screen readers get", () => {
    const hours = rows.find(({ attribute }) => attribute === "hours")!;
    expect(hours.rangeWords).toBe(rowRangeWords(ledgerRow(hours)));
    expect(hours.rangeWords).toMatch(/^own part −\d+\s±\s\d+; carried for age −[\d,]+\s±\s\d+;/);
    expect(wordsOf(html)).toContain(hours.partRanges[0]!);
    expect(squeeze(wordsOf(html))).toContain(
      squeeze(rows.find(({ sentence }) => html.includes(sentence))!.rangeWords!),
    );
    expect(hours.carriesFor).toBe("built");
  });

  test("prints no part further from its exact value than half of its 95 % range", () => {
    for (const row of rows) {
      const { errors } = ledgerRow(row);
      const half = errors!.t95 * errors!.moneyOwn;
      expect(Math.abs(row.printed[0]! - row.parts[0]!)).toBeLessThan(half);
    }
  });
});
