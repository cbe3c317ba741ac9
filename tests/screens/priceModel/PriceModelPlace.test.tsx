import { beforeAll, describe, expect, test } from "vitest";
import { formatMoney, formatNumber } from "../../../src/domain/format.ts";
import { errorWords } from "../../../src/screens/priceModel/ModelOutcome.tsx";
import { PriceModelPlace } from "../../../src/screens/priceModel/PriceModelPlace.tsx";
import type { Workbench } from "../../../src/screens/workbench/workbench.ts";
import { demoBench } from "../demoBench.ts";
import { draw, wordsOf } from "../draw.tsx";

let ageOut: Workbench;
beforeAll(async () => {
  ageOut = await demoBench((model) => ({ ...model, leftOut: ["built"] }), { leftOutJustNow: "built", canUndo: true });
});

describe("the price model's screen", () => {
  test("each tile is a switch whose name says in, or why it is left out", () => {
    const html = draw(ageOut, <PriceModelPlace />);
    const tiles = [...html.matchAll(/role="switch"[^>]*aria-checked="(\w+)"[^>]*aria-label="([^"]*)"/g)];
    expect(tiles).toHaveLength(11);
    const said = tiles.map(([, checked, label]) => `${checked} ${label}`);
    expect(said).toContainEqual(expect.stringMatching(/^false Age, left out just now/));
    expect(said).toContainEqual(expect.stringMatching(/^false Power \(hp\), left out, exact/));
    expect(said).toContainEqual(expect.stringMatching(/^false Service record, left out, not known/));
    expect(said).toContainEqual(expect.stringMatching(/^true Hours, in, straight line, per 1,000/));
  });

  test("opens with the ledger's headline, and offers to put the attribute back", () => {
    const words = wordsOf(draw(ageOut, <PriceModelPlace />));
    const squeeze = (text: string): string => text.replace(/\s+/g, "");
    expect(squeeze(words)).toContain(squeeze(ageOut.appraisal!.ledger.headline));
    expect(words).toContain("Put age back");
  });

  test("says how the typical error moved, and nothing of a move that cannot be seen", () => {
    expect(errorWords({ looTypicalError: 0.183, n: 9 }, 0.11)).toContain("rises from 11.0\u00a0% to 18.3\u00a0%");
    expect(errorWords({ looTypicalError: 0.11, n: 9 }, 0.183)).toContain("falls from");
    expect(errorWords({ looTypicalError: 0.11, n: 9 }, 0.11001)).toContain(": 11.0");
    expect(errorWords({ looTypicalError: null, n: 9 }, 0.11)).toContain("Fitted on 9 sales");
  });

  test("says an exact dependency with the choice that resolves it now", () => {
    const html = draw(ageOut, <PriceModelPlace />);
    const notice = ageOut.appraisal!.report.dependencies[0]!;
    expect(wordsOf(html)).toContain(notice.equation);
    expect(html.match(/type="radio"[^>]*checked/g)).toHaveLength(1);
  });

  test("holds every row of the ledger, its picture named in words", () => {
    const html = draw(ageOut, <PriceModelPlace />);
    const { rows } = ageOut.appraisal!.ledger;
    expect(html.match(/carried for age [^"]*, reads/g)).toHaveLength(rows.length);
  });

  test("shows at which average price the money is read", () => {
    const words = wordsOf(draw(ageOut, <PriceModelPlace />));
    const average = Math.round(ageOut.appraisal!.report.averagePrice / 10) * 10;
    expect(words).toContain(`EUR per unit, at the average sale of ${formatMoney(average, "EUR")}`);
  });

  test("says what cannot be fitted where the outcome would be, and keeps the rail", () => {
    const error = {
      family: "fit",
      code: "too-few-sales",
      what: "Nine sales can't carry ten.",
      where: null,
      whatToDo: "Leave one out.",
    } as const;
    const html = draw({ ...ageOut, appraisal: null, error, status: "notPriced" }, <PriceModelPlace />);
    expect(wordsOf(html)).toContain("Nine sales can't carry ten. Leave one out.");
    expect(html).toContain('role="alert"');
    expect(html.match(/role="switch"/g)).toHaveLength(11);
  });

  test("says how many sales count and why the others do not", () => {
    const words = wordsOf(draw(ageOut, <PriceModelPlace />));
    const { used, read, out } = ageOut.appraisal!.evidence;
    expect(words).toContain(`${formatNumber(used)} of ${formatNumber(read)} sales count.`);
    for (const one of out) expect(words).toContain(one.sentence);
  });
});
