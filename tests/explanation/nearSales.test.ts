/** The sales most like the subject, against adjusting every sale one by one. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import { CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";

const RUNS = { numRuns: 25, seed: 20_261_201 };

function near(seed: number, response: "lnPrice" | "price", count = 60) {
  const columns = sales({ seed, count, together: 0.7 });
  const input = { assetClass: CLASS, sales: columns, model: model({ response }), subject: SUBJECT, levels: [0.9] };
  const { appraisal, fit, row } = computeAppraisal(input);
  return { columns, appraisal, fit, row: row!, report: appraisal.priced!.near! };
}

describe("nearSales", () => {
  test("an adjusted price is the model's price of the subject with the sale's own residual", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1e6 }),
        fc.constantFrom("lnPrice" as const, "price" as const),
        (seed, form) => {
          const { report, fit, appraisal, columns } = near(seed, form);
          const { fitted } = appraisal.priced!.price;
          for (const one of report.sales) {
            const place = fit.design.rows.findIndex((at) => columns.ids[at] === one.sale);
            const expected = fitted + fit.solution.residuals[place]!;
            expect(one.adjusted / (form === "lnPrice" ? Math.exp(expected) : expected)).toBeCloseTo(1, 9);
          }
        },
      ),
      RUNS,
    );
  });

  test("are those with the least gross adjustment, nearest first", () => {
    const { report, fit, row, columns } = near(11, "price");
    const { slopes } = fit.solution;
    const all = Array.from({ length: fit.design.n }, (_, i) => {
      const at = fit.design.rows[i]!;
      const gross = fit.groups.reduce((sum, group) => {
        const net = group.columns.reduce((part, index) => {
          const column = fit.design.columns[index]!.values;
          const value = column instanceof Float64Array ? column[i]! : Number(column.codes[i] === column.level);
          return part + slopes[fit.columns.indexOf(index)]! * (row.x[index]! - value);
        }, 0);
        return sum + Math.abs(net);
      }, 0);
      return { sale: columns.ids[at]!, gross };
    }).sort((a, b) => a.gross - b.gross || a.sale - b.sale);
    expect(report.sales.map(({ sale }) => sale)).toEqual(all.slice(0, 8).map(({ sale }) => sale));
    report.sales.forEach(({ gross }, k) => {
      expect(gross / all[k]!.gross).toBeCloseTo(1, 9);
    });
  });

  test("a sale that is the subject itself needs no adjustment and stands first", () => {
    const { report, columns } = near(5, "lnPrice");
    const first = report.sales[0]!;
    const at = columns.ids.indexOf(first.sale);
    const twin = {
      ...SUBJECT,
      effectiveOn: first.soldOn,
      values: {
        hours: columns.values.hours![at]!,
        pull: columns.values.pull![at]!,
        make: CLASS.attributes[3]!.levels[columns.values.make![at]!]!,
        remote: columns.values.remote![at] === 1,
        built: new Date(columns.values.built![at]! * 86_400_000).toISOString().slice(0, 10),
        channel: first.channel,
      },
    };
    const input = { assetClass: CLASS, sales: columns, model: model({ market: "none" }), subject: twin, levels: [0.9] };
    const again = computeAppraisal(input).appraisal.priced!.near!.sales[0]!;
    expect(again.gross).toBeLessThan(1e-9);
    expect(again.adjusted / again.price).toBeCloseTo(1, 9);
  });
});
